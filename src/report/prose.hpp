#pragma once

#include <lightledger/assembly/assembly.hpp>

#include <string>
#include <string_view>
#include <vector>

/// Sentences and lines of words that several reports share.
namespace lightledger::report {

/// The sentence broken at blanks into lines of at most `width` columns, later lines indented by two blanks,
/// with a line break after each.
[[nodiscard]] std::string wrapped(std::string_view sentence, int width);

/// The launched light in one clause: `532 nm, linear 0 deg`; counts of wavelengths and fields where there are
/// more than one.
[[nodiscard]] std::string describe_light(const assembly::Light& light);

/// A state of polarization in words; right and left are always those of IEEE.
[[nodiscard]] std::string describe_polarization(const optics::State& state);

/// The title line: the assembly's title and its light.
[[nodiscard]] std::string heading(const assembly::Assembly& assembly, int width);

/// `Warning: …` once for each, wrapped; empty without warnings.
[[nodiscard]] std::string describe_warnings(const std::vector<std::string>& warnings, int width);

} // namespace lightledger::report
