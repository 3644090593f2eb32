#pragma once

#include <cstdint>
#include <string>

/// Numbers for a person: four significant digits, a dash for exactly nothing.
namespace lightledger::report {

/// A fraction of power: `0.9986`, `-` for exactly nothing, `<0.0001` for nearly nothing.
[[nodiscard]] std::string fraction(double value);

/// A fraction of power in dB: `-0.006`, `-` for exactly nothing.
[[nodiscard]] std::string decibels(double value);

/// A fraction for a sentence, in per cent to two significant digits (three from 10 %): `8.9 %`, `<0.01 %`.
[[nodiscard]] std::string per_cent(double value);

/// Any other quantity, four significant digits: `45.00`, `1.250e-07`.
[[nodiscard]] std::string quantity(double value);

/// A number as a user would write it, without trailing zeros: `532`, `1064.5`, `0.4`.
[[nodiscard]] std::string plain(double value);

/// The size of an error, one significant digit: `2e-16`, `0.0001`.
[[nodiscard]] std::string error_size(double value);

/// A count with its digits in groups of three: `16 384`.
[[nodiscard]] std::string count(std::uint64_t value);

/// A time: `21 ms`, `3.4 s`.
[[nodiscard]] std::string duration(double seconds);

} // namespace lightledger::report
