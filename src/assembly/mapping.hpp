#pragma once

#include "reader.hpp"

#include <optional>
#include <string_view>
#include <vector>

namespace lightledger::assembly {

/// A mapping of the file whose keys are asked for one by one; `finish` refuses those that nobody asked for.
/// What is asked for is what is accepted, so every key that makes sense in the mapping has to be asked for.
class Mapping {
public:
  using Keys = std::vector<std::string_view>;

  /// `what` is the mapping in a message: "a station".
  Mapping(Reader& reader, Value value, std::string_view what);

  /// A mapping, or a fault that shows what is accepted and none.
  static std::optional<Mapping> read(Reader& reader, Value value, std::string_view what,
                                     std::string_view accepted);

  /// Another name for the mapping, once its kind is known.
  void call(std::string_view what) { m_what = what; }
  [[nodiscard]] Mark mark() const { return m_reader->mark(m_value); }
  [[nodiscard]] bool has(std::string_view key) const { return entry(key) != nullptr; }
  [[nodiscard]] Mark key_mark(std::string_view key) const;

  /// The value of a key that may be left out.
  std::optional<Value> take(std::string_view key);
  /// The value of a key that must be there.
  std::optional<Value> need(std::string_view key);

  std::optional<double> number(std::string_view key, Unit unit, Bound bound);
  std::optional<double> need_number(std::string_view key, Unit unit, Bound bound);
  std::optional<double> moderate_number(std::string_view key);
  std::optional<std::uint64_t> need_count(std::string_view key, std::uint64_t most = largest_count);
  /// A number that may be left out; after a fault the default as well.
  double number_or(double fallback, std::string_view key, Unit unit, Bound bound);
  template <std::size_t N>
  std::array<double, N> tuple_or_zero(std::string_view key, Unit unit, Bound bound = Bound::any);

  /// Refuses a key for a reason, the message being `'key' reason`. Whether it stands here.
  bool forbid(std::string_view key, std::string_view reason, std::string_view accepted = {});
  /// The one key of several alternatives that stands here; none, and a fault, where more than one does.
  std::optional<std::string_view> one_of(const Keys& keys, std::string_view accepted);
  /// The same where one must stand.
  std::optional<std::string_view> need_one_of(const Keys& keys, std::string_view accepted);

  /// Refuses what nobody asked for, and says what is missing unless a refused key seems to be meant for it.
  void finish();

private:
  /// Alternatives of which one must stand; `accepted` may be empty.
  struct Missing {
    Keys keys;
    std::string_view accepted;
  };

  [[nodiscard]] const Node::Entry* entry(std::string_view key) const;
  [[nodiscard]] bool settled(std::string_view key) const;
  void refuse(const Node::Entry& unknown, const std::string& meant);
  void report(const Missing& missing);

  Reader* m_reader;
  Value m_value;
  std::string_view m_what;
  Keys m_asked;
  Keys m_forbidden;
  std::vector<Missing> m_missing;
};

template <std::size_t N>
std::array<double, N> Mapping::tuple_or_zero(std::string_view key, Unit unit, Bound bound) {
  const auto value = take(key);
  const auto tuple = value ? m_reader->tuple<N>(*value, unit, bound) : std::nullopt;
  return tuple.value_or(std::array<double, N>{});
}

} // namespace lightledger::assembly
