#pragma once

#include <lightledger/assembly/assembly.hpp>
#include <lightledger/assembly/diagnostics.hpp>
#include <lightledger/trace/launch.hpp>
#include <lightledger/trace/plan.hpp>
#include <lightledger/trace/routes.hpp>

#include <array>
#include <optional>
#include <vector>

namespace lightledger::trace {

/// Where each field's rays cross the launch plane: the beam's disc, or with `fill_stop` the ellipse whose
/// edge fills the first stop. For the latter, real rays of the plan's wavelength are aimed at the +x, −x, +y,
/// −y edge points of the stop to 1e-10 mm, past all apertures; the centre is the mean of the four launch
/// points and the conjugate semi-diameters are half their differences. A stop that no ray reaches is a fault
/// that says why.
[[nodiscard]] std::optional<std::vector<Footprint>>
footprints(const assembly::Assembly& assembly, const Path& path, const Plan& plan, assembly::Faults& faults);

/// Where a field's chief ray crosses the launch plane, in mm: the centre of the beam, or, where there is a
/// stop, the point from which a real ray of the plan's wavelength meets the first stop's vertex to 1e-10 mm,
/// past all apertures; the centre of the beam too where no ray does.
[[nodiscard]] std::array<double, 2> chief_launch(const assembly::Assembly& assembly, const Path& path,
                                                 const Plan& plan, const assembly::Field& field);

} // namespace lightledger::trace
