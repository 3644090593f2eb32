#pragma once

#include "reader.hpp"

#include <lightledger/assembly/assembly.hpp>

#include <array>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace lightledger::assembly {

/// What a file of measured curves may hold, in the order of its names.
enum Column : std::uint8_t {
  wavelength,
  angle,
  rs,
  rp,
  ts,
  tp,
  rs_back,
  rp_back,
  phase_rs,
  phase_rp,
  phase_ts,
  phase_tp,
  column_count
};
[[nodiscard]] std::string_view column_name(Column column);

/// One row of the file in nm, degrees and fractions; 0 for columns that it does not have.
struct CurveRow {
  std::array<double, column_count> values{};
  std::size_t number = 0; ///< in the file, from 1 for the line of names

  [[nodiscard]] double operator[](Column column) const { return values[column]; }
};

struct CurveTable {
  std::vector<CurveRow> rows;
  bool has_back = false;
  bool has_phases = false;
};

/// Where the faults of a file of curves are reported: at its name in the assembly file.
class CurveFaults {
public:
  CurveFaults(Reader& reader, Mark mark, std::string file)
      : m_reader(reader), m_mark(mark), m_file(std::move(file)), m_before(reader.fault_count()) {}

  /// `message` follows the file's name: ", row 3: …".
  void add(std::string_view message, std::string accepted = {}, std::string suggestion = {});
  [[nodiscard]] std::string suggest(std::string_view word, const std::vector<std::string_view>& among) const {
    return m_reader.suggest(word, among);
  }
  [[nodiscard]] std::size_t count() const { return m_reader.fault_count() - m_before; }
  [[nodiscard]] bool none() const { return count() == 0; }
  [[nodiscard]] const std::string& file() const { return m_file; }

private:
  Reader& m_reader;
  Mark m_mark;
  std::string m_file;
  std::size_t m_before;
};

/// Reads columns by name, in any order; a name that ends in ` %` is in per cent. Each row is checked by
/// itself: numbers, their ranges, R + T up to 1.
[[nodiscard]] CurveTable read_curve_table(std::string_view text, CurveFaults& faults);

} // namespace lightledger::assembly
