#pragma once

#include "quantity.hpp"

#include <lightledger/assembly/document.hpp>

#include <algorithm>
#include <array>
#include <cstddef>
#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <unordered_map>
#include <vector>

namespace lightledger::assembly {

/// A value of the file on its way to a number or a name, with the words that messages call it by.
struct Value {
  NodeId id;
  std::string_view label;
};

/// What a number must be to make sense at its place; all must be finite, and lengths in mm within reach, but
/// for `far`.
enum class Bound { any, far, positive, not_negative, share };

/// Of a length on the bench, in mm: beyond it, rounding leaves nothing of a beam.
inline constexpr double largest_length = 1e12;
/// Of a conic constant and of an asphere's terms: beyond it, sags overflow.
inline constexpr double largest_term = 1e12;

inline constexpr std::uint64_t largest_count = std::uint64_t{1} << 32U;

/// Turns values of a document into numbers, words and names; what cannot be turned is added to the faults,
/// and none comes back.
class Reader {
public:
  Reader(const Document& document, Faults& faults) : m_document(document), m_faults(faults) {}

  [[nodiscard]] const Document& document() const { return m_document; }
  [[nodiscard]] const Node& node(Value value) const { return m_document.node(value.id); }
  [[nodiscard]] Mark mark(Value value) const { return node(value).mark; }

  void fault(Mark mark, std::string message, std::string accepted = {}, std::string suggestion = {});
  /// Makes the fault only if it will be shown, so that a hundred thousand cost little.
  template <typename Make>
  void fault_from(Make make) {
    m_faults.add(m_faults.count() < Faults::kept_at_most ? make() : Fault{});
  }
  [[nodiscard]] std::size_t fault_count() const { return m_faults.count(); }

  /// What was meant by a word that is not accepted, by another term of the field or a near spelling; may be
  /// empty. Not searched for faults beyond those that are shown.
  [[nodiscard]] std::string suggest(std::string_view word, const std::vector<std::string_view>& among) const;

  /// The key that was meant by one which is not accepted in a kind of mapping ("a station"); may be empty.
  const std::string& meant_key(const std::string& key, std::string_view mapping,
                               const std::vector<std::string_view>& accepted);

  std::optional<double> number(Value value, Unit unit, Bound bound);
  /// A number without a unit that is no larger than the term of a shape can be.
  std::optional<double> moderate_number(Value value);
  /// A whole number from 1 on, up to 2³² or less.
  std::optional<std::uint64_t> count(Value value, std::uint64_t most = largest_count);
  /// Text that a terminal can show; a number is text too, but neither nothing nor true and false are.
  std::optional<std::string> name(Value value);
  /// One of a few words.
  std::optional<std::string> word(Value value, const std::vector<std::string_view>& among);

  /// The items of a list that must not be empty; `accepted` is an example of what to write.
  std::optional<std::vector<Value>> items(Value value, std::string_view accepted);
  std::optional<std::vector<double>> numbers(Value value, Unit unit, Bound bound);
  /// Exactly N numbers of one kind.
  template <std::size_t N>
  std::optional<std::array<double, N>> tuple(Value value, Unit unit, Bound bound);

  /// Adds that this is not the kind of value that is wanted.
  void wrong_kind(Value value, std::string_view accepted);
  /// Adds that this is not a mapping, though `what` ("a beam") is one.
  void not_a_mapping(Value value, std::string_view what, std::string_view accepted);

private:
  std::optional<std::vector<double>> row(Value value, std::size_t count, Unit unit, Bound bound);
  bool within(Value value, double number, Unit unit, Bound bound);

  static constexpr std::size_t most_searches = 1000; ///< for keys that were meant

  const Document& m_document;
  Faults& m_faults;
  std::unordered_map<std::string, std::string> m_meant; ///< by mapping and key
};

template <std::size_t N>
std::optional<std::array<double, N>> Reader::tuple(Value value, Unit unit, Bound bound) {
  const auto list = row(value, N, unit, bound);
  if (!list)
    return std::nullopt;
  std::array<double, N> result{};
  std::copy(list->begin(), list->end(), result.begin());
  return result;
}

} // namespace lightledger::assembly
