#include "bench/cases.hpp"

#include <lightledger/assembly/load.hpp>
#include <lightledger/optics/polarization.hpp>
#include <lightledger/trace/interact.hpp>
#include <lightledger/trace/ledger.hpp>

#include <fmt/format.h>

#include <stdexcept>

namespace lightledger::bench {
namespace {

constexpr const char* materials = R"(media:
  glass: {index: 1.52}
coatings:
  layers1: {layers: [{medium: MgF2-film, waves: 0.25, at: 532}]}
  layers4: {layers: [{medium: MgF2-film, waves: 0.25, at: 532}, {medium: Ta2O5, waves: 0.5, at: 532},
                     {medium: SiO2, waves: 0.3, at: 532}, {medium: MgF2-film, waves: 0.25, at: 532}]}
  layers20: {layers: [{repeat: 10, layers: [{medium: TiO2, waves: 0.13, at: 532},
                                            {medium: SiO2, waves: 0.21, at: 532}]}]}
)";

std::string surface(const std::string& kind, int number) {
  if (kind == "mirror")
    return fmt::format(
        "  - {{name: s{}, does: reflect, backing: Al, tilt: [0, 3, 0], clear: {{diameter: 90}}, gap: 3}}\n",
        number);
  const bool front = number % 2 == 0;
  std::string form = fmt::format("radius: {}", front ? 500 : -700);
  if (kind == "plane")
    form = "shift: [0, 0]";
  if (kind == "conic")
    form += ", conic: -0.5";
  if (kind == "asphere")
    form += ", conic: -0.3, asphere: {A4: 1e-6, A6: 1e-9, A8: 1e-12}";
  if (kind == "tilted")
    form += ", tilt: [2, 1, 0]";
  if (kind.starts_with("layers"))
    form += ", coating: " + kind;
  return fmt::format("  - {{name: s{}, {}, into: {}, clear: {{diameter: 40}}, gap: 3}}\n", number, form,
                     front ? "glass" : "air");
}

std::string file(const std::string& kind, int surfaces, int wavelengths) {
  std::string text =
      fmt::format("light:\n  wavelengths: {{from: 532, to: {}, count: {}}}\n  beam: {{radius: 5}}\n"
                  "  fields: [[0.3, 0.2]]\n  rays: {{pattern: scattered, count: 65536}}\n{}train:\n",
                  532 + 10 * (wavelengths - 1), wavelengths, materials);
  for (int number = 0; number < surfaces; ++number)
    text += surface(kind, number);
  return text + "  - {name: detector, does: detect, clear: {diameter: 90}}\n";
}

} // namespace

const std::vector<std::string>& kinds() {
  static const std::vector<std::string> all = {"sphere", "layers1", "layers4", "layers20", "mirror",
                                               "conic",  "asphere", "tilted",  "plane"};
  return all;
}

Case make(const std::string& kind, int surfaces, int wavelengths) {
  assembly::Loaded loaded = assembly::load_text("bench.yaml", file(kind, surfaces, wavelengths));
  if (!loaded.assembly)
    throw std::runtime_error(loaded.report());
  auto assembly = std::make_unique<assembly::Assembly>(std::move(*loaded.assembly));
  assembly::Faults faults;
  auto train = trace::prepare(*assembly, faults);
  if (!train)
    throw std::runtime_error(faults.kept().front().message);
  return {kind, std::move(assembly), std::move(*train)};
}

trace::RayBlock launched(const Case& one) {
  const assembly::Light& light = one.assembly->light;
  const trace::Pupil pupil(light);
  const trace::Launcher launcher(trace::Source(light, light.fields.front()), pupil,
                                 one.train.footprints.front());
  trace::RayBlock block;
  launcher.fill(block, 0, 0, trace::RayBlock::lanes);
  return block;
}

double run(const Case& one, const trace::RayBlock& launched, int rounds) {
  const trace::Plan& plan = one.train.plans.front();
  const optics::Coherency coherency = optics::coherency(one.assembly->light.polarization);
  trace::Ledger ledger(one.assembly->stations.size());
  for (int round = 0; round < rounds; ++round) {
    trace::RayBlock block = launched;
    for (const trace::Path::Step& step : one.train.path.steps) {
      trace::Entry entry;
      trace::StepOut out;
      out.entry = &entry;
      out.bounces = step.act == trace::Act::bounce;
      (out.bounces ? out.bounce : out.pass) = &block;
      trace::interact(plan.legs[step.leg], plan.ops[step.op], coherency, block, out);
      ledger.enter(step.visit, entry);
    }
  }
  return ledger.delivered() / rounds;
}

std::vector<TextbookFace> textbook(const Case& one) {
  const trace::Plan& plan = one.train.plans.front();
  std::vector<TextbookFace> faces;
  for (const trace::Path::Step& step : one.train.path.steps) {
    if (step.act != trace::Act::pass)
      break;
    const trace::PlanOp& op = plan.ops[step.op];
    TextbookFace face{op.curvature, faces.empty() ? 0.0 : 3.0, op.n1, op.n2, {}};
    for (std::uint32_t k = 0; k < op.layer_count; ++k)
      face.films.push_back({{op.layers[k].n, op.layers[k].kappa}, op.layers[k].thickness_nm});
    faces.push_back(face);
  }
  return faces;
}

} // namespace lightledger::bench
