/// Laws that every plan has to keep, found again from its own JSON for thousands of random jobs.
#include <algorithm>
#include <cmath>
#include <numbers>

#include <nlohmann/json.hpp>

#include <turnwright/job/job.hpp>
#include <turnwright/job/result.hpp>
#include <turnwright/plan/plan.hpp>
#include <turnwright/sheet/columns.hpp>
#include <turnwright/sheet/report.hpp>

#include "near.hpp"
#include "random_job.hpp"

using namespace turnwright;
using nlohmann::json;

namespace {

#ifdef NDEBUG
constexpr int named_jobs = 2000, open_jobs = 40, rail_jobs = 150, open_rail_jobs = 6;
#else
constexpr int named_jobs = 100, open_jobs = 2, rail_jobs = 6, open_rail_jobs = 0;  // the sanitizers are slow
#endif

const catalogue& tables() {
  static const catalogue c = catalogue::bundled();
  return c;
}
const shop& tools() {
  static const shop s(tables());
  return s;
}

design planned(const json& job) { return plan(read_job(job.dump(), "job", tools(), tables()), tools()); }

double area_mm2(const json& wire) {
  return std::numbers::pi / 4 * std::pow(wire["bare_mm"].get<double>(), 2) * wire["strands"].get<int>();
}

void no_missing_figure(const json& node) {
  if (node.is_structured()) {
    for (const auto& item : node) no_missing_figure(item);
  }
  REQUIRE_FALSE(node.is_null());
}

// A winding of several wires: each section by itself, and their sum the whole.
void check_sections(const json& w) {
  double ohms = 0, mass = 0, length = 0;
  for (const json& s : w["sections"]) {
    const double l = s["length_m"];
    ohms += l / (58 * area_mm2(s["wire"]));
    mass += l * area_mm2(s["wire"]) * 8890e-6;
    length += l;
  }
  REQUIRE(w["length_m"].get<double>() == Approx(length).epsilon(1e-6));
  REQUIRE(w["resistance_20C_ohm"].get<double>() == Approx(ohms).epsilon(1e-6));
  REQUIRE(w["mass_kg"].get<double>() == Approx(mass).epsilon(1e-6));
}

void check_windings(const json& r) {
  for (const json& w : r["windings"]) {
    if (w.contains("kind")) continue;
    INFO(w["name"]);
    REQUIRE(w["turns"].is_number_integer());
    REQUIRE(w["turns"] >= 1);
    REQUIRE(w["layers"].get<int>() * w["turns_per_layer"].get<int>() >= w["turns"].get<int>());
    REQUIRE(w["turns"].get<int>() * w["mean_turn_mm"].get<double>() * 1e-3 ==
            Approx(w["length_m"].get<double>()).epsilon(1e-6));
    if (w.contains("sections")) {
      check_sections(w);
      continue;
    }
    const double ohms = w["length_m"].get<double>() / (58 * area_mm2(w["wire"]));
    REQUIRE(w["resistance_20C_ohm"].get<double>() == Approx(ohms).epsilon(1e-6));
    REQUIRE(w["current_A"].get<double>() / area_mm2(w["wire"]) ==
            Approx(w["current_density_A_per_mm2"].get<double>()).epsilon(1e-6));
    if (w.contains("mass_kg")) {
      REQUIRE(w["mass_kg"].get<double>() * w["resistance_20C_ohm"].get<double>() ==
              Approx(8890e-6 / 58 * std::pow(w["length_m"].get<double>(), 2)).epsilon(1e-5));
    }
  }
}

// Pitch and layers: what the window holds, found again from margins, diameters and counts.
void check_pitch(const json& r) {
  const double width = r["window"]["winding_width_mm"];
  if (!r["window"]["fits"].get<bool>()) return;
  for (const json& w : r["windings"]) {
    if (w.contains("kind") || w.contains("tap_of")) continue;
    const double pitch = w["wire"]["overall_mm"].get<double>() * w["wire"]["strands"].get<int>();
    if (!w.contains("sections"))
      REQUIRE((w["turns_per_layer"].get<int>() + 1) * pitch <= width - 2 * w["margin_mm"].get<double>() + 1e-6);
    const int before_last = w["turns"].get<int>() - w["last_layer_turns"].get<int>();
    if (!w.contains("sections")) REQUIRE(before_last == (w["layers"].get<int>() - 1) * w["turns_per_layer"].get<int>());
  }
}

void check_flux(const json& job, const json& r) {
  const double f = std::stod(job["mains"]["frequency"].get<std::string>()),
               over = std::stod(job["mains"]["tolerance"].get<std::string>()) / 100;
  const double area = r["core"]["net_area_mm2"].get<double>() * 1e-6;
  double worst = 0;
  for (const json& s : r["settings"]) {
    const double b =
        std::stod(s["at"].get<std::string>()) / (std::sqrt(2.0) * std::numbers::pi * f * s["turns"].get<int>() * area);
    REQUIRE(s["flux_density_T"].get<double>() == Approx(b).epsilon(1e-6));
    worst = std::max(worst, b * (1 + over));
  }
  REQUIRE(r["core"]["flux_density_high_T"].get<double>() == Approx(worst).epsilon(1e-6));
}

void check_volts_per_turn(const json& r) {
  const double per_turn = r["volts_per_turn_V"];
  for (const json& w : r["windings"]) {
    if (!w.contains("kind"))
      REQUIRE(w["voltage_no_load_V"].get<double>() / w["turns"].get<int>() == Approx(per_turn).epsilon(1e-6));
  }
}

void check_power(const json& r) {
  const json& loss = r["losses"];
  REQUIRE(loss["copper_W"].get<double>() + loss["core_W"].get<double>() ==
          Approx(loss["total_W"].get<double>()).epsilon(1e-7));
  // Phasors close exactly; behind rectifiers the periodic state is found within its tolerance.
  REQUIRE(
      r["input_W"].get<double>() ==
      Approx(r["output_W"].get<double>() + loss["total_W"].get<double>()).epsilon(r.contains("rails") ? 1e-3 : 1e-6));
  double copper = 0;
  for (const json& w : r["windings"]) copper += w.value("loss_W", 0.0);
  REQUIRE(copper == Approx(loss["copper_W"].get<double>()).epsilon(1e-6));
  double material = 0, wound = 0;
  for (const json& m : r["materials"])
    material += m["what"].get<std::string>().rfind("wire ", 0) == 0 ? m["mass_kg"].get<double>() : 0.0;
  for (const json& w : r["windings"]) wound += w.value("mass_kg", 0.0);
  REQUIRE(material == Approx(1.05 * wound).epsilon(1e-6));  // a twentieth for waste
}

// Loss of each winding from its hot ohms and amps; no-load power from core loss and the primary's cold ohms.
void check_losses(const json& job, const json& r) {
  for (const json& w : r["windings"]) {
    const bool shared = job.dump().find("tap_of") != std::string::npos && w["name"] == "HT";
    if (w.contains("kind") || w.contains("tap_of") || w.contains("sections") || shared) continue;
    INFO(w["name"]);
    double watts = 0;
    const bool halves_alone = w.contains("halves") && w["name"] == "HT";
    if (halves_alone) {
      for (const json& h : w["halves"])
        watts += h["resistance_hot_ohm"].get<double>() * std::pow(h["current_A"].get<double>(), 2);
    } else if (w["name"].get<std::string>().rfind("primary", 0) != 0) {
      watts = w["resistance_hot_ohm"].get<double>() * std::pow(w["current_A"].get<double>(), 2);
    } else {
      continue;  // beyond the tap in use a primary carries nothing
    }
    REQUIRE(w["loss_W"].get<double>() == Approx(watts).epsilon(1e-5));
    // hot over cold by (234.5 + T) / 254.5 lies between that of the ambient and that of the highest mains
    const double hot = w["resistance_hot_ohm"].get<double>() / w["resistance_20C_ohm"].get<double>();
    const double ambient = r["thermal"]["ambient_C"];
    const double hair = r.contains("rails") ? 1e-3 : 1e-9;
    REQUIRE(hot >= (234.5 + ambient) / 254.5 - hair);
    REQUIRE(hot <= (234.5 + ambient + w["rise_K"].get<double>()) / 254.5 + hair);
  }
  if (job["primary"].contains("taps") && job["primary"]["taps"].size() == 1) {
    const double idle = r["core"]["no_load_current_A"];
    REQUIRE(r["core"]["no_load_power_W"].get<double>() ==
            Approx(r["core"]["no_load_core_loss_W"].get<double>() +
                   idle * idle * r["windings"][0]["resistance_20C_ohm"].get<double>())
                .epsilon(1e-6));
  }
}

// Ampere-turns balance: the primary's are those of all loads and of the no-load current together. The phases differ by
// what leakage turns them, so in magnitudes this is the triangle's inequality, and close to equality from above.
void check_ampere_turns(const design& p) {
  double referred = 0;
  const auto ports = ports_of(p.wanted, p.made.coil);
  const double n1 = turns_in_use(p.made.nominal.at, p.made.coil.n.primary).count();
  for (std::size_t k = 0; k < ports.size(); ++k) {
    referred += plain(p.made.nominal.electric.ports[k].current.plain()) * (ports[k].to - ports[k].from).count() / n1;
  }
  const double line = plain(p.made.nominal.electric.primary_current.plain());
  const double no_load = std::hypot(plain(p.made.nominal.magnetising.plain()),
                                    plain(p.made.nominal.core_loss) / plain(p.made.nominal.electric.emf.plain()));
  const bool rails = !p.supply.rails.empty();  // their halves take turns, so that amperes add to less
  REQUIRE(line <= (referred + no_load) * (1 + (rails ? 1e-3 : 1e-9)));
  if (p.windable && !rails) REQUIRE(line >= 0.97 * referred);
}

void check_report(const design& p) {
  const std::string text = report_of(p, true);
  std::size_t from = 0;
  while (from < text.size()) {
    const std::size_t to = text.find('\n', from);
    const std::string line = text.substr(from, to - from);
    INFO(line);
    REQUIRE(shown_width(line) <= paper_width);
    REQUIRE((line.empty() || line.back() != ' '));
    REQUIRE(line.find("nan") == std::string::npos);
    from = to + 1;
  }
}

// Rails: volts in their order, no less current in a winding than its circuit allows, targets within half a turn.
void check_rails(const json& job, const design& p) {
  for (const planned_rail& rail : p.supply.rails) {
    INFO(rail.winding);
    for (const planned_node& n : rail.nodes) {
      REQUIRE(plain(n.full.mean.plain()) <= plain(n.idle.plain()) * 1.001);
      REQUIRE(plain(n.idle.plain()) <= plain(n.switch_on.plain()) * 1.001);
      const bool doubled = rail.wish.kind == supply::circuit::full_wave_doubler;
      const double crest = plain(peak_of_sine(rail.each_anode).plain()) * (1 + p.wanted.mains.over_ratio);
      REQUIRE(plain(n.switch_on.plain()) <=
              crest * (doubled ? 2 : 1) * 2);  // a choke without a load may swing to twice
    }
    const planned_winding& w =
        *std::find_if(p.windings.begin(), p.windings.end(), [&](const auto& x) { return x.name == rail.winding; });
    double dc = 0;
    for (const planned_node& n : rail.nodes) dc += plain(n.full.load.plain());
    const double least = rail.wish.kind == supply::circuit::full_wave_centre_tap ? 1 / std::sqrt(2.0)
                         : rail.wish.kind == supply::circuit::half_wave          ? std::sqrt(2.0)
                                                                                 : 1.0;
    REQUIRE(plain(w.current.plain()) >= 0.98 * least * dc);
    REQUIRE(plain(rail.worst.inverse.plain()) <= plain(rail.inverse_worst.plain()) * 1.001);
    if (!rail.off_target || !p.windable) continue;
    REQUIRE(rail.one_turn);
    REQUIRE(plain(*rail.one_turn) > 0);
    REQUIRE(std::abs(plain(*rail.off_target)) <= 0.52 * plain(*rail.one_turn));
  }
  REQUIRE(p.supply.states.size() == (job.dump().find("\"rail\"") == std::string::npos ? 3u : 9u));
  for (const supplied_state& s : p.supply.states) REQUIRE(s.settled);
}

void check_all(const json& job) {
  INFO(job.dump());
  const design p = planned(job);
  const json r = json::parse(json_of(p));
  no_missing_figure(r);
  check_windings(r);
  check_pitch(r);
  check_flux(job, r);
  check_volts_per_turn(r);
  check_power(r);
  check_losses(job, r);
  check_ampere_turns(p);
  check_rails(job, p);
  check_report(p);
  if (p.windable) {
    REQUIRE(r["window"]["fits"].get<bool>());
    REQUIRE(r["thermal"]["winding_rise_K"].get<double>() <= plain(p.wanted.limits.temperature_rise) * (1 + 1e-9));
    const double settled_K = p.supply.rails.empty() ? 1e-7 : 0.05;
    REQUIRE(p.made.nominal.residual_K < settled_K);
    REQUIRE(p.made.high.residual_K < settled_K);
    for (const check& c : p.checks) REQUIRE(c.weight != level::stop);
  } else {
    const bool says_why = std::any_of(p.checks.begin(), p.checks.end(),
                                      [](const check& c) { return c.weight == level::stop && !c.cure.empty(); });
    REQUIRE(says_why);
  }
}

}  // namespace

TEST_CASE("every plan keeps the laws of its trade, whatever the job", "[property]") {
  testing::job_dice dice(101);
  for (int i = 0; i < named_jobs; ++i) check_all(dice.job(true));
}

TEST_CASE("every plan whose core is open keeps them too", "[property]") {
  testing::job_dice dice(102);
  int windable = 0;
  for (int i = 0; i < open_jobs; ++i) {
    const json job = dice.job(false);
    check_all(job);
    windable += planned(job).windable ? 1 : 0;
  }
  CHECK(windable >= open_jobs * 3 / 4);
}

TEST_CASE("a plan with rails keeps the laws of its trade and of its rectifiers", "[property]") {
  testing::job_dice dice(104);
  for (int i = 0; i < rail_jobs; ++i) check_all(dice.rails_job(true));
  for (int i = 0; i < open_rail_jobs; ++i) check_all(dice.rails_job(false));
}

TEST_CASE("the same job gives the same bytes every time", "[property]") {
  testing::job_dice dice(103);
  for (int i = 0; i < 20; ++i) {
    const json job = dice.job(true);
    const json rails = dice.rails_job(true);
    if (i < 4) REQUIRE(json_of(planned(rails)) == json_of(planned(rails)));
    REQUIRE(json_of(planned(job)) == json_of(planned(job)));
    REQUIRE(report_of(planned(job), true) == report_of(planned(job), true));
  }
}
