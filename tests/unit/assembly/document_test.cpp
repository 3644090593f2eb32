#include <lightledger/assembly/document.hpp>

#include <gtest/gtest.h>

#include <string>

namespace lightledger::assembly {
namespace {

constexpr const char* two_lenses = R"(title: bench
light: {wavelengths: [{at: 532, weight: 2}, 633]}
train:
  - {name: field lens, tilt: [45, 0, 1], gap: 3}
  - {name: field lens.rear, clear: &open {diameter: 20}, gap: 4}
  - {name: light, clear: *open, gap: 5}
  - {name: "odd [1]", gap: 6}
)";

Document parse(std::string text) {
  Faults faults;
  Document document = Document::parse("f.yaml", std::move(text), faults);
  EXPECT_TRUE(faults.none());
  return document;
}

std::string scalar(const Document& document, std::string_view address) {
  const auto id = document.find(address);
  return id ? document.node(*id).scalar : "nothing";
}

std::string first_fault(std::string text) {
  Faults faults;
  const Document document = Document::parse("f.yaml", std::move(text), faults);
  return faults.none() ? "none" : faults.kept()[0].message;
}

TEST(Document, KnowsWhereKeysAndValuesStand) {
  const Document document = parse("a:\n  bc: [1, xy]\n");
  const Node& outer = document.node(*document.find("a"));
  EXPECT_EQ(outer.entries[0].key, "bc");
  EXPECT_EQ(outer.entries[0].key_mark.line, 2);
  EXPECT_EQ(outer.entries[0].key_mark.column, 3);
  EXPECT_EQ(document.locate("a.bc[1]").line, 2);
  EXPECT_EQ(document.locate("a.bc[1]").column, 11);
}

TEST(Document, TellsTextFromPlainScalars) {
  const Document document = parse("{a: 1, b: '1', c: ~, d: , e: null, f: !!str 1, g: !!null x}");
  EXPECT_FALSE(document.node(*document.find("a")).quoted);
  EXPECT_TRUE(document.node(*document.find("b")).quoted);
  EXPECT_EQ(document.node(*document.find("c")).kind, Node::Kind::null);
  EXPECT_EQ(document.node(*document.find("d")).kind, Node::Kind::null);
  EXPECT_EQ(document.node(*document.find("e")).kind, Node::Kind::null);
  EXPECT_TRUE(document.node(*document.find("f")).quoted);
  EXPECT_EQ(document.node(*document.find("g")).kind, Node::Kind::null);
}

TEST(Document, TakesLineEndsAndAByteOrderMarkFromElsewhere) {
  const Document document = parse("\xEF\xBB\xBF"
                                  "a: 1\r\nb: 2\r\n");
  EXPECT_EQ(scalar(document, "a"), "1");
  EXPECT_EQ(scalar(document, "b"), "2");
  EXPECT_EQ(document.locate("b").line, 2);
  EXPECT_EQ(document.locate("b").column, 4);
}

TEST(Document, LetsAnAliasShareItsAnchorsNode) {
  const Document document = parse(two_lenses);
  EXPECT_EQ(document.find("train[1].clear"), document.find("train[2].clear"));
}

TEST(Document, RefusesWhatIsNotText) {
  EXPECT_EQ(first_fault(std::string("a: 1\0", 5)), "the file is binary, not text");
  EXPECT_EQ(first_fault("a: \xff"), "these bytes are no UTF-8 text");
  EXPECT_EQ(first_fault("a: \xc0\xaf"), "these bytes are no UTF-8 text");
  EXPECT_EQ(first_fault("a: \x04 b"), "the control character 0x04 stands here");
  EXPECT_EQ(first_fault("\xff\xfe"
                        "a"),
            "the file is UTF-16 text");
}

TEST(Document, RefusesAFileWithoutAnyValue) {
  for (const char* text : {"", "\n\n", "# a comment\n", "---\n", "~"})
    EXPECT_EQ(first_fault(text), "the file is empty") << text;
}

TEST(Document, GoesOnAfterEqualKeys) {
  Faults faults;
  const Document document = Document::parse("f", "a: 1\nb: 2\na: 3\nb: 4\na: 5\n", faults);
  EXPECT_EQ(faults.count(), 3U);
  EXPECT_EQ(scalar(document, "a"), "1");
}

TEST(Document, AllowsSixtyFourLevels) {
  EXPECT_EQ(first_fault(std::string(64, '[') + std::string(64, ']')), "none");
  EXPECT_EQ(first_fault(std::string(65, '[') + std::string(65, ']')),
            "lists and mappings stand more than 64 deep in each other");
}

TEST(Document, CountsTheDepthThatAliasesBringAlong) {
  const std::string forty = std::string(40, '[') + std::string(40, ']');
  EXPECT_EQ(first_fault("a: &a " + forty + "\nb: [[[[*a]]]]"), "none");
  EXPECT_EQ(first_fault("a: &a " + forty + "\nb: &b " + std::string(20, '[') + "*a" + std::string(20, ']') +
                        "\nc: [[[[*b]]]]"),
            "lists and mappings stand more than 64 deep in each other");
}

TEST(Address, LeadsThroughKeysAndItems) {
  const Document document = parse(two_lenses);
  EXPECT_EQ(scalar(document, "title"), "bench");
  EXPECT_EQ(scalar(document, "light.wavelengths[0].weight"), "2");
  EXPECT_EQ(scalar(document, "light.wavelengths[1]"), "633");
  EXPECT_EQ(scalar(document, "train[1].gap"), "4");
}

TEST(Address, BeginsWithTheNameOfAStation) {
  const Document document = parse(two_lenses);
  EXPECT_EQ(scalar(document, "field lens.tilt[2]"), "1");
  EXPECT_EQ(scalar(document, "odd [1].gap"), "6");
}

TEST(Address, TakesTheLongestNameThatFits) {
  EXPECT_EQ(scalar(parse(two_lenses), "field lens.rear.gap"), "4");
}

TEST(Address, MeansTheSectionWhereAStationHasItsName) {
  EXPECT_EQ(scalar(parse(two_lenses), "light.wavelengths[1]"), "633");
  EXPECT_EQ(scalar(parse(two_lenses), "light.gap"), "nothing");
}

TEST(Address, IsNothingWhereItLeadsNowhere) {
  const Document document = parse(two_lenses);
  for (const char* address :
       {"", ".", "nothing", "train[4]", "train[-1]", "train[x]", "train[", "train[0", "train.0",
        "field lens.", "field lens..gap", "field lens.tilt[3]", "title.x", "train[99999999999999999999]"})
    EXPECT_FALSE(document.find(address)) << '"' << address << '"';
}

TEST(Address, IsLocatedAtTheNearestValueAround) {
  const Document document = parse(two_lenses);
  EXPECT_EQ(document.locate("field lens.roughness").line, 4);
  EXPECT_EQ(document.locate("field lens.tilt[7]").column, 30);
}

void set(Document& document, std::string_view address, std::string_view value) {
  Faults faults;
  document.set(address, value, faults);
  EXPECT_TRUE(faults.none());
}

TEST(Set, ReplacesAValue) {
  Document document = parse(two_lenses);
  set(document, "field lens.tilt", "[44, 2, 3]");
  set(document, "field lens.tilt[1]", "0.5 in");
  EXPECT_EQ(scalar(document, "field lens.tilt[0]"), "44");
  EXPECT_EQ(scalar(document, "field lens.tilt[1]"), "0.5 in");
}

TEST(Set, AddsTheLastKey) {
  Document document = parse(two_lenses);
  set(document, "field lens.radius", "30");
  set(document, "requirements", "[{quantity: delivered, at_least: 0.5}]");
  EXPECT_EQ(scalar(document, "train[0].radius"), "30");
  EXPECT_EQ(scalar(document, "requirements[0].at_least"), "0.5");
}

TEST(Set, LeavesOtherAliasesOfTheNodeAlone) {
  Document document = parse(two_lenses);
  set(document, "train[1].clear.diameter", "5");
  EXPECT_EQ(scalar(document, "train[1].clear.diameter"), "5");
  EXPECT_EQ(scalar(document, "train[2].clear.diameter"), "20");
}

TEST(Set, ChangesOneOfTwoAliasesInTheSameList) {
  Document document = parse("a: &a 1\nb: [*a, *a]\n");
  set(document, "b[1]", "2");
  EXPECT_EQ(scalar(document, "b[0]"), "1");
  EXPECT_EQ(scalar(document, "b[1]"), "2");
}

std::string fault_of_set(std::string_view address, std::string_view value) {
  Document document = parse(two_lenses);
  Faults faults;
  document.set(address, value, faults);
  return describe(faults, document.file(), document.text());
}

TEST(Set, SuggestsTheNearestAddress) {
  EXPECT_EQ(fault_of_set("feild lens.gap", "3"),
            "--set  nothing has the address 'feild lens.gap'\n    feild lens.gap=3\n    ^\n"
            "    did you mean 'field lens.gap'?\n");
  EXPECT_EQ(fault_of_set("field lens.titl[0]", "3"),
            "--set  nothing has the address 'field lens.titl[0]'\n    field lens.titl[0]=3\n    ^\n"
            "    did you mean 'field lens.tilt[0]'?\n");
}

TEST(Set, PointsIntoTheChangeAtAFaultOfSyntax) {
  EXPECT_EQ(fault_of_set("title", "[1, 2"),
            "--set  a list in brackets ends before it is complete\n    title=[1, 2\n               ^\n"
            "    accepted: [value, value]\n");
}

TEST(Set, LeavesTheDocumentAsItWasAfterAFault) {
  Document document = parse(two_lenses);
  Faults faults;
  document.set("title", "[1, 2", faults);
  EXPECT_EQ(scalar(document, "title"), "bench");
}

} // namespace
} // namespace lightledger::assembly
