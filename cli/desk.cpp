/// The only file that knows the command-line parser: options in, orders out, faults to exit statuses.
#include <iostream>

#include <CLI/CLI.hpp>

#include <turnwright/remark/wording.hpp>

#include "orders.hpp"

namespace turnwright::cli {
namespace {

struct shared_options {
  std::vector<std::string> folders;
  output_wish output;
  std::string json;
};

void add_shared(CLI::App& command, shared_options& o) {
  command.add_flag("--json{-}", o.json, "the result as JSON on standard output; --json=FILE writes it to a file")
      ->multi_option_policy(CLI::MultiOptionPolicy::Throw);
  command.add_flag("--force", o.output.force, "overwrite files that are there already");
  command.add_option("--tables", o.folders, "folder with the shop's own table rows, put in front of the bundled ones")
      ->take_all()
      ->expected(1);
}

void add_plan(CLI::App& app, shared_options& shared, plan_order& order, const CLI::App*& chosen) {
  CLI::App* c = app.add_subcommand("plan", "design one transformer that can be wound");
  c->add_option("JOB", order.job, "job file, or - for standard input");
  c->add_option("--mains", order.mains, "without a job file: the mains, such as \"230 V 50 Hz\"");
  c->add_option("--winding", order.windings,
                "without a job file: a winding, such as \"heaters: 6.3 V 4 A ct\"; once for each")
      ->take_all()
      ->expected(1);
  c->add_option("--write-job", order.write_job, "keep the job as a file");
  c->add_option("--sheet", order.sheet, "the winding sheet as a page (not yet)");
  c->add_option("--tests", order.tests, "a blank test card (not yet)");
  c->add_option("--accept", order.accept, "go on past the stop of this code; once for each")->take_all()->expected(1);
  c->add_flag("--workings", order.workings, "show iterations, residuals and rejected choices");
  add_shared(*c, shared);
  c->callback([c, &chosen] { chosen = c; });
}

void add_supply(CLI::App& app, shared_options& shared, supply_order& order, const CLI::App*& chosen) {
  CLI::App* c = app.add_subcommand("supply", "rectifiers, smoothing and loads behind a known or a planned transformer");
  c->add_option("JOB", order.job, "job file, or - for standard input; without a section \"known\" it is planned first")
      ->required();
  c->add_option("--mains", order.mains, "what if: other volts at the wall, such as \"253 V\"");
  const auto several = [&](const char* name, std::vector<std::string>& list, const char* about) {
    c->add_option(name, list, about)->take_all()->expected(1);
  };
  several("--rectifier", order.rectifiers, "what if: another rectifier, such as \"HT=silicon\"");
  several("--reservoir", order.reservoirs, "what if: another capacitor at the first node, such as \"HT=47 uF\"");
  several("--load", order.loads, "what if: another load at a node, such as \"HT/A=120 mA\"");
  c->add_option("--waveform", order.waveform, "one cycle of every rail as a drawing, in SVG");
  c->add_flag("--workings", order.workings, "show residuals");
  add_shared(*c, shared);
  c->callback([c, &chosen] { chosen = c; });
}

CLI::App* add_table(CLI::App& app, shared_options& shared, table_order& order, const std::string& name,
                    const std::string& about, const CLI::App*& chosen) {
  CLI::App* c = app.add_subcommand(name, about);
  c->add_option("NAME", order.name, "one row; without it the whole table");
  c->add_flag("--csv{.}", order.csv,
              "the table as the file it came from, to copy, edit and lay over; --csv=TABLE another one");
  add_shared(*c, shared);
  c->callback([c, &chosen] { chosen = c; });
  return c;
}

const std::vector<std::pair<std::string, std::string>> later_commands{
    {"survey", "plan every workable core and rank them"},
    {"rewind", "bench measurements of an unknown transformer to a job that rebuilds it"},
    {"convert", "an existing transformer on another mains"},
    {"proof", "bench readings against the plan"},
};

void show(const refused& why, std::ostream& aside) {
  for (const remark& r : why.remarks()) aside << worded(r) << '\n';
}

// The parser's complaint as one of ours.
status refuse_line(const CLI::ParseError& e, std::ostream& aside) {
  std::string words = e.what();
  for (char& c : words) c = c == '\n' ? ' ' : c;
  aside << "command line: " << words
        << " [usage]\n  hint: turnwright --help lists the commands, turnwright COMMAND --help its options\n";
  return input_wrong;
}

struct everything {
  CLI::App app{"Plans the winding of mains transformers for valve amplifiers."};
  shared_options shared;
  plan_order plan;
  supply_order supply;
  table_order table;
  const CLI::App* chosen = nullptr;
  std::string later;
};

void declare(everything& e) {
  e.app.set_version_flag("--version", "turnwright " TURNWRIGHT_VERSION);
  e.app.require_subcommand(1);
  e.app.name("turnwright");
  e.app.footer("Mains and HT kill: winding, wiring and testing are for trained people, under the local code.");
  add_plan(e.app, e.shared, e.plan, e.chosen);
  add_supply(e.app, e.shared, e.supply, e.chosen);
  add_table(e.app, e.shared, e.table, "wire",
            "the wire tables: a size, its figures and its neighbours in other systems", e.chosen);
  add_table(e.app, e.shared, e.table, "core", "the laminations", e.chosen);
  CLI::App* steel = add_table(e.app, e.shared, e.table, "steel", "the steels", e.chosen);
  steel->add_option("--at", e.table.at, "flux density to give field and loss at, such as \"1.37 T\"");
  steel->add_option("--frequency", e.table.frequency, "frequency for the loss; 50 Hz if absent");
  CLI::App* valve = add_table(e.app, e.shared, e.table, "valve", "rectifiers and the heaters of valves", e.chosen);
  valve->add_flag("--standing", e.table.standing, "add the standing of each figure");
  for (const auto& [name, about] : later_commands) {
    CLI::App* c = e.app.add_subcommand(name, about + " (not yet)");
    c->allow_extras();
    c->callback([&e, n = name] { e.later = n; });
  }
}

status carry_out(everything& e, std::ostream& out, std::ostream& aside) {
  if (!e.later.empty()) throw refused(wording::not_yet(e.later, "a command that is planned but not built"));
  if (!e.shared.json.empty()) e.shared.output.json = e.shared.json;
  e.plan.output = e.supply.output = e.table.output = e.shared.output;
  std::vector<std::filesystem::path> folders = table_folders_of_environment();
  folders.insert(folders.end(), e.shared.folders.begin(), e.shared.folders.end());
  const catalogue tables = catalogue::with_shop_rows(folders);
  const shop s(tables);
  const std::string name = e.chosen->get_name();
  if (name == "plan") return run_plan(e.plan, tables, s, out, aside);
  if (name == "supply") return run_supply(e.supply, tables, s, out);
  if (name == "wire") return run_wire(e.table, tables, s, out);
  if (name == "core") return run_core(e.table, tables, s, out);
  if (name == "valve") return run_valve(e.table, tables, s, out);
  return run_steel(e.table, tables, s, out);
}

}  // namespace

status serve(int argc, const char* const* argv, std::ostream& out, std::ostream& aside) {
  everything e;
  try {
    declare(e);
    e.app.parse(argc, argv);
    return carry_out(e, out, aside);
  } catch (const CLI::CallForVersion&) {
    out << "turnwright " TURNWRIGHT_VERSION "\n";
    return done;
  } catch (const CLI::Success& help) {
    e.app.exit(help, out, aside);
    return done;
  } catch (const CLI::ParseError& why) {
    return refuse_line(why, aside);
  } catch (const refused& why) {
    show(why, aside);
    return input_wrong;
  } catch (const std::exception& why) {
    aside << "turnwright failed, which is our fault and not the job's: " << why.what() << '\n';
    return own_failure;
  }
}

}  // namespace turnwright::cli
