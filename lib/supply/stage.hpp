/// One backward-Euler stage of a network as an affine map. Private to the supply layer.
///
///   X   = A b + B u + C i     states after the stage
///   v_d = D b + E u + F i     volts across the junctions, what is in series with them taken off
///
/// from the states b before it, u = [mains volts, 1] and the junctions' currents i.
#pragma once

#include <Eigen/Dense>

#include "elements.hpp"

namespace turnwright::supply::kernel {

struct stage {
  int states, junctions;
  int rows;               // states + junctions, padded to a multiple of 4
  double h;               // length [s]
  std::vector<double> m;  // [A; D], column by column, rows high
  std::vector<double> by_mains, by_one;
  std::vector<double> c;   // [C; F], column by column, rows high
  Eigen::MatrixXd nodes;   // volts of every node from [b, mains, 1, i]
  Eigen::MatrixXd port_y;  // admittance of the ports over this stage
};

/// Solves the nodal equations for all right-hand sides at once.
stage stage_of(const elements& e, double h);

/// Rows over [b, mains, 1, i] that give currents and volts of a stage.
Eigen::RowVectorXd port_current_row(const elements& e, const stage& s, int port);
Eigen::RowVectorXd port_volts_row(const elements& e, const stage& s, int port);
Eigen::RowVectorXd line_current_row(const elements& e, const stage& s);
Eigen::RowVectorXd capacitor_current_row(const elements& e, const stage& s, int capacitor);
Eigen::RowVectorXd choke_current_row(const elements& e, const stage& s, int choke);
Eigen::RowVectorXd link_current_row(const elements& e, const stage& s, int link);
Eigen::RowVectorXd node_volts_row(const elements& e, const stage& s, int node);

}  // namespace turnwright::supply::kernel
