#pragma once

#include <lightledger/analysis/coating_curve.hpp>

#include <optional>
#include <vector>

namespace lightledger::analysis {

/// A coating between the media that a request puts it between, found and checked.
struct CoatingSetting {
  const assembly::Coating* coating; ///< null for the bare boundary
  optics::Medium incident, substrate;
  std::vector<double> wavelengths_nm;

  /// The layers, null where the coating has none.
  [[nodiscard]] const assembly::Layers* layers() const {
    return coating ? std::get_if<assembly::Layers>(&coating->kind) : nullptr;
  }
  /// The curves, null where it is not measured.
  [[nodiscard]] const assembly::Measured* measured() const {
    return coating ? std::get_if<assembly::Measured>(&coating->kind) : nullptr;
  }
  /// Its powers, null where it is not ideal.
  [[nodiscard]] const assembly::Ideal* ideal() const {
    return coating ? std::get_if<assembly::Ideal>(&coating->kind) : nullptr;
  }
};

/// Finds coating and media, and makes sure that all of them are known at all wavelengths; none where there
/// are faults.
[[nodiscard]] std::optional<CoatingSetting>
coating_setting(const assembly::Assembly& assembly, const CoatingRequest& request, assembly::Faults& faults);

} // namespace lightledger::analysis
