#include "bench/cases.hpp"
#include "bench/report.hpp"
#include "bench/whole.hpp"
#include "reference/bench.hpp"
#include "reference/tracer.hpp"

#include <lightledger/trace/instruction_set.hpp>

#include <benchmark/benchmark.h>
#include <fmt/format.h>

#include <cmath>
#include <cstring>
#include <map>
#include <memory>
#include <stdexcept>

/// Speed of the kernel against the textbook, in one run: tools/bench calls it.
namespace lightledger::bench {
namespace {

constexpr int surfaces = 20;

trace::RayBlock block_for(const Case& one) {
  return launched(one);
}

/// All instruction sets agree before any of them is timed.
void check(const Case& one, const trace::RayBlock& block) {
  trace::use(trace::InstructionSet::portable);
  const double expected = run(one, block, 1);
  for (const trace::InstructionSet set : trace::instruction_sets) {
    if (!trace::available(set))
      continue;
    trace::use(set);
    const double found = run(one, block, 1);
    if (!(expected > 0.0 && std::abs(found - expected) < 1e-12 * static_cast<double>(block.count)))
      throw std::runtime_error(
          fmt::format("{} on {}: {:.17g}, portable {:.17g}", one.kind, trace::name(set), found, expected));
  }
}

/// The textbook's power at the detector for unpolarized light is the kernel's where no aperture cuts.
double delivered(const std::vector<TextbookFace>& faces, double wavelength_nm, const trace::RayBlock& block) {
  double sum = 0.0;
  for (int lane = 0; lane < block.count; ++lane) {
    TextbookRay ray{{block.p[0][lane], block.p[1][lane], block.p[2][lane]},
                    {block.d[0][lane], block.d[1][lane], block.d[2][lane]}};
    trace(faces, wavelength_nm, ray);
    sum += 0.5 * (ray.polarization.squaredNorm() - 1.0); // without the part along the ray
  }
  return sum;
}

void check_textbook(const Case& one, const trace::RayBlock& block) {
  trace::use(trace::InstructionSet::portable);
  const double expected = run(one, block, 1);
  const double found = delivered(textbook(one), one.train.plans.front().wavelength_nm, block);
  if (!(std::abs(found - expected) < 1e-9 * expected))
    throw std::runtime_error(
        fmt::format("textbook of {}: {:.17g}, kernel {:.17g}", one.kind, found, expected));
}

void time_kernel(benchmark::State& state, const Case& one, trace::InstructionSet set) {
  trace::use(set);
  const trace::RayBlock block = block_for(one);
  const int rounds = set == trace::InstructionSet::portable ? 2 : 50;
  for (auto _ : state)
    benchmark::DoNotOptimize(run(one, block, rounds));
  state.SetItemsProcessed(state.iterations() * rounds * block.count *
                          static_cast<std::int64_t>(one.train.path.steps.size()));
}

void time_textbook(benchmark::State& state, const Case& one) {
  const trace::RayBlock block = block_for(one);
  const std::vector<TextbookFace> faces = textbook(one);
  const double wavelength_nm = one.train.plans.front().wavelength_nm;
  for (auto _ : state)
    benchmark::DoNotOptimize(delivered(faces, wavelength_nm, block));
  state.SetItemsProcessed(state.iterations() * block.count * static_cast<std::int64_t>(faces.size()));
}

/// The full textbook tracer of the tests: ledger, apertures, both beams' powers.
void time_reference(benchmark::State& state, const Case& one) {
  const trace::RayBlock block = block_for(one);
  const reference::Bench bench = reference::lay_out(*one.assembly);
  const double wavelength_nm = one.train.plans.front().wavelength_nm;
  for (auto _ : state)
    for (int lane = 0; lane < block.count; ++lane) {
      const reference::Ray ray{{block.p[0][lane], block.p[1][lane], block.p[2][lane]},
                               {block.d[0][lane], block.d[1][lane], block.d[2][lane]}};
      benchmark::DoNotOptimize(reference::trace(bench, *one.assembly, wavelength_nm, ray));
    }
  state.SetItemsProcessed(state.iterations() * block.count *
                          static_cast<std::int64_t>(one.train.path.steps.size()));
}

bool in_textbook(const std::string& kind) {
  return kind == "sphere" || kind.starts_with("layers");
}

void add(const std::string& name, auto timed) {
  benchmark::RegisterBenchmark(name.c_str(), timed)
      ->Repetitions(7)
      ->ReportAggregatesOnly(false)
      ->MinTime(0.03);
}

void register_all(const std::vector<Case>& cases) {
  for (const Case& one : cases) {
    check(one, block_for(one));
    for (const trace::InstructionSet set : trace::instruction_sets)
      if (trace::available(set))
        add(fmt::format("{}/{}", one.kind, trace::name(set)),
            [&one, set](benchmark::State& state) { time_kernel(state, one, set); });
    if (!in_textbook(one.kind))
      continue;
    check_textbook(one, block_for(one));
    add(one.kind + "/textbook", [&one](benchmark::State& state) { time_textbook(state, one); });
    add(one.kind + "/reference", [&one](benchmark::State& state) { time_reference(state, one); });
  }
}

trace::InstructionSet fastest() {
  for (const trace::InstructionSet set : trace::instruction_sets)
    if (trace::available(set))
      return set;
  return trace::InstructionSet::portable;
}

int main(int argc, char** argv) {
  std::string json;
  for (int i = 1; i + 1 < argc; ++i)
    if (std::strcmp(argv[i], "--json") == 0)
      json = argv[i + 1];
  std::vector<Case> cases;
  for (const std::string& kind : kinds())
    cases.push_back(make(kind, surfaces));
  register_all(cases);
  Speeds speeds;
  int count = 1;
  benchmark::Initialize(&count, argv);
  benchmark::RunSpecifiedBenchmarks(&speeds);
  trace::use(fastest());
  const Whole whole = measure_whole(argv[0]);
  print(speeds, whole);
  if (!json.empty())
    write_json(speeds, whole, json);
  return 0;
}

} // namespace
} // namespace lightledger::bench

int main(int argc, char** argv) {
  try {
    return lightledger::bench::main(argc, argv);
  } catch (const std::exception& error) {
    fmt::print(stderr, "bench: {}\n", error.what());
    return 1;
  }
}
