#include "mapping.hpp"

#include "plain_text.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <string>

namespace lightledger::assembly {

Mapping::Mapping(Reader& reader, Value value, std::string_view what)
    : m_reader(&reader), m_value(value), m_what(what) {}

std::optional<Mapping> Mapping::read(Reader& reader, Value value, std::string_view what,
                                     std::string_view accepted) {
  if (reader.node(value).kind == Node::Kind::mapping)
    return Mapping(reader, value, what);
  reader.not_a_mapping(value, what, accepted);
  return std::nullopt;
}

const Node::Entry* Mapping::entry(std::string_view key) const {
  for (const Node::Entry& candidate : m_reader->node(m_value).entries)
    if (candidate.key == key)
      return &candidate;
  return nullptr;
}

Mark Mapping::key_mark(std::string_view key) const {
  const Node::Entry* found = entry(key);
  return found == nullptr ? mark() : found->key_mark;
}

std::optional<Value> Mapping::take(std::string_view key) {
  m_asked.push_back(key);
  const Node::Entry* found = entry(key);
  if (found == nullptr)
    return std::nullopt;
  return Value{found->value, found->key};
}

std::optional<Value> Mapping::need(std::string_view key) {
  const auto value = take(key);
  if (!value)
    m_missing.push_back({{key}, {}});
  return value;
}

std::optional<double> Mapping::number(std::string_view key, Unit unit, Bound bound) {
  const auto value = take(key);
  return value ? m_reader->number(*value, unit, bound) : std::nullopt;
}

std::optional<double> Mapping::need_number(std::string_view key, Unit unit, Bound bound) {
  const auto value = need(key);
  return value ? m_reader->number(*value, unit, bound) : std::nullopt;
}

std::optional<double> Mapping::moderate_number(std::string_view key) {
  const auto value = take(key);
  return value ? m_reader->moderate_number(*value) : std::nullopt;
}

std::optional<std::uint64_t> Mapping::need_count(std::string_view key, std::uint64_t most) {
  const auto value = need(key);
  return value ? m_reader->count(*value, most) : std::nullopt;
}

double Mapping::number_or(double fallback, std::string_view key, Unit unit, Bound bound) {
  return number(key, unit, bound).value_or(fallback);
}

bool Mapping::forbid(std::string_view key, std::string_view reason, std::string_view accepted) {
  if (entry(key) == nullptr)
    return false;
  m_forbidden.push_back(key);
  m_reader->fault(key_mark(key), fmt::format("'{}' {}", key, reason), std::string(accepted));
  return true;
}

std::optional<std::string_view> Mapping::one_of(const Keys& keys, std::string_view accepted) {
  m_asked.insert(m_asked.end(), keys.begin(), keys.end());
  std::optional<std::string_view> found;
  for (const std::string_view key : keys) {
    if (!has(key))
      continue;
    if (found) {
      m_reader->fault(key_mark(key), fmt::format("'{}' and '{}' exclude each other", *found, key),
                      std::string(accepted));
      return std::nullopt;
    }
    found = key;
  }
  return found;
}

std::optional<std::string_view> Mapping::need_one_of(const Keys& keys, std::string_view accepted) {
  if (std::none_of(keys.begin(), keys.end(), [this](std::string_view key) { return has(key); }))
    m_missing.push_back({keys, accepted});
  return one_of(keys, accepted);
}

bool Mapping::settled(std::string_view key) const {
  return std::find(m_asked.begin(), m_asked.end(), key) != m_asked.end() ||
         std::find(m_forbidden.begin(), m_forbidden.end(), key) != m_forbidden.end();
}

void Mapping::finish() {
  for (const Node::Entry& candidate : m_reader->node(m_value).entries) {
    if (settled(candidate.key))
      continue;
    const std::string& meant = m_reader->meant_key(candidate.key, m_what, m_asked);
    refuse(candidate, meant);
    const std::string_view meant_key = std::string_view(meant).substr(0, meant.find(':'));
    std::erase_if(m_missing, [meant_key](const Missing& missing) {
      return std::find(missing.keys.begin(), missing.keys.end(), meant_key) != missing.keys.end();
    });
  }
  for (const Missing& missing : m_missing)
    report(missing);
}

void Mapping::refuse(const Node::Entry& unknown, const std::string& meant) {
  m_reader->fault_from([&] {
    Keys accepted = m_asked;
    std::sort(accepted.begin(), accepted.end());
    accepted.erase(std::unique(accepted.begin(), accepted.end()), accepted.end());
    return Fault{unknown.key_mark, fmt::format("{} is not a key of {}", quoted(unknown.key), m_what),
                 fmt::format("{}", fmt::join(accepted, ", ")), meant};
  });
}

void Mapping::report(const Missing& missing) {
  m_reader->fault_from([&] {
    std::string keys = fmt::format("'{}'", missing.keys.front());
    for (std::size_t i = 1; i < missing.keys.size(); ++i)
      keys += fmt::format("{}'{}'", i + 1 == missing.keys.size() ? " or " : ", ", missing.keys[i]);
    return Fault{mark(), fmt::format("{} needs {}", m_what, keys), std::string(missing.accepted), {}};
  });
}

} // namespace lightledger::assembly
