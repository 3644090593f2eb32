#pragma once

#include <lightledger/optics/mueller.hpp>
#include <lightledger/trace/rays.hpp>

#include <array>
#include <cstddef>

/// Jones matrices of a block of rays in the Pauli basis, one array a component, and the sums over the block.
/// Loops run over lanes in steps of `strip`; lanes above the count are filled with weight 0.
namespace lightledger::analysis {

inline constexpr int lanes = trace::RayBlock::lanes;
inline constexpr int strip = 8;
using LaneArray = double[lanes];

struct PauliLanes {
  LaneArray re[4], im[4];
};

/// after · before.
void multiply(const PauliLanes& after, const PauliLanes& before, int count, PauliLanes& product);
/// √(tr(K†K)/2): the amplitude with which unpolarized light gets through.
void mean_amplitude(const PauliLanes& k, int count, LaneArray& amplitude);
void scale(PauliLanes& k, const LaneArray& factor, int count);
void set_identity(PauliLanes& k);

/// Of each ray that arrived: its weight, and the turn by which the basis of the detector is ahead of the
/// geometric transport of the entrance's.
struct ArrivalLanes {
  LaneArray weight, turn_cos, turn_sin;
};

/// What is summed of one product of Jones matrices: Σ w k k† with the geometric transport divided out, and
/// S1 and S2 of the launched state in the detector's basis (but for the sign of S2 after an odd number of
/// mirrors).
inline constexpr std::size_t proper_sums = 18;
/// What is summed besides of the train as it is: Σ w k k† in the detector's basis, Σ w k0, Σ w, and
/// Σ w |k|² (cos, sin) of the turn.
inline constexpr std::size_t arriving_sums = 21;

/// Adds a block's share to `proper_sums` sums.
void add_proper(const PauliLanes& k, const ArrivalLanes& arrival, const optics::State& state, int count,
                double* sums);
/// Adds a block's share to `arriving_sums` sums.
void add_arriving(const PauliLanes& k, const ArrivalLanes& arrival, int count, double* sums);

/// The first 16 sums as a coherency matrix.
[[nodiscard]] optics::PauliCoherency coherency_at(const double* sums);

} // namespace lightledger::analysis
