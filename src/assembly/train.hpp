#pragma once

#include "coatings.hpp"
#include "coverage.hpp"
#include "mapping.hpp"
#include "media.hpp"

#include <lightledger/assembly/assembly.hpp>

#include <string>
#include <unordered_set>
#include <vector>

namespace lightledger::assembly {

/// Reads the section `train`, station by station, and follows the medium that the light is in.
class Train {
public:
  Train(Reader& reader, Media& media, Coatings& coatings, Coverage& coverage, Assembly& assembly)
      : m_reader(reader), m_media(media), m_coatings(coatings), m_coverage(coverage), m_assembly(assembly),
        m_current(assembly.light.medium), m_coating_used(assembly.coatings.size(), false) {}

  void read(Value section);

private:
  enum class Does { refract, reflect, stop, detect, unavailable };
  struct CoatingWritten {
    CoatingId id;
    std::optional<Side> substrate;
    Mark mark; ///< of the coating's name
  };

  void read_station(Value value, bool last);
  void read_name(Mapping& station, Station& result);
  Does read_does(Mapping& station);
  Does action(Value value);
  Gap read_gap(Mapping& station, bool last);

  Surface read_surface(Mapping& station, Does does);
  void read_refracting(Mapping& station, Surface& surface);
  void read_reflecting(Mapping& station, Surface& surface);
  Sensor read_sensor(Mapping& station);

  std::optional<CoatingWritten> read_coating(Mapping& station);
  std::optional<CoatingWritten> read_coating_use(Value value);
  CoatingUse placed(const CoatingWritten& coating, const Surface& surface);
  Side side_with_body(const CoatingWritten& coating, MediumId before, MediumId beyond);
  void check_films(CoatingId id);

  Reader& m_reader;
  Media& m_media;
  Coatings& m_coatings;
  Coverage& m_coverage;
  Assembly& m_assembly;
  MediumId m_current;          ///< the medium that the light arrives in at the next station
  bool m_current_known = true; ///< not so after a fault; then nothing is concluded from it
  std::vector<bool> m_coating_used;
  std::unordered_set<std::string> m_names;
};

} // namespace lightledger::assembly
