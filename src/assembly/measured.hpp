#pragma once

#include "curve_table.hpp"
#include "mapping.hpp"
#include "media.hpp"

#include <lightledger/assembly/assembly.hpp>
#include <lightledger/assembly/load.hpp>

#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace lightledger::assembly {

/// How measured curves are named in the assembly file, for faults at that place.
struct WrittenCurves {
  std::string file;
  Mark mark;      ///< of the value of `measured`
  Mark from_mark; ///< of the medium's name, where there is one
};

/// Reads coatings that are given as curves in files of their own.
class MeasuredCurves {
public:
  static constexpr std::size_t most_bytes = 8U << 20U; ///< of all files together
  static constexpr std::size_t most_files = 1000;

  MeasuredCurves(Reader& reader, Media& media, MeasuredFiles files, std::vector<std::string>& warnings)
      : m_reader(reader), m_media(media), m_files(std::move(files)), m_warnings(warnings) {}

  /// Reads `file.csv` or `{file, from, phases, shift_index}` and the file itself; `coating` is the name in a
  /// warning. After a fault the curves may be empty.
  Measured read(Value value, std::string_view coating, WrittenCurves& written);

private:
  struct Options {
    std::optional<Value> file;
    std::optional<MediumId> from;
    std::optional<Mark> phases;
    bool advance = false;
    std::optional<double> shift_index;
    Mark shift_mark;
  };

  Options read_options(Value value, WrittenCurves& written);
  void read_keys(Mapping& mapping, Options& options, WrittenCurves& written);
  std::optional<std::string> read_text(Value file, CurveFaults& faults);
  void check_options(const Options& options, const Measured& measured, const CurveFaults& faults);

  Reader& m_reader;
  Media& m_media;
  MeasuredFiles m_files;
  std::vector<std::string>& m_warnings;
  std::size_t m_bytes = 0;
  std::size_t m_count = 0;
};

} // namespace lightledger::assembly
