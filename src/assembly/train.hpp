#pragma once

#include "coatings.hpp"
#include "coverage.hpp"
#include "mapping.hpp"
#include "media.hpp"

#include <lightledger/assembly/assembly.hpp>

#include <map>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace lightledger::assembly {

/// Reads the section `train`, station by station, and follows the medium that the light is in.
class Train {
public:
  Train(Reader& reader, Media& media, Coatings& coatings, Coverage& coverage, Assembly& assembly)
      : m_reader(reader), m_media(media), m_coatings(coatings), m_coverage(coverage), m_assembly(assembly),
        m_current(assembly.light.medium), m_coating_used(assembly.coatings.size(), false) {}

  /// `beam` is the place of the light's beam, for a fault where that has no stop to fill.
  void read(Value section, Mark beam);

private:
  enum class Does { refract, reflect, stop, detect, polarize, retard, rotate, unavailable };
  /// What stands behind a station: its gap depends on it.
  enum class Next { nothing, station, visit };
  struct CoatingWritten {
    CoatingId id;
    std::optional<Side> substrate;
    Mark mark; ///< of the coating's name
  };

  /// A surface that a later station may meet again. After a fault its media, or those of the light there, may
  /// not be known; then nothing is concluded from them.
  struct Met {
    std::string first_visit;
    SurfaceId surface = 0;
    Does does = Does::unavailable; ///< on the first visit
    bool media_known = false;
    bool rear = false; ///< it is the front of a plate
    MediumId before = 0;
    std::optional<MediumId> beyond;

    /// Between two media; else light only passes, as through an element or a stop.
    [[nodiscard]] bool interface() const { return does == Does::refract || does == Does::reflect; }
  };

  /// What a station writes for `does`.
  static std::string_view word(Does does);
  void read_station(Value value, Next next);
  void read_first_visit(Mapping& station, Does does, Next next);
  void keep(const Mapping& station, Does does, Station result, Next next);
  std::string read_name(Mapping& station);
  std::string new_name(Value value, const std::string& name);
  Does read_does(Mapping& station);
  Does action(Value value, const std::vector<std::string_view>& accepted);
  Gap read_gap(Mapping& station, Next next);
  [[nodiscard]] Next next_of(const std::vector<Value>& stations, std::size_t i) const;
  void check_stop(const Mapping& station, const Surface& surface);

  void read_again(Mapping& station, Next next);
  Does read_does_again(Mapping& station, const Met* met);
  std::string read_again_name(Mapping& station, Value earlier);
  const Met* find_earlier(Value value);
  void forbid_surface_keys(Mapping& station, const Met* met);
  void arrive_again(const Met& met, Mark mark);
  void refract_again(Mapping& station, const Met* met);
  void refuse_passing_plate(const Met& met, Mark mark);
  [[nodiscard]] std::string between(const Met& met) const;

  Surface read_surface(Mapping& station, Does does);
  Effect read_effect(Mapping& station, Does does);
  void read_refracting(Mapping& station, Surface& surface);
  void read_reflecting(Mapping& station, Surface& surface);
  std::optional<Surface> read_rear(Mapping& station, const std::string& name, Surface& front);
  void check_plate(const Mapping& station, const Surface& front);
  void reserve_rear_name(const Mapping& station, const std::string& name);
  Sensor read_sensor(Mapping& station);

  std::optional<CoatingWritten> read_coating(Mapping& station);
  std::optional<CoatingWritten> read_coating_use(Value value);
  CoatingUse placed(const CoatingWritten& coating, const Surface& surface);
  Side side_with_body(const CoatingWritten& coating, MediumId before, MediumId beyond);
  void check_coating(CoatingId id);
  void check_curves(CoatingId id);

  Reader& m_reader;
  Media& m_media;
  Coatings& m_coatings;
  Coverage& m_coverage;
  Assembly& m_assembly;
  MediumId m_current;          ///< the medium that the light arrives in at the next station
  bool m_current_known = true; ///< not so after a fault; then nothing is concluded from it
  std::vector<bool> m_coating_used;
  bool m_actions_known = true; ///< of all stations so far
  bool m_stop_met = false;
  std::map<std::string, Met> m_met;           ///< all stations so far, by name
  std::map<std::string, std::string> m_rears; ///< the fronts of all rear faces so far, by the rear's name
};

} // namespace lightledger::assembly
