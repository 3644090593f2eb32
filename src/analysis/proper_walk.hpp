#pragma once

#include "pauli_lanes.hpp"

#include <lightledger/trace/interact.hpp>
#include <lightledger/trace/train.hpp>

#include <Eigen/Core>
#include <span>
#include <vector>

namespace lightledger::analysis {

/// Legs and operators that a walk uses; those of a plan, or copies of which some are changed.
struct Optics {
  std::span<const trace::PlanLeg> legs;
  std::span<const trace::PlanOp> ops;

  explicit Optics(const trace::Plan& plan) : legs(plan.legs), ops(plan.ops) {}
  Optics(std::span<const trace::PlanLeg> some_legs, std::span<const trace::PlanOp> some_ops)
      : legs(some_legs), ops(some_ops) {}
};

/// Takes a block of rays from station to station, and on the way carries the entrance's basis along by
/// geometric transport (contract §2): the smallest rotation from k to k' at refraction, I − 2NNᵀ at
/// reflection, the identity at plane elements.
///
/// In the s, p basis of a station the transport is diag(1, ±1), so all that is carried is the azimuth ψ of s
/// in the entrance's basis, and what the station does to polarization, the transport divided out, is
/// (a_s ± a_p)/2 + (a_s ∓ a_p)/2 (cos 2ψ σ1 + sin 2ψ σ2). A rotator's turn is not geometric: it is
/// cosθ ∓ i sinθ σ3.
class ProperWalk {
public:
  /// The block must be a launched one, its Jones matrices unity.
  ProperWalk(const Optics& optics, trace::RayBlock& block);

  /// One meeting, and what it did in the entrance's basis. False where no ray goes on.
  bool step(const trace::Path::Step& step, PauliLanes& did);

  /// cos and sin of the turn from the transported x of the entrance to the double-pole x about the axis z of
  /// `axes`, both columns in bench coordinates, for rays that stand in the frame `here`.
  void arrive(const Eigen::Matrix3d& here, const Eigen::Matrix3d& axes, ArrivalLanes& arrival) const;

  /// −1 after an odd number of reflections.
  [[nodiscard]] double parity() const { return m_parity; }
  [[nodiscard]] const trace::RayBlock& block() const { return m_block; }
  [[nodiscard]] const trace::Tape& tape() const { return m_tape; }

private:
  void turn_by(double sign);
  void act(bool bounces, PauliLanes& did);
  void rotate(const trace::PlanOp& op, PauliLanes& did);

  Optics m_optics;
  trace::RayBlock& m_block;
  trace::Tape m_tape;
  double m_parity = 1.0;
  LaneArray m_cos, m_sin; ///< of the azimuth of the ray's u in the entrance's basis
};

/// The double-pole basis vector x of a direction in a frame's own axes: x carried by the smallest rotation
/// that takes z onto the direction.
[[nodiscard]] Eigen::Vector3d double_pole_x(const Eigen::Vector3d& direction);

/// The meetings before the detector, and the rays that came through them, without gaps between the lanes.
struct ProperRays {
  std::vector<PauliLanes> did; ///< per station before the detector
  ArrivalLanes arrival;
  double parity;
  int arrived = 0;
  int count = 0;   ///< lanes filled, a whole number of strips; 0 where no ray arrived
  int lane[lanes]; ///< of the launched block, that each ray had

  /// Follows a launched block to the detector.
  void follow(const trace::Train& train, const Optics& optics, trace::RayBlock& block);

private:
  void close_gaps(std::uint64_t alive, const trace::RayBlock& block);
};

} // namespace lightledger::analysis
