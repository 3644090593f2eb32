#pragma once

#include <lightledger/trace/ledger.hpp>
#include <lightledger/trace/progress.hpp>
#include <lightledger/trace/sink.hpp>
#include <lightledger/trace/train.hpp>

#include <cstdint>
#include <optional>
#include <vector>

namespace lightledger::trace {

/// The ledger of one wavelength and field, relative to what was launched there, and its replicates' shares.
struct GroupLedger {
  std::size_t wavelength, field;
  double share;  ///< of all launched power
  Ledger ledger; ///< launched = 1
};

struct Traced {
  std::vector<GroupLedger> groups;      ///< fields within wavelengths
  Ledger total;                         ///< launched = 1
  std::optional<double> standard_error; ///< of delivered; none for patterns that give none
  bool accurate = true;                 ///< false where an accuracy asked for was not reached
  std::uint64_t rays = 0;
};

struct TraceOptions {
  int threads = 0;          ///< 0: as many as the machine has
  std::uint64_t shifts = 0; ///< which set of shifts scatters the rays
  Sink* sink = nullptr;     ///< told of what arrives by each path's end, in the raw weights of the rays
  Progress* progress = nullptr;
};

/// Traces the intended path with the light's own sampling. Rays are cut into a fixed list of chunks (16
/// replicates × 16), traced in parallel and summed in a fixed order: the result does not depend on the number
/// of threads.
[[nodiscard]] Traced trace(const Train& train, const TraceOptions& options = {});

} // namespace lightledger::trace
