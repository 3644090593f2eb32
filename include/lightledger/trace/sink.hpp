#pragma once

#include <lightledger/trace/rays.hpp>

#include <cstddef>
#include <memory>

namespace lightledger::trace {

/// A block of rays that reached the end of its path, in the frame of the detector's surface.
struct Arrivals {
  const RayBlock& rays;
  std::size_t wavelength, field; ///< their numbers in the light's lists
};

/// Listens at the detector. One call a block; a fresh one listens to every chunk of rays, and chunks are
/// merged in a fixed order.
class Sink {
public:
  Sink() = default;
  Sink(const Sink&) = delete;
  Sink& operator=(const Sink&) = delete;
  virtual ~Sink() = default;

  [[nodiscard]] virtual std::unique_ptr<Sink> fresh() const = 0;
  virtual void take(const Arrivals& arrivals) = 0;
  /// Adds what another sink of the same make has seen after this one.
  virtual void merge(const Sink& other) = 0;
};

} // namespace lightledger::trace
