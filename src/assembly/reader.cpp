#include "reader.hpp"

#include "plain_text.hpp"
#include "scalar.hpp"
#include "synonyms.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <utility>

namespace lightledger::assembly {

namespace {

std::string_view kind_words(const Node& node) {
  switch (node.kind) {
  case Node::Kind::sequence:
    return "a list";
  case Node::Kind::mapping:
    return "a mapping";
  case Node::Kind::null:
    return "empty";
  case Node::Kind::scalar:
    break;
  }
  if (node.quoted)
    return "text";
  if (core_number(node.scalar))
    return "a number";
  return core_boolean(node.scalar) ? "true or false" : "a word";
}

bool shows_well(std::string_view text) {
  while (!text.empty()) {
    const Character character = first_character(text);
    if (character.length == 0 || steers_terminal(character.code))
      return false;
    text.remove_prefix(character.length);
  }
  return true;
}

std::string listed(const std::vector<std::string_view>& words) {
  return fmt::format("{}", fmt::join(words, ", "));
}

std::string example_row(std::size_t count, Unit unit) {
  constexpr std::array<std::string_view, 4> letters{"a", "b", "c", "d"};
  return fmt::format("[{}], each {}",
                     fmt::join(letters.begin(), letters.begin() + std::min(count, letters.size()), ", "),
                     accepted_quantity(unit));
}

/// In braces `radius:5` without a blank is one long key.
std::string with_blank_after_colon(std::string_view key, const std::vector<std::string_view>& accepted) {
  const std::size_t colon = key.find(':');
  if (colon == std::string_view::npos ||
      std::find(accepted.begin(), accepted.end(), key.substr(0, colon)) == accepted.end())
    return {};
  return fmt::format("{}: {}", key.substr(0, colon), key.substr(colon + 1));
}

} // namespace

void Reader::fault(Mark mark, std::string message, std::string accepted, std::string suggestion) {
  m_faults.add({mark, std::move(message), std::move(accepted), std::move(suggestion)});
}

std::string Reader::suggest(std::string_view word, const std::vector<std::string_view>& among) const {
  if (m_faults.count() >= Faults::kept_at_most)
    return {};
  std::string meant = synonym(word, among);
  return meant.empty() ? std::string(nearest(word, among)) : meant;
}

const std::string& Reader::meant_key(const std::string& key, std::string_view mapping,
                                     const std::vector<std::string_view>& accepted) {
  static const std::string nothing;
  constexpr std::size_t longest_key = 64;
  if (key.size() > longest_key)
    return nothing;
  const std::string question = fmt::format("{}: {}", mapping, key);
  if (const auto known = m_meant.find(question); known != m_meant.end())
    return known->second;
  if (m_meant.size() == most_searches)
    return nothing;
  std::string meant = with_blank_after_colon(key, accepted);
  if (meant.empty())
    meant = synonym(key, accepted);
  if (meant.empty())
    meant = nearest(key, accepted);
  return m_meant.emplace(question, std::move(meant)).first->second;
}

void Reader::wrong_kind(Value value, std::string_view accepted) {
  fault_from([&] {
    return Fault{mark(value),
                 fmt::format("'{}' is {}", value.label, kind_words(node(value))),
                 std::string(accepted),
                 {}};
  });
}

void Reader::not_a_mapping(Value value, std::string_view what, std::string_view accepted) {
  fault_from([&] {
    return Fault{mark(value),
                 fmt::format("{} is a mapping, but this is {}", what, kind_words(node(value))),
                 std::string(accepted),
                 {}};
  });
}

bool Reader::within(Value value, double number, Unit unit, Bound bound) {
  const auto refuse = [&](std::string_view why) {
    fault_from([&] {
      return Fault{mark(value),
                   fmt::format("'{}' is {}; {}", value.label, printable(node(value).scalar, 40), why),
                   {},
                   {}};
    });
    return false;
  };
  if (!std::isfinite(number))
    return refuse("it must be a finite number");
  if (bound == Bound::positive && number <= 0.0)
    return refuse("it must be above 0");
  if (bound == Bound::not_negative && number < 0.0)
    return refuse("it cannot be negative");
  if (bound == Bound::share && (number < 0.0 || number > 1.0))
    return refuse("a fraction lies between 0 and 1");
  if (unit == Unit::millimetres && bound != Bound::far && std::abs(number) > largest_length)
    return refuse("lengths reach to 1e12 mm");
  return true;
}

std::optional<double> Reader::number(Value value, Unit unit, Bound bound) {
  const Node& scalar = node(value);
  if (scalar.kind != Node::Kind::scalar) {
    wrong_kind(value, accepted_quantity(unit));
    return std::nullopt;
  }
  const auto quantity = read_quantity(scalar.scalar, scalar.quoted, unit);
  if (!quantity) {
    fault_from([&] {
      const Complaint complaint = explain_quantity(scalar.scalar, scalar.quoted, unit);
      return Fault{mark(value), fmt::format("'{}' {}", value.label, complaint.message),
                   accepted_quantity(unit), complaint.suggestion};
    });
    return std::nullopt;
  }
  if (!within(value, *quantity, unit, bound))
    return std::nullopt;
  return quantity;
}

std::optional<double> Reader::moderate_number(Value value) {
  const auto number = this->number(value, Unit::none, Bound::any);
  if (!number || std::abs(*number) <= largest_term)
    return number;
  fault(mark(value),
        fmt::format("'{}' is {}; its size is at most 1e12", value.label, printable(node(value).scalar, 40)));
  return std::nullopt;
}

std::optional<std::uint64_t> Reader::count(Value value, std::uint64_t most) {
  const auto number = this->number(value, Unit::none, Bound::any);
  if (!number)
    return std::nullopt;
  if (*number < 1.0 || *number > static_cast<double>(most) || std::trunc(*number) != *number) {
    fault(mark(value), fmt::format("'{}' is {}, not a whole number from 1 to {}", value.label,
                                   printable(node(value).scalar, 40), most));
    return std::nullopt;
  }
  return static_cast<std::uint64_t>(*number);
}

std::optional<std::string> Reader::name(Value value) {
  const Node& scalar = node(value);
  if (scalar.kind != Node::Kind::scalar || (!scalar.quoted && core_boolean(scalar.scalar))) {
    wrong_kind(value, "text, in quotes if it looks like something else");
    return std::nullopt;
  }
  if (scalar.scalar.empty() || !shows_well(scalar.scalar)) {
    fault(mark(value),
          fmt::format("'{}' is {}", value.label,
                      scalar.scalar.empty() ? "empty" : "text with characters that cannot be shown"),
          "visible text on one line");
    return std::nullopt;
  }
  return scalar.scalar;
}

std::optional<std::string> Reader::word(Value value, const std::vector<std::string_view>& among) {
  const Node& scalar = node(value);
  if (scalar.kind != Node::Kind::scalar) {
    wrong_kind(value, listed(among));
    return std::nullopt;
  }
  if (std::find(among.begin(), among.end(), scalar.scalar) == among.end()) {
    fault(mark(value), fmt::format("'{}' is {}", value.label, quoted(scalar.scalar)), listed(among),
          suggest(scalar.scalar, among));
    return std::nullopt;
  }
  return scalar.scalar;
}

std::optional<std::vector<Value>> Reader::items(Value value, std::string_view accepted) {
  const Node& list = node(value);
  if (list.kind != Node::Kind::sequence) {
    wrong_kind(value, accepted);
    return std::nullopt;
  }
  if (list.items.empty()) {
    fault(mark(value), fmt::format("'{}' is an empty list", value.label), std::string(accepted));
    return std::nullopt;
  }
  std::vector<Value> result;
  result.reserve(list.items.size());
  for (const NodeId id : list.items)
    result.push_back({id, value.label});
  return result;
}

std::optional<std::vector<double>> Reader::numbers(Value value, Unit unit, Bound bound) {
  const auto list = items(value, "a list of numbers");
  if (!list)
    return std::nullopt;
  std::vector<double> result;
  for (const Value item : *list)
    if (const auto number = this->number(item, unit, bound))
      result.push_back(*number);
  return result.size() == list->size() ? std::optional(std::move(result)) : std::nullopt;
}

std::optional<std::vector<double>> Reader::row(Value value, std::size_t count, Unit unit, Bound bound) {
  const Node& list = node(value);
  if (list.kind != Node::Kind::sequence) {
    wrong_kind(value, example_row(count, unit));
    return std::nullopt;
  }
  if (list.items.size() != count) {
    fault(mark(value), fmt::format("'{}' holds {} values, not {}", value.label, list.items.size(), count),
          example_row(count, unit));
    return std::nullopt;
  }
  return numbers(value, unit, bound);
}

} // namespace lightledger::assembly
