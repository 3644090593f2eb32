#include "coatings.hpp"
#include "coverage.hpp"
#include "light.hpp"
#include "mapping.hpp"
#include "media.hpp"
#include "requirements.hpp"
#include "train.hpp"

#include <lightledger/assembly/load.hpp>

#include <fmt/format.h>

#include <array>
#include <fstream>
#include <utility>

namespace lightledger::assembly {

namespace {

constexpr std::size_t largest_file = 64U << 20U;

Fault too_large() {
  return {{}, "the file is larger than 64 MB", "an assembly, which is far smaller", {}};
}

/// The bytes of a file, or why they cannot be had.
std::variant<std::string, Fault> read_file(const std::filesystem::path& path) {
  std::error_code error;
  const auto status = std::filesystem::status(path, error);
  if (status.type() == std::filesystem::file_type::not_found)
    return Fault{{}, "there is no such file", {}, {}};
  if (std::filesystem::is_directory(status))
    return Fault{{}, "this is a folder", "a YAML file", {}};
  std::ifstream stream(path, std::ios::binary);
  std::string text;
  std::array<char, 1U << 16U> piece;
  while (stream && text.size() <= largest_file) {
    stream.read(piece.data(), piece.size());
    text.append(piece.data(), static_cast<std::size_t>(stream.gcount()));
  }
  if (text.size() > largest_file)
    return too_large();
  if (!stream.eof())
    return Fault{{}, "the file cannot be read", "a file that you may read", {}};
  return text;
}

/// The sections in the order in which they build upon each other.
Assembly read_assembly(Reader& reader) {
  Assembly assembly;
  const Value root{*reader.document().root(), "the file"};
  auto file = Mapping::read(reader, root, "an assembly file", "a mapping with light: and train:");
  if (!file)
    return assembly;
  if (const auto title = file->take("title"))
    assembly.title = reader.name(*title).value_or("");
  Media media(reader, assembly.media);
  if (const auto section = file->take("media"))
    media.read(*section);
  Coatings coatings(reader, media, assembly.coatings);
  if (const auto section = file->take("coatings"))
    coatings.read(*section);
  LightMarks marks;
  if (const auto section = file->need("light"))
    assembly.light = read_light(reader, *section, media, marks);
  else
    assembly.light.medium = media.builtin("air");
  Coverage coverage(reader, assembly.media, assembly.light.wavelengths);
  coverage.check_transparent(assembly.light.medium, marks.medium);
  if (const auto section = file->need("train"))
    Train(reader, media, coatings, coverage, assembly).read(*section);
  if (const auto section = file->take("requirements"))
    assembly.requirements = read_requirements(reader, *section);
  file->finish();
  return assembly;
}

} // namespace

Loaded load_text(std::string file, std::string text, const std::vector<Change>& changes) {
  Loaded loaded;
  loaded.file = file;
  if (text.size() > largest_file) {
    loaded.faults.add(too_large());
    return loaded;
  }
  auto document =
      std::make_shared<Document>(Document::parse(std::move(file), std::move(text), loaded.faults));
  if (document->root())
    for (const Change& change : changes)
      document->set(change.address, change.value, loaded.faults);
  if (document->root()) {
    Reader reader(*document, loaded.faults);
    Assembly assembly = read_assembly(reader);
    assembly.document = document;
    if (loaded.faults.none())
      loaded.assembly = std::move(assembly);
  }
  loaded.text = document->text();
  return loaded;
}

Loaded load(const std::filesystem::path& path, const std::vector<Change>& changes) {
  auto content = read_file(path);
  if (auto* const text = std::get_if<std::string>(&content))
    return load_text(path.string(), std::move(*text), changes);
  Loaded loaded;
  loaded.file = path.string();
  loaded.faults.add(std::move(std::get<Fault>(content)));
  return loaded;
}

} // namespace lightledger::assembly
