#pragma once

#include "mapping.hpp"
#include "measured.hpp"
#include "media.hpp"
#include "reader.hpp"

#include <lightledger/assembly/assembly.hpp>

#include <string>
#include <unordered_map>
#include <vector>

namespace lightledger::assembly {

/// A layer as it is written, once however often it is repeated: for faults at its place.
struct WrittenFilm {
  MediumId medium;
  Mark mark; ///< of the medium's name
  std::optional<double> at_nm;
  Mark at_mark;
};

/// Coatings by name while a file is read.
class Coatings {
public:
  static constexpr std::size_t most_films = 10'000; ///< in all coatings of a file, repeats written out

  Coatings(Reader& reader, Media& media, MeasuredCurves& curves, std::vector<Coating>& coatings)
      : m_reader(reader), m_media(media), m_curves(curves), m_coatings(coatings) {}

  /// Reads the section `coatings`.
  void read(Value section);

  /// The coating that a value names; a fault where there is none of that name.
  std::optional<CoatingId> named(Value value);

  /// Whether a coating was read without fault; nothing that follows from others should be reported.
  [[nodiscard]] bool sound(CoatingId id) const { return m_sound[id]; }
  [[nodiscard]] const decltype(Coating::kind)& kind(CoatingId id) const { return m_coatings[id].kind; }
  [[nodiscard]] bool layered(CoatingId id) const { return std::holds_alternative<Layers>(kind(id)); }
  [[nodiscard]] bool ideal(CoatingId id) const { return std::holds_alternative<Ideal>(kind(id)); }
  [[nodiscard]] const std::vector<WrittenFilm>& written(CoatingId id) const { return m_written[id]; }
  /// How a measured coating is written.
  [[nodiscard]] const WrittenCurves& written_curves(CoatingId id) const { return m_written_curves.at(id); }

private:
  decltype(Coating::kind) read_kind(Value value);
  void read_layers(Value value, const std::string& address, std::vector<Film>& films);
  void read_layer(Value value, const std::string& address, std::vector<Film>& films);
  void read_repeat(Mapping& layer, Value times, const std::string& address, std::vector<Film>& films);
  void read_film(Mapping& layer, const std::string& address, std::vector<Film>& films);
  std::optional<std::variant<double, Film::Waves>> read_thickness(Mapping& layer, WrittenFilm& written);
  bool room_for(std::size_t more, Mark mark);

  Reader& m_reader;
  Media& m_media;
  MeasuredCurves& m_curves;
  std::vector<Coating>& m_coatings;
  std::vector<bool> m_sound;
  std::vector<std::vector<WrittenFilm>> m_written;
  std::unordered_map<CoatingId, WrittenCurves> m_written_curves;
  std::unordered_map<std::string, CoatingId> m_ids;
  std::size_t m_films = 0;
  bool m_overfull = false;
};

} // namespace lightledger::assembly
