/// Leakage of concentric windings from the energy of the stray field.
#pragma once

#include <turnwright/measure/quantity.hpp>
#include <turnwright/measure/turns.hpp>

#include <vector>

namespace turnwright {

/// Part of a coil as it takes part in the stray field. Distances from the tongue's face, with bulge.
struct stray_piece {
  metres inner, outer;
  double share = 1.0;  ///< of the coil's ampere-turns
};

/// A coil, or a part of one. Interleaved coils have more than one piece.
struct stray_coil {
  std::vector<stray_piece> pieces;
  metres height;  ///< along the limb
};

/// Where the field runs: turn length at a distance x from the tongue's face is `around` + 2 pi x.
struct stray_space {
  metres around;
};

/// Matrix of the leakage of each coil against the first, referred to n turns of the first [H], row by row, for coils
/// 1 ... k (without the first): element (j, m) is the mutual stray inductance of the loops "j against first" and "m
/// against first"; the diagonal is the leakage of the pair.
///
///   L_jm = mu0 n^2 sqrt(K_j K_m / (b_j b_m))  integral (F_j - F_1) (F_m - F_1) l(x) dx
///
/// F is the part of a coil's ampere-turns inside x, b the mean height of coil and first, K the Rogowski factor
/// 1 - (1 - exp(-pi b / w)) w / (pi b) with w the width of the pair's field. The geometric mean keeps the matrix
/// positive semidefinite and leaves every pair with the first its own factor; a pair of others, as the matrix implies
/// it, may differ from `pair_leakage` by some 6 %. Holds for full-height concentric windings within 6 %; for windings
/// of unequal height it reads up to 11 % off. Source: energy of the stray field (exact in one dimension); K by Rogowski
/// (memory). Checked: tests/winding/leakage.cpp against a finite-element solution.
std::vector<henries> leakage_against_first(const std::vector<stray_coil>& coils, const stray_space& space, turns n);

/// Leakage of one pair, referred to n turns of the first [H]. Source and check as above.
henries pair_leakage(const stray_coil& first, const stray_coil& second, const stray_space& space, turns n);

}  // namespace turnwright
