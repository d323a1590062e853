/// Stepping a network through one mains cycle. Private to the supply layer.
///
/// Two stages to a step, both of length g h with g = 1 - 1/sqrt 2, second order and L-stable:
///   stage 1 from x;  stage 2 from x + (1 - g)/g (X1 - x);  the second is the new state.
#pragma once

#include "junction.hpp"

namespace turnwright::supply::kernel {

inline constexpr double stage_share = 0.29289321881345254;  // 1 - 1/sqrt 2

/// All that was computed in a cycle, stage by stage.
struct record {
  int width = 0;          // states + 2 + junctions
  std::vector<double> z;  // [b, mains, 1, i] of each stage
  std::vector<double> v;  // volts across the junctions at each stage
  const double* at(int stage_number) const {
    return z.data() + static_cast<std::size_t>(stage_number) * static_cast<std::size_t>(width);
  }
};

/// Steps on one grid. The mains begins at its rising zero crossing plus `phase` [rad].
class stepper {
 public:
  stepper(const elements& e, int steps, double phase = 0);

  /// One cycle in place; with `monodromy` (states x states, column by column) also its derivative by the first state,
  /// with `kept` all stages.
  void cycle(double* x, Eigen::MatrixXd* monodromy, record* kept);
  /// Currents of all junctions at the first instant, before any step [A].
  std::vector<double> first_currents(const double* x);

  int steps() const { return steps_; }
  const stage& map() const { return s_; }
  int failures() const { return junctions_.failures(); }

 private:
  template <int Rows>
  void run(double* x, Eigen::MatrixXd* monodromy, record* kept);
  template <int Rows>
  bool one_stage(int sort, const double* base, double mains, double* out, double* kept_z, double* kept_v);
  template <int Rows>
  void sensitivity_stage(const Eigen::MatrixXd& base, Eigen::MatrixXd& out, bool any);
  void flush_off_steps(Eigen::MatrixXd& m, int& off);

  const elements& e_;
  int steps_;
  double start_mains_;
  stage s_;
  junction_solver junctions_;
  std::vector<double> mains_;  // at the two stages of each step
  std::vector<double> work_, base_, next_, slopes_, kept_z_, kept_v_;
  Eigen::MatrixXd s1_, s2_, sb_;
  std::vector<Eigen::MatrixXd> off_powers_;  // of the step with all junctions off: 1, 2, 4, ...
};

}  // namespace turnwright::supply::kernel
