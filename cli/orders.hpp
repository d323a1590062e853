/// What the command line asks for: a plain struct for each command, read in desk.cpp, carried out beside it.
#pragma once

#include <turnwright/catalogue/catalogue.hpp>
#include <turnwright/plan/shop.hpp>

#include <iosfwd>
#include <optional>
#include <string>
#include <vector>

namespace turnwright::cli {

/// Exit status of the tool.
enum status { done = 0, cannot_be_met = 1, input_wrong = 2, own_failure = 3 };

/// Where results go and whether they may replace a file.
struct output_wish {
  std::optional<std::string> json;  ///< "-" for standard output
  bool force = false;
};

struct plan_order {
  std::optional<std::string> job;  ///< a file, or "-" for standard input
  std::string mains;
  std::vector<std::string> windings;
  std::optional<std::string> write_job;
  std::optional<std::string> sheet, tests;  ///< not yet
  std::vector<std::string> accept;
  bool workings = false;
  output_wish output;
};

struct supply_order {
  std::optional<std::string> job;       ///< a file, or "-" for standard input
  std::optional<std::string> mains;     ///< other volts at the wall
  std::vector<std::string> rectifiers;  ///< "HT=GZ34", or "silicon" where there is one rail
  std::vector<std::string> reservoirs;  ///< "HT=47 uF"
  std::vector<std::string> loads;       ///< "HT/A=120 mA"
  std::optional<std::string> waveform;  ///< file for the drawing
  bool workings = false;
  output_wish output;
};

struct table_order {
  std::optional<std::string> name;
  std::optional<std::string> at, frequency;  ///< of a steel
  bool standing = false;                     ///< of each figure of a valve
  std::string csv;                           ///< name of a table, "." for the command's own; empty: not asked for
  output_wish output;
};

/// Each returns the exit status; results go to `out`, everything else to `aside`. They throw `refused` for wrong input.
status run_plan(const plan_order& order, const catalogue& tables, const shop& s, std::ostream& out,
                std::ostream& aside);
status run_supply(const supply_order& order, const catalogue& tables, const shop& s, std::ostream& out);
status run_wire(const table_order& order, const catalogue& tables, const shop& s, std::ostream& out);
status run_core(const table_order& order, const catalogue& tables, const shop& s, std::ostream& out);
status run_steel(const table_order& order, const catalogue& tables, const shop& s, std::ostream& out);
status run_valve(const table_order& order, const catalogue& tables, const shop& s, std::ostream& out);

/// Reads the command line and carries it out; never throws.
status serve(int argc, const char* const* argv, std::ostream& out, std::ostream& aside);

}  // namespace turnwright::cli
