#include <turnwright/insulation/practice.hpp>

#include <algorithm>

#include <turnwright/measure/written.hpp>
#include <turnwright/remark/wording.hpp>

namespace turnwright {
namespace {

template <class Read>
void each_row(const table& t, std::vector<remark>& faults, Read read) {
  for (const row& r : t.rows) {
    try {
      read(r);
    } catch (const refused& why) {
      faults.insert(faults.end(), why.remarks().begin(), why.remarks().end());
    }
  }
}

// The first row whose working volts are not below v; beyond the last the last, scaled up.
template <class Row>
double stepped(const std::vector<Row>& rows, double v, double Row::*column) {
  for (const Row& r : rows) {
    if (v <= r.working_v + 1e-9) return r.*column;
  }
  return rows.back().*column * v / rows.back().working_v;
}

}  // namespace

insulation_book::insulation_book(const catalogue& tables) {
  std::vector<remark> faults;
  each_row(tables.named("margins_by_gauge"), faults, [&](const row& r) {
    gauges_.push_back(
        {r.needed("bare_least_mm") * 1e-3, r.needed("margin_mm") * 1e-3, r.needed("interlayer_mm") * 1e-3});
  });
  each_row(tables.named("margins_by_volts"), faults, [&](const row& r) {
    volts_.push_back({r.needed("working_v_rms"), r.needed("margin_mm") * 1e-3});
  });
  each_row(tables.named("test_volts"), faults, [&](const row& r) {
    tests_.push_back({r.needed("working_v_rms"), r.needed("basic_v_rms"), r.needed("reinforced_v_rms")});
  });
  each_row(tables.named("wire_breakdown"), faults, [&](const row& r) {
    breakdowns_.push_back(
        {r.needed("bare_mm") * 1e-3, {r.number("grade1_v_rms"), r.number("grade2_v_rms"), r.number("grade3_v_rms")}});
  });
  if (gauges_.empty() || volts_.empty() || tests_.empty()) {
    faults.push_back(wording::missing("insulation tables", "at least one row in each"));
  }
  if (!faults.empty()) throw refused(std::move(faults));
  std::sort(gauges_.begin(), gauges_.end(),
            [](const by_gauge& a, const by_gauge& b) { return a.bare_least_m > b.bare_least_m; });
  std::sort(volts_.begin(), volts_.end(),
            [](const by_volts& a, const by_volts& b) { return a.working_v < b.working_v; });
  std::sort(tests_.begin(), tests_.end(), [](const test& a, const test& b) { return a.working_v < b.working_v; });
  std::sort(breakdowns_.begin(), breakdowns_.end(),
            [](const breakdown& a, const breakdown& b) { return a.bare_m < b.bare_m; });
}

reasoned_length insulation_book::end_margin(metres bare, volts_rms working) const {
  const auto at =
      std::find_if(gauges_.begin(), gauges_.end(), [&](const by_gauge& g) { return plain(bare) >= g.bare_least_m; });
  const double gauge_m = (at == gauges_.end() ? gauges_.back() : *at).margin_m;
  const double volts_m = stepped(volts_, plain(working.plain()), &by_volts::margin_m);
  if (volts_m > gauge_m) {
    return {as<metres>(volts_m),
            "creepage at " + fixed(plain(working.plain()), 0) + " V r.m.s. working, basic insulation"};
  }
  return {as<metres>(gauge_m), "for the gauge, so that the end turns stay on the paper"};
}

reasoned_length insulation_book::interlayer(metres bare, volts_rms between_layers) const {
  const auto at =
      std::find_if(gauges_.begin(), gauges_.end(), [&](const by_gauge& g) { return plain(bare) >= g.bare_least_m; });
  const metres paper = as<metres>((at == gauges_.end() ? gauges_.back() : *at).interlayer_m);
  const metres least = as<metres>(0.05e-3);
  if (plain(between_layers.plain()) > 100 && paper < least) {
    return {least, "over 100 V r.m.s. from layer to layer"};
  }
  return {paper, "for the gauge"};
}

volts_rms insulation_book::test_basic(volts_rms working) const {
  return volts_rms{as<volts>(stepped(tests_, plain(working.plain()), &test::basic_v))};
}

volts_rms insulation_book::test_reinforced(volts_rms working) const {
  return volts_rms{as<volts>(stepped(tests_, plain(working.plain()), &test::reinforced_v))};
}

std::optional<volts_rms> insulation_book::enamel_breakdown(metres bare, int grade) const {
  if (grade < 1 || grade > 3) return std::nullopt;
  for (const breakdown& b : breakdowns_) {          // an intermediate size takes the figure of the next larger one
    if (plain(bare) > b.bare_m + 0.5e-6) continue;  // sizes count to 0.001 mm
    const auto v = b.grade_v[grade - 1];
    return v ? std::optional(volts_rms{as<volts>(*v)}) : std::nullopt;
  }
  return std::nullopt;
}

}  // namespace turnwright
