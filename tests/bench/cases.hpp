#pragma once

#include "bench/textbook.hpp"

#include <lightledger/assembly/assembly.hpp>
#include <lightledger/trace/train.hpp>

#include <memory>
#include <string>
#include <vector>

namespace lightledger::bench {

/// A train of one kind of surface, made ready.
struct Case {
  std::string kind;
  std::unique_ptr<assembly::Assembly> assembly;
  trace::Train train;
};

/// What one interaction is measured on: sphere, 1, 4 and 20 layers, mirror, conic, asphere, tilted, plane.
[[nodiscard]] const std::vector<std::string>& kinds();

/// A train of so many surfaces of a kind and a detector; throws where it cannot be made.
[[nodiscard]] Case make(const std::string& kind, int surfaces, int wavelengths = 1);

/// A block of rays at the launch plane.
[[nodiscard]] trace::RayBlock launched(const Case& one);

/// The power that a block brings to the detector after `rounds` ways through the train; the answer that is
/// checked.
double run(const Case& one, const trace::RayBlock& launched, int rounds);

/// The same train for the textbook tracer: spheres, bare or with layers.
[[nodiscard]] std::vector<TextbookFace> textbook(const Case& one);

} // namespace lightledger::bench
