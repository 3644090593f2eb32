#include "validator.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <stdexcept>

namespace lightledger::schema {
namespace {

struct Judgement {
  const char* schema;
  std::vector<const char*> valid, invalid;
};

/// Instances that each keyword tells apart, with the results that JSON Schema 2020-12 states for it.
const std::vector<Judgement> judgements{
    {R"({"type": "integer"})", {"8", "8.0", "-1"}, {"8.5", "\"8\"", "null"}},
    {R"({"type": ["number", "string"]})", {"1", "\"x\""}, {"true", "[]", "{}"}},
    {R"({"const": 0})", {"0", "0.0"}, {"1", "\"0\"", "false"}},
    {R"({"enum": ["a", 1]})", {"\"a\"", "1"}, {"\"b\""}},
    {R"({"minimum": 0, "maximum": 1})", {"0", "1", "\"x\""}, {"-1e-9", "1.1"}},
    {R"({"exclusiveMinimum": 0, "exclusiveMaximum": 1})", {"0.5", "[]"}, {"0", "1"}},
    {R"({"minLength": 1})", {"\"a\"", "0"}, {"\"\""}},
    {R"({"pattern": "^a+$"})", {"\"aa\"", "3"}, {"\"ab\""}},
    {R"({"minItems": 1, "maxItems": 2})", {"[1]", "[1, 2]", "{}"}, {"[]", "[1, 2, 3]"}},
    {R"({"prefixItems": [{"const": 1}], "items": false})", {"[]", "[1]", "3"}, {"[2]", "[1, 2]"}},
    {R"({"items": {"type": "number"}})", {"[1, 2]"}, {"[1, \"2\"]"}},
    {R"({"contains": {"const": 1}})", {"[2, 1]", "[1, 1]", "4"}, {"[]", "[2]"}},
    {R"({"contains": {"const": 1}, "minContains": 1, "maxContains": 1})", {"[2, 1]"}, {"[1, 1]"}},
    {R"({"properties": {"a": {"const": 1}}, "additionalProperties": false})",
     {"{\"a\": 1}", "{}"},
     {"{\"a\": 2}", "{\"b\": 1}"}},
    {R"({"additionalProperties": {"const": 1}})", {"{\"x\": 1}"}, {"{\"x\": 2}"}},
    {R"({"propertyNames": {"const": "a"}})", {"{\"a\": 2}"}, {"{\"b\": 2}"}},
    {R"({"required": ["a"]})", {"{\"a\": null}", "[]"}, {"{}"}},
    {R"({"dependentRequired": {"a": ["b"]}})", {"{}", "{\"b\": 1}", "{\"a\": 1, \"b\": 1}"}, {"{\"a\": 1}"}},
    {R"({"dependentSchemas": {"a": {"required": ["b"]}}})", {"{}", "{\"a\": 1, \"b\": 1}"}, {"{\"a\": 1}"}},
    {R"({"allOf": [{"minimum": 1}, {"maximum": 2}]})", {"1.5"}, {"0", "3"}},
    {R"({"anyOf": [{"minimum": 1}, {"maximum": 2}]})", {"0", "1.5", "3"}, {}},
    {R"({"anyOf": [{"const": 1}, false]})", {"1"}, {"2"}},
    {R"({"oneOf": [{"minimum": 1}, {"maximum": 2}]})", {"0", "3"}, {"1.5"}},
    {R"({"not": {"const": 1}})", {"2"}, {"1"}},
    {R"({"if": {"minimum": 5}, "then": {"maximum": 6}, "else": {"const": 1}})", {"5", "1"}, {"7", "2"}},
    {R"({"$defs": {"one": {"const": 1}}, "$ref": "#/$defs/one"})", {"1"}, {"2"}},
};

TEST(Validator, JudgesAsEachKeywordSays) {
  for (const Judgement& judgement : judgements) {
    const Validator validator(Json::parse(judgement.schema));
    for (const char* valid : judgement.valid)
      EXPECT_TRUE(validator.check(Json::parse(valid)).empty()) << judgement.schema << ' ' << valid;
    for (const char* invalid : judgement.invalid)
      EXPECT_FALSE(validator.check(Json::parse(invalid)).empty()) << judgement.schema << ' ' << invalid;
  }
}

TEST(Validator, NamesThePlaceAndTheKeysThatAreKnownThere) {
  const Validator validator(
      Json::parse(R"({"properties": {"a": {"items": {"properties": {"x": true, "y": true}, )"
                  R"("additionalProperties": false}}}})"));
  const auto violations = validator.check(Json::parse(R"({"a": [{"x": 1}, {"z": 1}]})"));
  ASSERT_EQ(violations.size(), 1U);
  EXPECT_EQ(violations[0].address, "a[1]");
  EXPECT_EQ(violations[0].found, "z");
  EXPECT_EQ(violations[0].known, (std::vector<std::string>{"x", "y"}));
}

TEST(Validator, ThrowsWhereTheSchemaSaysWhatItDoesNotKnow) {
  EXPECT_THROW(static_cast<void>(Validator(Json{{"minimun", 1}}).check(1)), std::invalid_argument);
  EXPECT_THROW(static_cast<void>(Validator(Json{{"$ref", "#/$defs/none"}}).check(1)), std::invalid_argument);
}

} // namespace
} // namespace lightledger::schema
