#pragma once

#include "reference/geometry.hpp"

#include <lightledger/assembly/assembly.hpp>

namespace lightledger::reference {

/// Whether a point of a surface, in its own x and y, is open; doubtful within 1e-9 mm of an edge.
struct Passage {
  bool open;
  bool doubtful;
};
[[nodiscard]] Passage through(const assembly::Clear& clear, const Vector& local_point);

} // namespace lightledger::reference
