#pragma once

#include <lightledger/assembly/assembly.hpp>

#include <cstdint>
#include <string>
#include <utility>
#include <variant>
#include <vector>

namespace lightledger::trace {

using assembly::Act;
using assembly::StationId;
using LegId = std::uint32_t;
using OpId = std::uint32_t;

enum class Heading { along, against };

/// Of a station's surface: itself from outside; of a plate also its rear face, and the surface itself from
/// inside, both on the light's way through the plate and back.
enum class Face { front, rear, inside };

/// Light about to meet a surface: on which visit, which way, and at which face.
struct State {
  StationId visit;
  Heading heading;
  Face face = Face::front;

  friend bool operator==(const State&, const State&) = default;
};

/// Where light ends that meets no further surface of the train.
enum class End { detected, returned, leaked, absorbed };

/// To the next meeting by a leg.
struct Onward {
  State state;
  LegId leg;
};
using Hop = std::variant<Onward, End>;

/// A straight run of the light from one surface to the next, or from the launch plane to the first.
struct Leg {
  bool launch;
  assembly::SurfaceId from; ///< without meaning for a launch leg
  assembly::SurfaceId to;
  assembly::MediumId medium;
};

/// Where light goes after each meeting. Neighbourhood in the train is known here and nowhere else.
class Routes {
public:
  static constexpr LegId launch_leg = 0;

  /// `from` tells per station at which side of its surface the light arrives along the train.
  Routes(const assembly::Assembly& assembly, std::vector<assembly::Side> from);

  [[nodiscard]] const std::vector<Leg>& legs() const { return m_legs; }
  [[nodiscard]] State start() const { return {0, Heading::along}; }
  [[nodiscard]] Hop next(State state, Act act) const;
  /// The operator of a meeting: a surface, met from its side `before` or `beyond`.
  [[nodiscard]] OpId op(const assembly::Assembly& assembly, State state) const;

  /// Whether light that is reflected at a meeting bounces, rather than does what the train is for.
  [[nodiscard]] static bool bounces(const assembly::Assembly& assembly, State state);
  /// What a bounce at a meeting is called: the station's name, or "NAME rear".
  [[nodiscard]] static std::string bounce_name(const assembly::Assembly& assembly, State state);

private:
  struct Meeting {
    Hop pass, bounce, detect;
  };
  [[nodiscard]] Meeting meeting(const assembly::Assembly& assembly, State state) const;
  [[nodiscard]] Meeting meeting_in_plate(State state, LegId into_plate) const;
  [[nodiscard]] Hop behind_mirror(const assembly::Assembly& assembly, State state) const;
  [[nodiscard]] Hop onward(State state) const;
  void lay_legs(const assembly::Assembly& assembly);
  void lay_legs_in_plates(const assembly::Assembly& assembly);
  [[nodiscard]] Hop turned_back(const assembly::Assembly& assembly, State state) const;
  [[nodiscard]] Hop forward(StationId visit) const;
  [[nodiscard]] Hop backward(StationId visit) const;

  StationId m_stations;
  std::vector<assembly::Side> m_entry; ///< per visit: where light arrives along the train
  std::vector<assembly::Side> m_exit;  ///< per visit: where it leaves as intended
  std::vector<Leg> m_legs;
  std::vector<LegId> m_into_plate; ///< per surface that has a rear face: the leg to it, then the one back
  std::vector<Meeting> m_meetings; ///< per visit and face: along, against
};

/// One way through the train: how the light gets to each meeting, and what it does there.
struct Path {
  struct Step {
    LegId leg;
    OpId op;
    StationId visit;
    Act act;
  };
  std::vector<Step> steps;
  End end;
};

/// The path on which every visit goes as intended.
[[nodiscard]] Path intended_path(const assembly::Assembly& assembly, const Routes& routes);

} // namespace lightledger::trace
