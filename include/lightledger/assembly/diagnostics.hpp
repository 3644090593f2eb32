#pragma once

#include <cstddef>
#include <string>
#include <string_view>
#include <vector>

namespace lightledger::assembly {

/// A place in the assembly file; lines and columns count from 1, line 0 is the file as a whole.
struct Mark {
  int line = 0;
  int column = 0;
};

/// One thing that is wrong with the input, and what would be right.
struct Fault {
  Mark mark;
  std::string message;    ///< what is wrong, in one clause
  std::string accepted;   ///< what is accepted there; may be empty
  std::string suggestion; ///< a near name or a synonym, as the user should write it; may be empty
};

/// Faults in the order in which they were found: all are counted, the first twenty are kept.
class Faults {
public:
  static constexpr std::size_t kept_at_most = 20;

  void add(Fault fault);
  [[nodiscard]] bool none() const { return m_count == 0; }
  [[nodiscard]] std::size_t count() const { return m_count; }
  [[nodiscard]] const std::vector<Fault>& kept() const { return m_kept; }

private:
  std::vector<Fault> m_kept;
  std::size_t m_count = 0;
};

/// The report for a person: per fault the place, what is wrong, the line with a caret, what is accepted, a
/// suggestion; then the count where there are more than are shown. Always below 40 kB, long lines are cut
/// around the caret and control characters replaced. `text` is the file's content.
[[nodiscard]] std::string describe(const Faults& faults, std::string_view file, std::string_view text);

/// The candidate nearest to `word` by edit distance (case-insensitive, transpositions count once), or empty
/// where none is near enough to be meant.
[[nodiscard]] std::string_view nearest(std::string_view word,
                                       const std::vector<std::string_view>& candidates);

} // namespace lightledger::assembly
