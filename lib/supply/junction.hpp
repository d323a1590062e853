/// The junctions of a stage: which conduct, and how much. Private to the supply layer.
#pragma once

#include "stage.hpp"

namespace turnwright::supply::kernel {

/// Solves v = p + F i(v) for all junctions at once, where p are their volts without current. The network is passive
/// and the laws are monotone, so there is one solution.
class junction_solver {
 public:
  junction_solver(const elements& e, const stage& s);

  /// Solves from a guess that the last two stages of the same sort give (`sort` 0 or 1: the two stages of a step).
  /// After it `amps` are the currents; true where any flows.
  bool solve(const double* p, int sort);

  const std::vector<double>& amps() const { return i_; }
  /// Volts across the junctions after the last solve.
  const std::vector<double>& volts() const { return v_; }
  /// The junctions that conduct after the last solve.
  const std::vector<int>& on() const { return on_; }
  /// Currents per change of p over the junctions that are on, in their order: (1 - G F)^-1 G [S].
  void slopes(std::vector<double>& w) const;
  int failures() const { return failures_; }
  void forget_failures() { failures_ = 0; }

 private:
  struct past {
    std::vector<double> last, before;
  };
  double f(std::size_t row, std::size_t column) const {
    return s_.c[column * static_cast<std::size_t>(s_.rows) + static_cast<std::size_t>(s_.states) + row];
  }
  bool one_alone(const double* p, std::size_t j);
  void all_together(const double* p);
  void guess(const double* p, const past& then);
  double miss(const double* p);
  void newton_step();
  bool close_enough() const;
  void step_by(double part);

  const elements& e_;
  const stage& s_;
  std::vector<double> threshold_;  // of each junction
  std::vector<double> v_, i_, g_, r_, dv_, from_;
  past past_[2];
  std::vector<int> on_;
  int failures_ = 0;
};

}  // namespace turnwright::supply::kernel
