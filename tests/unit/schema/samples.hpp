#pragma once

#include "validator.hpp"

#include <lightledger/assembly/load.hpp>

#include <filesystem>
#include <string>
#include <vector>

namespace lightledger::schema {

/// An assembly file that is sound, or one that is not.
struct Sample {
  std::string name;
  std::string text;
  std::filesystem::path folder; ///< of its measured curves
};

[[nodiscard]] std::filesystem::path project(const std::string& path);
[[nodiscard]] std::string content(const std::filesystem::path& path);

/// The YAML files of a folder of the project, in order.
[[nodiscard]] std::vector<Sample> samples_in(const std::string& folder);

/// Files that show every key in every form, small ones.
[[nodiscard]] std::vector<Sample> forms();

/// All sound files: the forms, the systems, and the whole examples of the manual.
[[nodiscard]] std::vector<Sample> sound_samples();

[[nodiscard]] assembly::Loaded load(const Sample& sample, const std::vector<assembly::Change>& changes = {});

/// As a tree, without a root where it cannot be parsed.
[[nodiscard]] assembly::Document parse(const Sample& sample);

/// A document as JSON, with a change.
[[nodiscard]] Json changed(assembly::Document document, const assembly::Change& change);

/// The sample as JSON; null where it cannot be parsed.
[[nodiscard]] Json instance_of(const Sample& sample);

/// docs/assembly.schema.json
[[nodiscard]] const Json& assembly_schema();

} // namespace lightledger::schema
