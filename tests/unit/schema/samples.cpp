#include "samples.hpp"

#include "instance.hpp"
#include "manual.hpp"

#include <algorithm>
#include <fstream>
#include <iterator>

namespace lightledger::schema {

std::filesystem::path project(const std::string& path) {
  return std::filesystem::path(LIGHTLEDGER_SOURCE_DIR) / path;
}

std::string content(const std::filesystem::path& path) {
  std::ifstream stream(path, std::ios::binary);
  return {std::istreambuf_iterator<char>(stream), std::istreambuf_iterator<char>()};
}

std::vector<Sample> samples_in(const std::string& folder) {
  std::vector<Sample> samples;
  for (const auto& entry : std::filesystem::directory_iterator(project(folder)))
    if (entry.path().extension() == ".yaml")
      samples.push_back({entry.path().stem().string(), content(entry.path()), project(folder)});
  std::sort(samples.begin(), samples.end(), [](const Sample& a, const Sample& b) { return a.name < b.name; });
  return samples;
}

std::vector<Sample> forms() {
  return samples_in("tests/unit/schema/forms");
}

std::vector<Sample> sound_samples() {
  std::vector<Sample> all = forms();
  for (const auto& more : {samples_in("systems"), manual_examples()})
    all.insert(all.end(), more.begin(), more.end());
  return all;
}

assembly::Loaded load(const Sample& sample, const std::vector<assembly::Change>& changes) {
  return assembly::load_text(sample.name, sample.text, changes, {sample.folder, false});
}

assembly::Document parse(const Sample& sample) {
  assembly::Faults faults;
  return assembly::Document::parse(sample.name, sample.text, faults);
}

Json changed(assembly::Document document, const assembly::Change& change) {
  assembly::Faults faults;
  document.set(change.address, change.value, faults);
  return instance(document);
}

Json instance_of(const Sample& sample) {
  return instance(parse(sample));
}

const Json& assembly_schema() {
  static const Json schema = Json::parse(content(project("docs/assembly.schema.json")));
  return schema;
}

} // namespace lightledger::schema
