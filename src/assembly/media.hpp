#pragma once

#include "reader.hpp"

#include <lightledger/assembly/assembly.hpp>

#include <string>
#include <string_view>
#include <unordered_map>
#include <vector>

namespace lightledger::assembly {

/// Media by name while a file is read: all of its own, and the built-in ones as they come into use.
class Media {
public:
  Media(Reader& reader, std::vector<optics::Medium>& media) : m_reader(reader), m_media(media) {}

  /// Reads the section `media`.
  void read(Value section);

  /// The medium that a value names; a fault where there is none of that name.
  std::optional<MediumId> named(Value value);

  /// The medium of this name, known to exist.
  MediumId builtin(std::string_view name) { return *find(std::string(name)); }

private:
  std::optional<MediumId> find(const std::string& name);
  [[nodiscard]] std::vector<std::string_view> all_names() const;

  Reader& m_reader;
  std::vector<optics::Medium>& m_media;
  std::unordered_map<std::string, MediumId> m_ids;
};

/// Refuses a name that a coating or medium of the file may not take: empty, not printable, built-in, `bare`.
void check_own_name(Reader& reader, const Node::Entry& entry);

} // namespace lightledger::assembly
