#include "instance.hpp"
#include "samples.hpp"

#include <lightledger/optics/medium.hpp>

#include <fmt/format.h>
#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <algorithm>
#include <map>
#include <set>

/// docs/assembly.schema.json and the loader say the same, each as far as it can.
namespace lightledger::schema {
namespace {

using testing::IsEmpty;
using Keys = std::set<std::string>;

constexpr const char* unheard = "unheard_of";

std::string described(const std::vector<Violation>& violations) {
  std::string text;
  for (const Violation& violation : violations)
    text += fmt::format("{}: {} {}\n", violation.address, violation.keyword, violation.found);
  return text;
}

/// Addresses of all values below one, itself included.
void gather(const Json& value, const std::string& address, std::vector<std::string>& addresses) {
  addresses.push_back(address);
  if (value.is_array())
    for (std::size_t i = 0; i < value.size(); ++i)
      gather(value[i], fmt::format("{}[{}]", address, i), addresses);
  if (value.is_object())
    for (const auto& [key, inner] : value.items())
      gather(inner, address.empty() ? key : fmt::format("{}.{}", address, key), addresses);
}

std::vector<std::string> addresses_of(const Json& instance) {
  std::vector<std::string> addresses;
  gather(instance, {}, addresses);
  return addresses;
}

/// A station by what it does, as far as it says so.
std::string kind_of_station(const Json& station) {
  if (station.contains("again"))
    return "again";
  for (const char* effect : {"polarize", "retard", "rotate"})
    if (station.contains(effect))
      return effect;
  return station.value("does", "unsaid");
}

/// An address without indices and names of the user's own: all mappings of one kind stand at one place.
std::string place_of(const std::string& address, const Json& instance) {
  std::string place;
  for (const char letter : address)
    if (letter < '0' || letter > '9' || address.starts_with("media") || address.starts_with("coatings"))
      place += letter;
  for (const std::string section : {"media.", "coatings."})
    if (place.starts_with(section))
      place.replace(section.size(), place.find('.', section.size()) - section.size(), "*");
  if (place == "train[]")
    place += kind_of_station(instance["train"][std::stoul(address.substr(6))]);
  return place.starts_with("coatings.*.layers") ? "layer" : place;
}

/// The keys that the loader names where one is not known.
Keys keys_of_loader(const Sample& sample, const std::string& address) {
  const std::vector<assembly::Change> change{{fmt::format("{}.{}", address, unheard), "0"}};
  const Sample at_the_top{sample.name, fmt::format("{}\n{}: 0\n", sample.text, unheard), sample.folder};
  const assembly::Loaded loaded = address.empty() ? load(at_the_top) : load(sample, change);
  Keys keys;
  for (const assembly::Fault& fault : loaded.faults.kept()) {
    if (!fault.message.starts_with(fmt::format("'{}' is not a key of", unheard)))
      continue;
    for (std::size_t at = 0; at < fault.accepted.size();) {
      const std::size_t end = std::min(fault.accepted.find(", ", at), fault.accepted.size());
      keys.insert(fault.accepted.substr(at, end - at));
      at = end + 2;
    }
  }
  return keys;
}

Keys keys_of_schema(const Sample& sample, const std::string& address) {
  Json instance = changed(parse(sample), {address + '.' + unheard, "0"});
  if (address.empty())
    instance[unheard] = 0;
  Keys keys;
  for (const Violation& violation : Validator(assembly_schema()).check(instance))
    if (violation.address == address && violation.found == unheard)
      keys.insert(violation.known.begin(), violation.known.end());
  return keys;
}

TEST(Schema, AcceptsEverySoundFile) {
  const Validator validator(assembly_schema());
  for (const Sample& sample : sound_samples()) {
    EXPECT_EQ(load(sample).report(), "") << sample.name;
    EXPECT_EQ(described(validator.check(instance_of(sample))), "") << sample.name;
  }
}

TEST(Schema, HasExactlyTheKeysOfTheLoaderAtEveryPlace) {
  std::map<std::string, Keys> of_loader, of_schema;
  for (const Sample& sample : forms()) {
    const Json instance = instance_of(sample);
    for (const std::string& address : addresses_of(instance)) {
      const Keys keys = keys_of_loader(sample, address);
      const std::string place = place_of(address, instance);
      of_loader[place].insert(keys.begin(), keys.end());
      of_schema[place].merge(keys_of_schema(sample, address));
    }
  }
  // A station that says nothing of its kind could have become one of these by a key more.
  of_schema["train[]unsaid"].insert({"again", "polarize", "retard", "rotate"});
  const auto has_keys = [](const auto& entry) { return !entry.second.empty(); };
  ASSERT_GE(std::ranges::count_if(of_loader, has_keys), 35);
  for (const auto& [place, keys] : of_loader)
    EXPECT_EQ(of_schema[place], keys) << "at '" << place << "'";
}

/// Values that are wrong at most places, and right at some.
const std::vector<std::string> strangers{"[]",    "{}",   "~",    "true", "word",  "''",
                                         "-1",    "0",    "1.5",  "1e99", "\"2\"", "3 mrad",
                                         "-5 mm", "-2 %", "40 %", ".inf", "[1, 1]"};

/// The kinds of faults for which a schema needs to see nothing but the value itself.
bool is_of_value(const assembly::Fault& fault) {
  static const std::vector<std::string> words{"is a mapping, but",
                                              "not a number",
                                              "wanted is",
                                              "unit",
                                              "must be above 0",
                                              "cannot be negative",
                                              "a fraction lies between",
                                              "must be a finite number",
                                              "not a whole number",
                                              "is an empty list",
                                              " is a list",
                                              " is empty",
                                              "is true or false",
                                              "which makes it text",
                                              "is not a key of",
                                              " needs '"};
  return std::any_of(words.begin(), words.end(), [&fault](const std::string& word) {
    return fault.message.find(word) != std::string::npos;
  });
}

class Stranger : public testing::TestWithParam<std::string> {};

/// In place of every value of the forms.
TEST_P(Stranger, IsJudgedAlikeByLoaderAndSchema) {
  const Validator validator(assembly_schema());
  for (const Sample& sample : forms()) {
    const assembly::Document document = parse(sample);
    for (const std::string& address : addresses_of(instance(document))) {
      if (address.empty())
        continue;
      const assembly::Change change{address, GetParam()};
      const assembly::Loaded loaded = load(sample, {change});
      const auto violations = validator.check(changed(document, change));
      if (loaded.assembly) {
        EXPECT_EQ(described(violations), "") << sample.name << ' ' << address;
      }
      if (std::ranges::any_of(loaded.faults.kept(), is_of_value)) {
        EXPECT_FALSE(violations.empty()) << address << '\n' << loaded.report();
      }
    }
  }
}

INSTANTIATE_TEST_SUITE_P(All, Stranger, testing::ValuesIn(strangers),
                         [](const auto& each) { return std::to_string(each.index); });

/// What takes more than a schema can say: sums, comparisons of numbers, names and places, files, equal keys.
const std::set<std::string> beyond_schema{
    "beam-hole",          "coating-too-many-films", "coating-unknown", "fill-without-outline",
    "grid-empty",         "hole-too-large",         "key-twice",       "measured-columns",
    "measured-grid",      "measured-phases",        "measured-rows",   "measured-wavelengths",
    "medium-opaque",      "medium-out-of-range",    "medium-unknown",  "polarization-bad",
    "station-name-twice", "too-many-rays"};

TEST(Schema, RefusesEveryBadFileThatASchemaCanCatch) {
  const Validator validator(assembly_schema());
  for (const Sample& sample : samples_in("tests/unit/assembly/bad")) {
    EXPECT_FALSE(load(sample).assembly) << sample.name;
    EXPECT_EQ(validator.check(instance_of(sample)).empty(), beyond_schema.contains(sample.name))
        << sample.name;
  }
}

TEST(Schema, NamesTheMediaThatAreBuiltIn) {
  const auto& builtin = optics::builtin_media();
  EXPECT_EQ(assembly_schema()["$defs"]["builtin_medium"]["enum"].get<Keys>(),
            Keys(builtin.begin(), builtin.end()));
}

/// Below a schema, those of objects that have keys of their own but would take others.
void gather_open(const Json& schema, const std::string& path, std::vector<std::string>& open) {
  const bool chooses = schema.is_object() && (schema.contains("allOf") || schema.contains("if"));
  if (schema.is_object() && schema.value("type", Json()) == "object" && schema.contains("properties") &&
      !chooses && !schema.contains("additionalProperties"))
    open.push_back(path);
  if (schema.is_structured())
    for (const auto& [key, inner] : schema.items())
      gather_open(inner, fmt::format("{}/{}", path, key), open);
}

TEST(Schema, LeavesNoMappingOpenToOtherKeys) {
  std::vector<std::string> open;
  gather_open(assembly_schema(), "#", open);
  EXPECT_THAT(open, IsEmpty());
}

TEST(Schema, DescribesEveryKeyOfAStation) {
  const Json& definitions = assembly_schema()["$defs"];
  for (const char* kind : {"refracting", "reflecting", "stop", "detecting", "polarizing", "visiting"})
    for (const auto& [key, property] : definitions[kind]["properties"].items()) {
      const std::string reference = property.value("$ref", "");
      const bool said = property.contains("description") || property.contains("const") ||
                        property.contains("enum") ||
                        (!reference.empty() &&
                         assembly_schema()[Json::json_pointer(reference.substr(1))].contains("description"));
      EXPECT_TRUE(said) << kind << ' ' << key;
    }
}

TEST(Systems, NameTheSchemaToEditors) {
  for (const Sample& sample : samples_in("systems"))
    EXPECT_TRUE(sample.text.starts_with("# yaml-language-server: $schema=../docs/assembly.schema.json\n# "))
        << sample.name;
}

} // namespace
} // namespace lightledger::schema
