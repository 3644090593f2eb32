#pragma once

#include <lightledger/assembly/assembly.hpp>
#include <lightledger/trace/interact.hpp>
#include <lightledger/trace/tracer.hpp>

#include <Eigen/Core>
#include <array>
#include <functional>
#include <memory>
#include <string>
#include <vector>

namespace lightledger::support {

/// The assembly of YAML text; a text with faults throws their report.
[[nodiscard]] assembly::Assembly loaded(const std::string& yaml);

/// An assembly with its train made ready, kept together.
struct Ready {
  std::unique_ptr<assembly::Assembly> assembly;
  trace::Train train;
};
[[nodiscard]] Ready ready(const std::string& yaml);

/// One ray as a block: a point and a direction (made unit) in the first station's arriving frame, with the
/// double-pole basis, unit Jones matrix and weight 1.
[[nodiscard]] trace::RayBlock ray(const std::array<double, 3>& point, const std::array<double, 3>& direction);

/// The meetings of light that acts as told, from the launch on, by the route table; throws where it ends
/// before.
[[nodiscard]] std::vector<trace::Path::Step> meetings(const trace::Train& train,
                                                      const std::vector<trace::Act>& acts);

/// Takes a block from meeting to meeting while rays are left in it; `seen` is told of each, with the block
/// behind it.
using Seen = std::function<void(const trace::Path::Step&, const trace::Entry&, const trace::Tape&)>;
void follow(const std::vector<trace::Path::Step>& steps, const trace::Plan& plan,
            const optics::Coherency& coherency, trace::RayBlock& block, const Seen& seen);

/// A block taken along the intended path, step by step, with all that can be learnt on the way.
struct Walk {
  std::vector<trace::Tape> tapes;      ///< per station reached
  std::vector<trace::RayBlock> behind; ///< the beam that goes on from each of them
  trace::Ledger ledger;

  [[nodiscard]] std::array<double, 3> hit(std::size_t station, int lane = 0) const;
  [[nodiscard]] std::array<double, 3> direction(std::size_t station, int lane = 0) const;
};
/// The polarization ray-tracing matrix in bench coordinates (Yun, Crabtree & Chipman 2011) from the launched
/// ray to the light behind a station, in flux-normalised amplitudes.
[[nodiscard]] Eigen::Matrix3cd polarization_matrix(const trace::Train& train, const Walk& walk,
                                                   const trace::RayBlock& launched, std::size_t station);

[[nodiscard]] Walk walk(const trace::Train& train, const trace::RayBlock& launched, optics::State state = {},
                        std::size_t wavelength = 0);

} // namespace lightledger::support
