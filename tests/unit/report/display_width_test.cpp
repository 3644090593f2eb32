#include "report/display_width.hpp"

#include <gtest/gtest.h>

namespace lightledger::report {
namespace {

TEST(DisplayWidth, OfAsciiIsItsLength) {
  EXPECT_EQ(display_width(""), 0);
  EXPECT_EQ(display_width("field lens"), 10);
}

TEST(DisplayWidth, CountsAccentedLettersOnceComposedOrNot) {
  EXPECT_EQ(display_width("fenêtre"), 7);
  EXPECT_EQ(display_width("fene\u0302tre"), 7);
}

TEST(DisplayWidth, CountsWideCharactersTwice) {
  EXPECT_EQ(display_width("窓"), 2);
  EXPECT_EQ(display_width("λ/4 板"), 6);
  EXPECT_EQ(display_width("\U0001F52D"), 2);
}

TEST(DisplayWidth, CountsAByteOutOfPlaceOnce) {
  EXPECT_EQ(display_width("a\xFFz"), 3);
  EXPECT_EQ(display_width("\xE7\xAA"), 2);
}

TEST(Shortened, KeepsWhatFits) {
  EXPECT_EQ(shortened("collimator", 10), "collimator");
}

TEST(Shortened, EndsInDotsWithinTheWidth) {
  EXPECT_EQ(shortened("collimator front", 12), "collimato...");
}

TEST(Shortened, NeverCutsACharacterInTwo) {
  EXPECT_EQ(shortened("窓窓窓窓窓", 8), "窓窓...");
}

TEST(OnOneLine, TurnsControlCharactersIntoBlanks) {
  EXPECT_EQ(on_one_line("a\nb\tc\x1b[31m\u0085"), "a b c [31m ");
}

TEST(OnOneLine, KeepsEverythingElse) {
  EXPECT_EQ(on_one_line("Fenster – 窓"), "Fenster – 窓");
}

} // namespace
} // namespace lightledger::report
