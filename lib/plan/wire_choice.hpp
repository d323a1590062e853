/// Wire for every winding at a common current density, shared so that the window's copper loses least.
#pragma once

#include <turnwright/plan/draft.hpp>

#include <vector>

namespace turnwright {

/// R.m.s. amperes that a coil's wire has to carry: one figure, or one for each tap section of a primary.
using coil_amperes = std::vector<amperes>;

/// R.m.s. current of every secondary as the job writes it, with that of every tap inside it: they flow together, in
/// phase at worst. Behind a rectifier a first guess.
std::vector<amperes> currents_of_job(const demand& d);

/// Currents that size the wires, the worst selector position of each section taken, from the line current at nominal
/// and the current of every secondary. `stepped`: one figure for each tap section.
std::vector<coil_amperes> sizing_currents(const demand& d, amperes line_at_nominal,
                                          const std::vector<amperes>& secondaries, bool stepped);

/// Current density of a careful winder for so much apparent power [A/mm2 as a quantity]: 5.2 VA^(-1/7) A/mm2, kept from
/// 1.8 to 4.5. Source: constant rise scaling (derived) with a constant of judgement.
amperes_per_square_metre usual_density(volt_amperes rating);

/// Apparent power of all secondaries as the job writes them.
volt_amperes rating_of(const demand& d);

/// Weights that share a window for least loss: density over the common one, 1 / sqrt(mean turn x copper fraction) of
/// each coil over its mean, kept from 0.85 to 1.18. Source: Lagrange's condition for a fixed window (derived).
std::vector<double> density_weights(const draft& f);

/// The first size of the shop's system that carries each current, strands added where one wire would be stiffer than
/// 1.25 mm or a twentieth of the tongue. Wires that the job fixes are kept; throws `refused` for one that the table
/// does not have.
wire_set pick_wires(const demand& d, const shop& s, metres tongue, const std::vector<coil_amperes>& currents,
                    amperes_per_square_metre density, const std::vector<double>& weights);

}  // namespace turnwright
