#include <lightledger/optics/polarization.hpp>

#include <gtest/gtest.h>

namespace lightledger::optics {
namespace {

TEST(Polarization, RightHandedLightHasPositiveS3) {
  EXPECT_DOUBLE_EQ(elliptical(0.0, 45.0).s3, 1.0);
}

TEST(Polarization, AzimuthTurnsFromXTowardY) {
  EXPECT_DOUBLE_EQ(linear(45.0).s2, 1.0);
}

TEST(Polarization, CoherencyOfRightCircularLightHasTheFieldOfY_LeadingByMinusI) {
  // E = (1, i)/√2 has S3 = 2 Im(Ex* Ey) = +1; ⟨Ex Ey*⟩ = −i/2.
  const Coherency matrix = coherency({0.0, 0.0, 1.0});
  EXPECT_DOUBLE_EQ(matrix.xy.imag(), -0.5);
  EXPECT_DOUBLE_EQ(matrix.xx + matrix.yy, 1.0);
}

} // namespace
} // namespace lightledger::optics
