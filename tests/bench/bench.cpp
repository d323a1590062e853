/// Speed, measured and never asserted: run turnwright_bench by hand.
#include <benchmark/benchmark.h>

#include <chrono>
#include <fstream>
#include <sstream>

#include <turnwright/job/job.hpp>
#include <turnwright/job/result.hpp>
#include <turnwright/plan/plan.hpp>
#include <turnwright/sheet/report.hpp>

#include "supply_cases.hpp"

using namespace turnwright;

namespace {

const catalogue& tables() {
  static const catalogue c = catalogue::bundled();
  return c;
}
const shop& tools() {
  static const shop s(tables());
  return s;
}

std::string example(const char* name) {
  std::ifstream in(std::string(TURNWRIGHT_EXAMPLES) + "/" + name + ".json");
  std::ostringstream text;
  text << in.rdbuf();
  return text.str();
}

supply::network amplifier_network() {
  supply::network net{volts_rms{as<volts>(230)},
                      as<hertz>(50),
                      as<ohms>(0.5),
                      as<ohms>(5.7),
                      as<henries>(0),
                      as<ohms>(5e3),
                      as<henries>(6.4),
                      {},
                      {},
                      {}};
  for (const auto& [n, r, load] :
       {std::tuple{657, 39.1, 2060.0}, {657, 41.5, 2060.0}, {10, 0.09, 2.6}, {12, 0.036, 1.5}}) {
    net.ports.push_back({n / 430.0, as<ohms>(r), as<ohms>(load), std::nullopt});
  }
  net.leakage.assign(16, as<henries>(1e-3));
  for (std::size_t k = 0; k < 4; ++k) net.leakage[k * 5] = as<henries>(5e-3);
  return net;
}

supply::kernel::network_si amplifier_kernel() {
  return {230,
          314.159265358979,
          0.5,
          5.7,
          0,
          1 / 5e3,
          1 / 2e3,
          {{657 / 430.0, 39.1, 2060, -1},
           {657 / 430.0, 41.5, 2060, -1},
           {10 / 430.0, 0.09, 2.6, -1},
           {12 / 430.0, 0.036, 1.5, -1}},
          {5e-3, 1e-3, 1e-3, 1e-3, 1e-3, 5e-3, 1e-3, 1e-3, 1e-3, 1e-3, 5e-3, 1e-3, 1e-3, 1e-3, 1e-3, 5e-3}};
}

void network_through_the_door(benchmark::State& state) {
  const supply::network net = amplifier_network();
  for (auto _ : state) benchmark::DoNotOptimize(supply::solve_sine(net).primary_current);
}
BENCHMARK(network_through_the_door);

void network_kernel(benchmark::State& state) {
  const supply::kernel::network_si net = amplifier_kernel();
  for (auto _ : state) benchmark::DoNotOptimize(supply::kernel::solve(net).i1);
}
BENCHMARK(network_kernel);

// An evaluation: one drafted coil brought to its balance of heat.
void one_evaluation(benchmark::State& state) {
  const demand d = read_job(example("two-el34"), "example", tools(), tables());
  const design p = plan(d, tools());
  for (auto _ : state) benchmark::DoNotOptimize(run(d, p.made.coil, p.made.nominal.at, 1.0).residual_K);
  state.counters["heat_steps"] = p.made.nominal.steps;
}
BENCHMARK(one_evaluation);

// What passing through the quantity-typed door costs of an evaluation: one network in, one state out.
void door_share_of_an_evaluation(benchmark::State& state) {
  const demand d = read_job(example("two-el34"), "example", tools(), tables());
  const design p = plan(d, tools());
  const supply::network net = amplifier_network();
  const supply::kernel::network_si si = amplifier_kernel();
  using clock = std::chrono::steady_clock;
  const auto timed = [](auto what) {
    const auto from = clock::now();
    for (int i = 0; i < 200; ++i) what();
    return std::chrono::duration<double>(clock::now() - from).count();
  };
  double through = 0, kernel_only = 0, evaluation = 0;
  for (auto _ : state) {
    through += timed([&] { benchmark::DoNotOptimize(supply::solve_sine(net).primary_current); });
    kernel_only += timed([&] { benchmark::DoNotOptimize(supply::kernel::solve(si).i1); });
    evaluation += timed([&] { benchmark::DoNotOptimize(run(d, p.made.coil, p.made.nominal.at, 1.0).residual_K); });
  }
  state.counters["door_percent"] = 100 * (through - kernel_only) / evaluation;
}
BENCHMARK(door_share_of_an_evaluation)->Unit(benchmark::kMillisecond);

void plan_with_its_core_named(benchmark::State& state) {
  const demand d = read_job(example("two-el34"), "example", tools(), tables());
  for (auto _ : state) benchmark::DoNotOptimize(plan(d, tools()).windable);
}
BENCHMARK(plan_with_its_core_named)->Unit(benchmark::kMillisecond);

void plan_that_chooses_its_core(benchmark::State& state) {
  const demand d = read_job(example("single-ended"), "example", tools(), tables());
  for (auto _ : state) benchmark::DoNotOptimize(plan(d, tools()).windable);
}
BENCHMARK(plan_that_chooses_its_core)->Unit(benchmark::kMillisecond);

void loading_all_tables(benchmark::State& state) {
  for (auto _ : state) {
    const catalogue c = catalogue::bundled();
    benchmark::DoNotOptimize(shop(c).steels.all().size());
  }
}
BENCHMARK(loading_all_tables)->Unit(benchmark::kMillisecond);

// From element values to all figures of the periodic state, at the one setting that the tests are held to.
void periodic(benchmark::State& state, const supply::network& net) {
  int cycles = 0;
  for (auto _ : state) {
    const supply::state s = supply::solve_periodic(net);
    benchmark::DoNotOptimize(s.balance_ratio);
    cycles = s.cycles;
  }
  state.counters["cycles"] = cycles;
}
const auto* const single_ht = benchmark::RegisterBenchmark("supply/single_ht", periodic, supply_cases::single_ht());
const auto* const full_amplifier =
    benchmark::RegisterBenchmark("supply/full_amplifier", periodic, supply_cases::full_amplifier());
const auto* const doubler = benchmark::RegisterBenchmark("supply/doubler", periodic, supply_cases::doubler());
const auto* const choke_input =
    benchmark::RegisterBenchmark("supply/choke_input", periodic, supply_cases::choke_input());

// Three seconds of mains after switching on with cold valves.
void switching_on(benchmark::State& state) {
  const supply::network net = supply_cases::full_amplifier();
  for (auto _ : state) benchmark::DoNotOptimize(supply::switch_on(net, as<seconds>(3)).diode_peak.size());
}
BENCHMARK(switching_on)->Unit(benchmark::kMillisecond);

}  // namespace

BENCHMARK_MAIN();
