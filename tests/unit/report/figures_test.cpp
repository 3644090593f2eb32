#include "report/figures.hpp"

#include <gtest/gtest.h>

namespace lightledger::report {
namespace {

TEST(Fraction, HasFourDecimalsATrailingZeroIncluded) {
  EXPECT_EQ(fraction(1.0), "1.0000");
  EXPECT_EQ(fraction(0.99860), "0.9986");
  EXPECT_EQ(fraction(0.5), "0.5000");
}

TEST(Fraction, IsADashForExactlyNothingOnly) {
  EXPECT_EQ(fraction(0.0), "-");
  EXPECT_EQ(fraction(-0.0), "-");
  EXPECT_EQ(fraction(5e-324), "<0.0001");
}

TEST(Fraction, IsBelowTheLastDigitForNearlyNothingOfEitherSign) {
  EXPECT_EQ(fraction(4.9e-5), "<0.0001");
  EXPECT_EQ(fraction(-1e-17), "<0.0001");
  EXPECT_EQ(fraction(5.1e-5), "0.0001");
}

TEST(Decibels, AreTenTimesTheLogarithm) {
  EXPECT_EQ(decibels(0.5), "-3.010");
  EXPECT_EQ(decibels(1e-12), "-120.000");
}

TEST(Decibels, AreNeverMinusZero) {
  EXPECT_EQ(decibels(1.0), "0.000");
  EXPECT_EQ(decibels(1.0 - 1e-9), "0.000");
}

TEST(Decibels, AreADashForNothing) {
  EXPECT_EQ(decibels(0.0), "-");
}

TEST(PerCent, HasTwoSignificantDigitsAndOneDecimalFromTen) {
  EXPECT_EQ(per_cent(0.0887), "8.9 %");
  EXPECT_EQ(per_cent(0.02), "2.0 %");
  EXPECT_EQ(per_cent(0.0041), "0.41 %");
  EXPECT_EQ(per_cent(0.00041), "0.041 %");
  EXPECT_EQ(per_cent(0.4321), "43.2 %");
  EXPECT_EQ(per_cent(0.0996), "10.0 %");
  EXPECT_EQ(per_cent(1.0), "100.0 %");
}

TEST(PerCent, OfNearlyNothingNamesTheBound) {
  EXPECT_EQ(per_cent(9e-5), "<0.01 %");
}

TEST(Count, GroupsItsDigitsByThree) {
  EXPECT_EQ(count(7), "7");
  EXPECT_EQ(count(512), "512");
  EXPECT_EQ(count(16384), "16 384");
  EXPECT_EQ(count(4294967296), "4 294 967 296");
}

TEST(Duration, ChangesItsUnitAtASecond) {
  EXPECT_EQ(duration(0.021), "21 ms");
  EXPECT_EQ(duration(3.44), "3.4 s");
}

TEST(Plain, LeavesTrailingZerosAway) {
  EXPECT_EQ(plain(532.0), "532");
  EXPECT_EQ(plain(0.1), "0.1");
  EXPECT_EQ(plain(587.5618), "587.562");
}

TEST(ErrorSize, HasOneDigit) {
  EXPECT_EQ(error_size(2.4e-16), "2e-16");
  EXPECT_EQ(error_size(0.0), "0");
}

} // namespace
} // namespace lightledger::report
