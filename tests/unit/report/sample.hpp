#pragma once

#include <lightledger/analysis/budget.hpp>
#include <lightledger/assembly/assembly.hpp>

#include <string>

/// A small invented budget, made by hand, for the tests of the writers.
namespace lightledger::report::sample {

inline analysis::StationBudget station(std::string name, std::string does, double incident, double onward) {
  analysis::StationBudget row;
  row.name = std::move(name);
  row.does = std::move(does);
  row.incident = incident;
  row.onward = onward;
  return row;
}

inline assembly::Assembly assembly() {
  assembly::Assembly assembly;
  assembly.title = "Fog-bank lidar receiver";
  assembly.light.wavelengths = {{532.0}};
  assembly.light.polarization = optics::linear(0.0);
  return assembly;
}

/// Four stations: 0.0014 aside at a window, 0.0887 absorbed in a fold, 0.02 clipped and nearly nothing
/// scattered at a lens.
inline analysis::Budget budget() {
  auto window = station("window", "refract", 1.0, 0.9986);
  window.aside = 0.0014;
  window.transmittance = 0.9986;
  window.pass_s = window.pass_p = 0.9986;
  window.incidence = {0.0, 0.5, 1.25};
  auto fold = station("fold", "reflect", 0.9986, 0.9099);
  fold.absorbed = 0.0887;
  auto lens = station("lens", "refract", 0.9099, 0.88989);
  lens.clipped = 0.02;
  lens.scattered = 1e-5;
  const auto sensor = station("sensor", "detect", 0.88989, 0.88989);

  analysis::Budget budget;
  budget.delivered = 0.88989;
  budget.uncertainty = 1e-4;
  budget.rays = 16384;
  budget.closure_error = -2e-16;
  budget.stations = {window, fold, lens, sensor};
  budget.by_wavelength = {{532.0, 0.88989}};
  budget.by_field = {{std::nullopt, {0.0, 0.0}, 0.88989}};
  return budget;
}

} // namespace lightledger::report::sample
