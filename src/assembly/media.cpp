#include "media.hpp"

#include "medium_forms.hpp"
#include "plain_text.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <utility>

namespace lightledger::assembly {

void check_own_name(Reader& reader, const Node::Entry& entry) {
  if (entry.key.empty() || printable(entry.key, entry.key.size()) != entry.key)
    reader.fault(entry.key_mark, "this name is empty or has characters that cannot be shown",
                 "visible text on one line");
  if (entry.key == "bare" || optics::builtin_medium(entry.key))
    reader.fault(entry.key_mark,
                 fmt::format("{} is a built-in name, which nothing else may take", quoted(entry.key)),
                 "another name");
}

void Media::read(Value section) {
  if (m_reader.node(section).kind != Node::Kind::mapping)
    return m_reader.not_a_mapping(section, "media", "names of media: {resin: {index: 1.49}}");
  for (const Node::Entry& entry : m_reader.node(section).entries) {
    check_own_name(m_reader, entry);
    m_ids.emplace(entry.key, static_cast<MediumId>(m_media.size()));
    m_media.push_back(read_medium(m_reader, {entry.value, entry.key}));
  }
}

std::optional<MediumId> Media::find(const std::string& name) {
  if (const auto known = m_ids.find(name); known != m_ids.end())
    return known->second;
  auto medium = optics::builtin_medium(name);
  if (!medium)
    return std::nullopt;
  const auto id = static_cast<MediumId>(m_media.size());
  m_media.push_back(std::move(*medium));
  m_ids.emplace(name, id);
  return id;
}

std::optional<MediumId> Media::named(Value value) {
  const auto name = m_reader.name(value);
  if (!name)
    return std::nullopt;
  const auto id = find(*name);
  if (!id)
    m_reader.fault_from([&] {
      return Fault{m_reader.mark(value), fmt::format("no medium is called {}", quoted(*name)),
                   "a name from this file's media, or a built-in one (lightledger media lists them)",
                   m_reader.suggest(*name, all_names())};
    });
  return id;
}

std::vector<std::string_view> Media::all_names() const {
  std::vector<std::string_view> names = optics::builtin_media();
  for (const optics::Medium& medium : m_media)
    names.emplace_back(medium.name);
  return names;
}

} // namespace lightledger::assembly
