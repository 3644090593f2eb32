#include <lightledger/assembly/diagnostics.hpp>

#include <gtest/gtest.h>

#include <algorithm>
#include <string>

namespace lightledger::assembly {
namespace {

const std::vector<std::string_view> keys{"name", "does", "radius", "conic", "gap", "clear", "into", "tilt"};

TEST(Nearest, FindsAMistypedWord) {
  EXPECT_EQ(nearest("raduis", keys), "radius");
  EXPECT_EQ(nearest("gpa", keys), "gap");
  EXPECT_EQ(nearest("connic", keys), "conic");
}

TEST(Nearest, OverlooksCase) {
  EXPECT_EQ(nearest("GAP", keys), "gap");
}

TEST(Nearest, IsSilentWhenNothingIsNear) {
  EXPECT_EQ(nearest("thickness", keys), "");
  EXPECT_EQ(nearest("x", keys), "");
  EXPECT_EQ(nearest("", keys), "");
}

TEST(Nearest, DoesNotTakeOneNumberForAnother) {
  EXPECT_EQ(nearest("A21", {"A20", "A11"}), "");
}

TEST(Nearest, GivesUpOnWordsThatNoKeyCouldBe) {
  EXPECT_EQ(nearest(std::string(1'000'000, 'g'), keys), "");
}

TEST(Faults, KeepTwentyAndCountAll) {
  Faults faults;
  for (int i = 0; i < 30; ++i)
    faults.add({{i + 1, 1}, "wrong", {}, {}});
  EXPECT_EQ(faults.count(), 30U);
  EXPECT_EQ(faults.kept().size(), 20U);
  EXPECT_EQ(faults.kept().back().mark.line, 20);
}

std::string report(Fault fault, std::string_view text, std::string_view file = "a.yaml") {
  Faults faults;
  faults.add(std::move(fault));
  return describe(faults, file, text);
}

TEST(Describe, PutsACaretUnderTheColumn) {
  EXPECT_EQ(report({{2, 3}, "this is wrong", "that", "other"}, "a: 1\nb: 2\n"),
            "a.yaml:2:3  this is wrong\n    b: 2\n      ^\n    accepted: that\n    did you mean 'other'?\n");
}

TEST(Describe, NamesTheFileAloneWhereThereIsNoPlace) {
  EXPECT_EQ(report({{}, "the file is empty", {}, {}}, ""), "a.yaml  the file is empty\n");
}

TEST(Describe, CountsCharactersWhereMarksCountBytes) {
  EXPECT_EQ(report({{1, 8}, "wrong", {}, {}}, "größe: x"), "a.yaml:1:6  wrong\n    größe: x\n         ^\n");
}

TEST(Describe, ShowsATabAsOneBlank) {
  EXPECT_EQ(report({{1, 4}, "wrong", {}, {}}, "\ta:\tx\r\n"), "a.yaml:1:4  wrong\n     a: x\n       ^\n");
}

TEST(Describe, StandsAPlaceBeyondTheLineAtItsEnd) {
  EXPECT_EQ(report({{1, 99}, "wrong", {}, {}}, "ab"), "a.yaml:1:3  wrong\n    ab\n      ^\n");
}

TEST(Describe, KeepsTerminalCommandsOut) {
  const std::string text = report({{1, 1},
                                   "wrong \x1b[31m",
                                   "\x1b]0;x\x07",
                                   "a\x9b"
                                   "b"},
                                  "\x1b[2J \xe2\x80\x8b");
  EXPECT_EQ(text,
            "a.yaml:1:1  wrong ?[31m\n    ?[2J ?\n    ^\n    accepted: ?]0;x?\n    did you mean 'a?b'?\n");
}

TEST(Describe, SortsByPlaceAndSaysHowMany) {
  Faults faults;
  faults.add({{2, 1}, "second", {}, {}});
  faults.add({{1, 1}, "first", {}, {}});
  EXPECT_EQ(describe(faults, "f", "a\nb"),
            "f:1:1  first\n    a\n    ^\nf:2:1  second\n    b\n    ^\n2 faults; nothing was written\n");
}

TEST(Describe, StaysBelowFortyKilobytesWhateverItIsGiven) {
  std::string wide;
  for (int i = 0; i < 100'000; ++i)
    wide += "\xf0\x9f\x94\xad";
  Faults faults;
  for (int i = 0; i < 100; ++i)
    faults.add({{1, 200'001}, wide, wide, wide});
  const std::string text = describe(faults, wide, wide);
  EXPECT_LT(text.size(), 40'000U);
  EXPECT_EQ(std::count(text.begin(), text.end(), '^'), 20);
}

TEST(Describe, CutsALongLineAroundTheCaret) {
  const std::string line = std::string(500, 'a') + "X" + std::string(500, 'b');
  EXPECT_EQ(report({{1, 501}, "wrong", {}, {}}, line), "a.yaml:1:501  wrong\n    …" + std::string(40, 'a') +
                                                           "X" + std::string(59, 'b') + "…\n    " +
                                                           std::string(41, ' ') + "^\n");
}

} // namespace
} // namespace lightledger::assembly
