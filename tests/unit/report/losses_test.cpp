#include "report/losses.hpp"
#include "sample.hpp"

#include <gtest/gtest.h>

namespace lightledger::report {
namespace {

using analysis::StationBudget;

std::string sentence_of(const char* does, double StationBudget::*loss, double power) {
  StationBudget station = sample::station("plate", does, 1.0, 1.0 - power);
  station.*loss = power;
  return describe_losses({station}, false);
}

TEST(LargestLosses, ComeLargestFirstAndThreeAtMost) {
  EXPECT_EQ(describe_losses(sample::budget().stations, false),
            "Largest losses: fold absorbs 8.9 %, lens clips 2.0 %, window sends 0.14 % aside.");
}

TEST(LargestLosses, KeepTheOrderOfTheTrainWhereTheyAreEqual) {
  auto first = sample::station("first", "refract", 1.0, 0.9);
  auto second = sample::station("second", "refract", 0.9, 0.8);
  first.aside = second.aside = 0.1;
  EXPECT_EQ(describe_losses({first, second}, false),
            "Largest losses: first sends 10.0 % aside, second sends 10.0 % aside.");
}

TEST(LargestLosses, NameEveryKindInItsOwnWords) {
  EXPECT_EQ(sentence_of("refract", &StationBudget::aside, 0.04), "Largest loss: plate sends 4.0 % aside.");
  EXPECT_EQ(sentence_of("reflect", &StationBudget::aside, 0.04), "Largest loss: plate lets 4.0 % through.");
  EXPECT_EQ(sentence_of("refract", &StationBudget::absorbed, 0.04), "Largest loss: plate absorbs 4.0 %.");
  EXPECT_EQ(sentence_of("refract", &StationBudget::clipped, 0.04), "Largest loss: plate clips 4.0 %.");
  EXPECT_EQ(sentence_of("refract", &StationBudget::missed, 0.04), "Largest loss: 4.0 % misses plate.");
  EXPECT_EQ(sentence_of("refract", &StationBudget::scattered, 0.04), "Largest loss: plate scatters 4.0 %.");
  EXPECT_EQ(sentence_of("refract", &StationBudget::extra, 0.04),
            "Largest loss: plate loses 4.0 % to dust and ageing.");
  EXPECT_EQ(sentence_of("refract", &StationBudget::bulk, 0.04),
            "Largest loss: the medium after plate absorbs 4.0 %.");
}

TEST(LargestLosses, SayWhenThereIsNone) {
  EXPECT_EQ(describe_losses({sample::station("sensor", "detect", 1.0, 1.0)}, false), "Nothing is lost.");
}

TEST(LargestLosses, EmphasiseTheFirstAlone) {
  EXPECT_EQ(
      describe_losses(sample::budget().stations, true),
      "Largest losses: \x1b[1;31mfold absorbs 8.9 %\x1b[0m, lens clips 2.0 %, window sends 0.14 % aside.");
}

} // namespace
} // namespace lightledger::report
