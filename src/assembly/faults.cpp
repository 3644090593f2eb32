#include <lightledger/assembly/diagnostics.hpp>

#include <algorithm>
#include <array>
#include <cctype>
#include <utility>

namespace lightledger::assembly {

namespace {

constexpr std::size_t longest_word = 64;

char lower(char letter) {
  return static_cast<char>(std::tolower(static_cast<unsigned char>(letter)));
}

/// Letters are mistaken for each other; digits are meant.
std::size_t replacement(char a, char b) {
  const auto is_digit = [](char letter) { return std::isdigit(static_cast<unsigned char>(letter)) != 0; };
  if (lower(a) == lower(b))
    return 0;
  return is_digit(a) && is_digit(b) ? 2 : 1;
}

/// Number of insertions, deletions, replacements and swaps of neighbours that turn one word into the other
/// (optimal string alignment, Damerau 1964); both no longer than `longest_word`.
std::size_t edit_distance(std::string_view a, std::string_view b) {
  using Row = std::array<std::size_t, longest_word + 1>;
  Row before_last{};
  Row last{};
  Row row{};
  for (std::size_t j = 0; j <= b.size(); ++j)
    last[j] = j;
  for (std::size_t i = 1; i <= a.size(); ++i) {
    row[0] = i;
    for (std::size_t j = 1; j <= b.size(); ++j) {
      const std::size_t replaced = last[j - 1] + replacement(a[i - 1], b[j - 1]);
      row[j] = std::min({last[j] + 1, row[j - 1] + 1, replaced});
      if (i > 1 && j > 1 && lower(a[i - 1]) == lower(b[j - 2]) && lower(a[i - 2]) == lower(b[j - 1]))
        row[j] = std::min(row[j], before_last[j - 2] + 1);
    }
    before_last = std::exchange(last, row);
  }
  return last[b.size()];
}

/// Edits within which a word may still be meant: a third of its length, one at least from three letters on.
std::size_t tolerance(std::size_t length) {
  return length < 3 ? 0 : std::max<std::size_t>(1, length / 3);
}

} // namespace

void Faults::add(Fault fault) {
  if (m_count++ < kept_at_most)
    m_kept.push_back(std::move(fault));
}

std::string_view nearest(std::string_view word, const std::vector<std::string_view>& candidates) {
  std::string_view best;
  std::size_t best_distance = longest_word + 1;
  for (const std::string_view candidate : candidates) {
    if (std::max(word.size(), candidate.size()) > longest_word)
      continue;
    const std::size_t distance = edit_distance(word, candidate);
    if (distance <= tolerance(std::min(word.size(), candidate.size())) && distance < best_distance) {
      best = candidate;
      best_distance = distance;
    }
  }
  return best;
}

} // namespace lightledger::assembly
