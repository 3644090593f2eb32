#pragma once

#include <lightledger/trace/path_tree.hpp>
#include <lightledger/trace/train.hpp>

#include <optional>

namespace lightledger::trace {

/// The paraxial image that a path forms, at the first wavelength and along the folded axis: how far it lies
/// behind the path's last meeting, in mm; negative before it, none where it is infinitely far. Tilt and shift
/// are ignored.
[[nodiscard]] std::optional<double> paraxial_image(const Train& train, const PathTree::Way& way);

} // namespace lightledger::trace
