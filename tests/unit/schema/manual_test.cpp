#include "manual.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

/// What the manual of the assembly file shows can be written.
namespace lightledger::schema {
namespace {

using testing::HasSubstr;
using testing::IsEmpty;
using testing::SizeIs;

/// All names of properties below a schema.
void gather_keys(const Json& schema, std::vector<std::string>& keys) {
  if (schema.is_object() && schema.contains("properties"))
    for (const auto& [key, value] : schema["properties"].items())
      keys.push_back(key);
  if (schema.is_structured())
    for (const Json& inner : schema)
      gather_keys(inner, keys);
}

TEST(AssemblyManual, ShowsExamplesThatLoad) {
  ASSERT_THAT(manual_examples(), SizeIs(testing::Ge(5U)));
  for (const Sample& sample : manual_examples())
    EXPECT_EQ(load(sample).report(), "");
}

TEST(AssemblyManual, ShowsValuesThatMayStandWhereItSaysSo) {
  const Validator validator(assembly_schema());
  const Sample base{"base", manual_blocks().find("yaml")->second, {}};
  ASSERT_THAT(manual_values(), SizeIs(testing::Ge(20U)));
  for (const assembly::Change& change : manual_values()) {
    EXPECT_EQ(load(base, {change}).report(), "") << change.address;
    EXPECT_THAT(validator.check(changed(parse(base), change)), IsEmpty()) << change.value;
  }
}

TEST(AssemblyManual, ShowsTheCurvesThatItsExamplesRead) {
  EXPECT_EQ(manual_blocks().find("text curves.csv")->second,
            content(project("tests/unit/schema/forms/curves.csv")));
}

TEST(AssemblyManual, SpeaksOfEveryKey) {
  const std::string manual = content(project("docs/assembly-file.md"));
  std::vector<std::string> keys;
  gather_keys(assembly_schema(), keys);
  ASSERT_THAT(keys, SizeIs(testing::Ge(100U)));
  for (const std::string& key : keys)
    if (key[0] != 'A' || key == "A3" || key == "A20") {
      EXPECT_THAT(manual, HasSubstr("`" + key + "`"));
    }
}

} // namespace
} // namespace lightledger::schema
