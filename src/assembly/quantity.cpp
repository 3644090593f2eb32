#include "quantity.hpp"

#include "plain_text.hpp"
#include "scalar.hpp"

#include <fmt/format.h>

#include <array>
#include <cmath>
#include <numbers>

namespace lightledger::assembly {

namespace {

enum class Dimension { length, angle, fraction, none };

/// A unit as so many parts of its dimension's least one: 1 nm, 1 arcsec. Decibels are the exception.
struct UnitWord {
  std::string_view word;
  Dimension dimension;
  double size;
};

constexpr double arcsec_per_rad = 180.0 * 3600.0 / std::numbers::pi;

constexpr std::array<UnitWord, 13> unit_words{{
    {"nm", Dimension::length, 1.0},
    {"um", Dimension::length, 1e3},
    {"mm", Dimension::length, 1e6},
    {"cm", Dimension::length, 1e7},
    {"m", Dimension::length, 1e9},
    {"in", Dimension::length, 2.54e7},
    {"deg", Dimension::angle, 3600.0},
    {"rad", Dimension::angle, arcsec_per_rad},
    {"mrad", Dimension::angle, arcsec_per_rad / 1000.0},
    {"arcmin", Dimension::angle, 60.0},
    {"arcsec", Dimension::angle, 1.0},
    {"%", Dimension::fraction, 0.01},
    {"dB", Dimension::fraction, 0.0},
}};

struct Other {
  std::string_view word, meant;
};

constexpr std::array<Other, 20> other_spellings{{
    {"µm", "um"},       {"μm", "um"},          {"micron", "um"}, {"microns", "um"}, {"inch", "in"},
    {"inches", "in"},   {"\"", "in"},          {"°", "deg"},     {"degree", "deg"}, {"degrees", "deg"},
    {"'", "arcmin"},    {"millimetre", "mm"},  {"meter", "m"},   {"metre", "m"},    {"radian", "rad"},
    {"radians", "rad"}, {"millimetres", "mm"}, {"percent", "%"}, {"db", "dB"},      {"nanometre", "nm"},
}};

Dimension dimension(Unit unit) {
  switch (unit) {
  case Unit::millimetres:
  case Unit::nanometres:
    return Dimension::length;
  case Unit::degrees:
    return Dimension::angle;
  case Unit::fraction:
    return Dimension::fraction;
  case Unit::none:
    break;
  }
  return Dimension::none;
}

std::string_view name(Dimension dimension) {
  switch (dimension) {
  case Dimension::length:
    return "a length";
  case Dimension::angle:
    return "an angle";
  case Dimension::fraction:
    return "a fraction";
  case Dimension::none:
    break;
  }
  return "a number without unit";
}

/// Ratios of units are taken so that they are exact wherever they are whole.
double convert(double value, double from, double to) {
  return from >= to ? value * (from / to) : value / (to / from);
}

double in_unit(double value, const UnitWord& word, Unit unit) {
  switch (unit) {
  case Unit::millimetres:
    return convert(value, word.size, 1e6);
  case Unit::nanometres:
    return convert(value, word.size, 1.0);
  case Unit::degrees:
    return convert(value, word.size, 3600.0);
  default:
    return word.word == "dB" ? std::pow(10.0, value / 10.0) : value / 100.0;
  }
}

const UnitWord* find_unit(std::string_view word) {
  for (const UnitWord& candidate : unit_words)
    if (candidate.word == word)
      return &candidate;
  return nullptr;
}

std::string meant_unit(std::string_view word) {
  for (const Other& other : other_spellings)
    if (other.word == word)
      return std::string(other.meant);
  for (const UnitWord& candidate : unit_words)
    if (!nearest(word, {candidate.word}).empty())
      return std::string(candidate.word);
  return {};
}

std::string_view trimmed(std::string_view text) {
  const std::size_t first = text.find_first_not_of(" \t\n");
  if (first == std::string_view::npos)
    return {};
  return text.substr(first, text.find_last_not_of(" \t\n") - first + 1);
}

/// A number and the word behind it.
struct Parts {
  std::string_view number, word;
};

Parts split(std::string_view text) {
  const std::string_view trim = trimmed(text);
  const std::size_t length = decimal_length(trim);
  return {trim.substr(0, length), trimmed(trim.substr(length))};
}

std::string units_of(Dimension wanted) {
  std::string list;
  for (const UnitWord& word : unit_words)
    if (word.dimension == wanted)
      list += fmt::format("{}{}", list.empty() ? "" : " ", word.word);
  return list;
}

} // namespace

std::optional<double> read_quantity(std::string_view text, bool is_text, Unit unit) {
  if (const auto number = core_number(trimmed(text)))
    return is_text ? std::nullopt : number;
  const Parts parts = split(text);
  const UnitWord* const word = find_unit(parts.word);
  if (parts.number.empty() || word == nullptr || word->dimension != dimension(unit))
    return std::nullopt;
  return in_unit(*core_number(parts.number), *word, unit);
}

Complaint explain_quantity(std::string_view text, bool is_text, Unit unit) {
  if (is_text && core_number(trimmed(text)))
    return {"is a number in quotes, which makes it text", printable(trimmed(text), 24)};
  const Parts parts = split(text);
  if (parts.number.empty())
    return {fmt::format("is {}, not a number", quoted(text)), {}};
  if (const UnitWord* const word = find_unit(parts.word))
    return {
        fmt::format("is {} in {}; wanted is {}", name(word->dimension), word->word, name(dimension(unit))),
        {}};
  const std::string meant = meant_unit(parts.word);
  return {fmt::format("has the unit {}, which is not known", quoted(parts.word)),
          meant.empty() ? "" : fmt::format("{} {}", printable(parts.number, 24), meant)};
}

std::string accepted_quantity(Unit unit) {
  const Dimension wanted = dimension(unit);
  switch (unit) {
  case Unit::millimetres:
    return fmt::format("a length: a number in mm, or one with a unit ({})", units_of(wanted));
  case Unit::nanometres:
    return fmt::format("a length: a number in nm, or one with a unit ({})", units_of(wanted));
  case Unit::degrees:
    return fmt::format("an angle: a number in degrees, or one with a unit ({})", units_of(wanted));
  case Unit::fraction:
    return fmt::format("a fraction: a number, or one with a unit ({})", units_of(wanted));
  case Unit::none:
    break;
  }
  return "a number";
}

} // namespace lightledger::assembly
