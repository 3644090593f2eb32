#include "report/prose.hpp"

#include <gtest/gtest.h>

namespace lightledger::report {
namespace {

TEST(Wrapped, BreaksAtBlanksAndIndentsWhatFollows) {
  EXPECT_EQ(wrapped("one two three four", 9), "one two\n  three\n  four\n");
}

TEST(Wrapped, LeavesAWordWholeThatIsWiderThanTheLine) {
  EXPECT_EQ(wrapped("a incomprehensibilities b", 8), "a\n  incomprehensibilities\n  b\n");
}

TEST(Wrapped, UsesTheWholeWidth) {
  EXPECT_EQ(wrapped("123 567 9", 9), "123 567 9\n");
}

TEST(DescribePolarization, NamesTheAzimuthOfLinearLight) {
  EXPECT_EQ(describe_polarization(optics::linear(0.0)), "linear 0 deg");
  EXPECT_EQ(describe_polarization(optics::linear(45.0)), "linear 45 deg");
  EXPECT_EQ(describe_polarization(optics::linear(90.0)), "linear 90 deg");
}

TEST(DescribePolarization, NamesTheConventionOfHandedness) {
  EXPECT_EQ(describe_polarization({0.0, 0.0, 1.0}), "circular right (IEEE)");
  EXPECT_EQ(describe_polarization({0.0, 0.0, -1.0}), "circular left (IEEE)");
  EXPECT_EQ(describe_polarization(optics::elliptical(30.0, -10.0)),
            "elliptical left (IEEE), azimuth 30 deg, ellipticity -10 deg");
}

TEST(DescribePolarization, TellsTheDegreeOfPartlyPolarizedLight) {
  EXPECT_EQ(describe_polarization({}), "unpolarized");
  EXPECT_EQ(describe_polarization({0.5, 0.0, 0.0}), "linear 0 deg, 50.0 % polarized");
}

TEST(DescribeLight, CountsWavelengthsAndFieldsWhereThereAreSeveral) {
  assembly::Light light;
  light.wavelengths = {{660.0}, {480.0}, {532.0}};
  light.fields = {{}, {}};
  EXPECT_EQ(describe_light(light), "3 wavelengths 480 to 660 nm, unpolarized, 2 fields");
}

TEST(Heading, PutsTheLightOnALineOfItsOwnBesideALongTitle) {
  assembly::Assembly assembly;
  assembly.title = std::string(70, 'x');
  assembly.light.wavelengths = {{532.0}};
  EXPECT_EQ(heading(assembly, 80), std::string(70, 'x') + "\n532 nm, unpolarized\n");
}

TEST(DescribeWarnings, GivesEachItsOwnLine) {
  EXPECT_EQ(describe_warnings({"one", "two\nlines"}, 80), "Warning: one\nWarning: two lines\n");
}

} // namespace
} // namespace lightledger::report
