#include "coatings.hpp"
#include "coverage.hpp"
#include "light.hpp"
#include "mapping.hpp"
#include "measured.hpp"
#include "media.hpp"
#include "read_file.hpp"
#include "requirements.hpp"
#include "train.hpp"

#include <lightledger/assembly/load.hpp>

#include <fmt/format.h>

#include <utility>

namespace lightledger::assembly {

namespace {

constexpr std::size_t largest_file = 10U << 20U;

Fault too_large() {
  return {{}, "the file is larger than 10 MB", "an assembly, which is far smaller", {}};
}

Fault unreadable(Unreadable why) {
  switch (why) {
  case Unreadable::missing:
    return {{}, "there is no such file", {}, {}};
  case Unreadable::folder:
    return {{}, "this is a folder", "a YAML file", {}};
  case Unreadable::too_large:
    return too_large();
  case Unreadable::refused:
    break;
  }
  return {{}, "the file cannot be read", "a file that you may read", {}};
}

/// Measured curves lie beside the assembly file unless something else is said.
MeasuredFiles beside(MeasuredFiles curves, std::string_view file) {
  if (curves.folder.empty())
    curves.folder = std::filesystem::path(file).parent_path();
  if (curves.folder.empty())
    curves.folder = ".";
  return curves;
}

/// The sections in the order in which they build upon each other.
Assembly read_assembly(Reader& reader, MeasuredFiles curve_files, std::vector<std::string>& warnings) {
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
  MeasuredCurves curves(reader, media, std::move(curve_files), warnings);
  Coatings coatings(reader, media, curves, assembly.coatings);
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
    Train(reader, media, coatings, coverage, assembly).read(*section, marks.beam);
  if (const auto section = file->take("requirements"))
    assembly.requirements = read_requirements(reader, *section);
  file->finish();
  return assembly;
}

} // namespace

Loaded load_text(std::string file, std::string text, const std::vector<Change>& changes,
                 const MeasuredFiles& curves) {
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
    Assembly assembly = read_assembly(reader, beside(curves, loaded.file), loaded.warnings);
    assembly.document = document;
    if (loaded.faults.none())
      loaded.assembly = std::move(assembly);
  }
  loaded.text = document->text();
  return loaded;
}

Loaded load(const std::filesystem::path& path, const std::vector<Change>& changes,
            const MeasuredFiles& curves) {
  auto content = read_file(path, largest_file);
  if (auto* const text = std::get_if<std::string>(&content))
    return load_text(path.string(), std::move(*text), changes, curves);
  Loaded loaded;
  loaded.file = path.string();
  loaded.faults.add(unreadable(std::get<Unreadable>(content)));
  return loaded;
}

} // namespace lightledger::assembly
