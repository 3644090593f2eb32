#pragma once

#include "media.hpp"
#include "reader.hpp"

#include <lightledger/assembly/assembly.hpp>

namespace lightledger::assembly {

/// Where values of the section `light` stand that the train is checked against.
struct LightMarks {
  Mark medium;
  Mark beam;
};

/// Reads the section `light`. Its medium defaults to air.
[[nodiscard]] Light read_light(Reader& reader, Value section, Media& media, LightMarks& marks);

/// Parts of the section, each with its own file.
[[nodiscard]] std::vector<Wavelength> read_wavelengths(Reader& reader, Value value);
[[nodiscard]] optics::State read_polarization(Reader& reader, Value value);
[[nodiscard]] std::vector<Field> read_fields(Reader& reader, Value value, bool at_infinity);
[[nodiscard]] Beam read_beam(Reader& reader, Value value);
[[nodiscard]] Sampling read_sampling(Reader& reader, Value value);

/// Refuses a pattern that puts no ray into the beam.
void check_pattern(Reader& reader, Value value, const Sampling& sampling, const Beam& beam);

} // namespace lightledger::assembly
