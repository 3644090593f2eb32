#include <lightledger/assembly/load.hpp>

#include <gtest/gtest.h>

#include <filesystem>
#include <fstream>
#include <numbers>
#include <string>
#include <string_view>

namespace lightledger::assembly {
namespace {

using std::numbers::pi;

/// A folder with an assembly file in it, and one beside it that is outside.
class MeasuredCoating : public testing::Test {
protected:
  MeasuredCoating() {
    std::filesystem::remove_all(m_root);
    std::filesystem::create_directories(m_root / "inside/data");
  }
  ~MeasuredCoating() override { std::filesystem::remove_all(m_root); }

  void put(const std::string& name, std::string_view text) const {
    std::ofstream(m_root / name, std::ios::binary) << text;
  }
  [[nodiscard]] Loaded with(const std::string& measured, std::string_view wavelengths = "550",
                            bool allow_outside = false) const {
    put("inside/train.yaml", "coatings: {vendor: {measured: " + measured + "}}\nlight: {wavelengths: [" +
                                 std::string(wavelengths) +
                                 "], beam: {radius: 5}}\n"
                                 "train:\n"
                                 "  - {name: front, into: fused-silica, coating: vendor, gap: 1}\n"
                                 "  - {name: rear, into: air, coating: vendor, gap: 1}\n"
                                 "  - {name: pane, into: vacuum, coating: vendor, gap: 1}\n"
                                 "  - {name: fold, does: reflect, coating: vendor, gap: 1}\n"
                                 "  - {name: eye, does: detect}\n");
    return load(m_root / "inside/train.yaml", {}, {{}, allow_outside});
  }
  [[nodiscard]] Measured curves(const std::string& measured) const {
    const Loaded loaded = with(measured);
    EXPECT_EQ(loaded.report(), "");
    return loaded.assembly ? std::get<Measured>(loaded.assembly->coatings[0].kind) : Measured{};
  }
  [[nodiscard]] std::filesystem::path root() const { return m_root; }

private:
  std::filesystem::path m_root =
      std::filesystem::path(testing::TempDir()) /
      (std::string("lightledger-") + testing::UnitTest::GetInstance()->current_test_info()->name());
};

constexpr std::string_view plain = "wavelength_nm,angle_deg,Rs,Rp,Ts,Tp\n"
                                   "500,0,0.1,0.2,0.3,0.4\n"
                                   "600,0,0.5,0.6,0.25,0.125\n";

TEST_F(MeasuredCoating, ReadsRowsOfAnyOrderOntoAGrid) {
  put("inside/v.csv", "Tp,Rs,Rp,Ts,angle_deg,wavelength_nm\n"
                      "0.22,0.2,0.21,0.23,45,600\n0.12,0.1,0.11,0.13,45,500\n"
                      "0.42,0.4,0.41,0.43,0,600\n0.32,0.3,0.31,0.33,0,500\n");
  const Measured measured = curves("v.csv");
  EXPECT_EQ(measured.wavelengths_nm, (std::vector<double>{500, 600}));
  EXPECT_EQ(measured.angles_deg, (std::vector<double>{0, 45}));
  ASSERT_EQ(measured.points.size(), 4U);
  EXPECT_EQ(measured.points[1].reflect.s, 0.1);
  EXPECT_EQ(measured.points[1].reflect.p, 0.11);
  EXPECT_EQ(measured.points[1].transmit.s, 0.13);
  EXPECT_EQ(measured.points[1].transmit.p, 0.12);
  EXPECT_EQ(measured.points[2].reflect.s, 0.4);
}

TEST_F(MeasuredCoating, ReadsPerCentWhereTheNameSaysSo) {
  put("inside/v.csv", "wavelength_nm,angle_deg,Rs %,Rp %,Ts,Tp %\n500,0,10,0.5,0.3,40\n600,0,1,1,0.9,99\n");
  const Measured::Point point = curves("v.csv").points[0];
  EXPECT_EQ(point.reflect.s, 0.1);
  EXPECT_EQ(point.reflect.p, 0.005);
  EXPECT_EQ(point.transmit.s, 0.3);
  EXPECT_EQ(point.transmit.p, 0.4);
}

TEST_F(MeasuredCoating, ToleratesQuotesMarksAndLineEnds) {
  put("inside/v.csv",
      "\xef\xbb\xbf\"wavelength_nm\", angle_deg ,Rs,Rp,Ts,Tp\r\n\"500\",0,0.1,0.2,0.3,0.4\r\n\r\n"
      "600,0,0.5,0.6,0.25,0.125");
  const Measured measured = curves("v.csv");
  ASSERT_EQ(measured.points.size(), 2U);
  EXPECT_EQ(measured.points[1].transmit.p, 0.125);
}

TEST_F(MeasuredCoating, ReflectsBehindAsInFrontWithoutBackColumns) {
  put("inside/v.csv", plain);
  const Measured::Point point = curves("v.csv").points[1];
  EXPECT_EQ(point.reflect_back.s, 0.5);
  EXPECT_EQ(point.reflect_back.p, 0.6);
}

TEST_F(MeasuredCoating, ReadsBackColumns) {
  put("inside/v.csv", "wavelength_nm,angle_deg,Rs,Rp,Ts,Tp,Rp_back %,Rs_back\n500,0,0.1,0.2,0.3,0.4,6,0.07\n"
                      "600,0,0.1,0.2,0.3,0.4,6,0.07\n");
  const Measured::Point point = curves("v.csv").points[1];
  EXPECT_EQ(point.reflect_back.s, 0.07);
  EXPECT_EQ(point.reflect_back.p, 0.06);
}

TEST_F(MeasuredCoating, TakesIdealPhasesAndWarnsWithoutPhaseColumns) {
  put("inside/v.csv", plain);
  const Loaded loaded = with("v.csv");
  ASSERT_EQ(loaded.report(), "");
  const auto& measured = std::get<Measured>(loaded.assembly->coatings[0].kind);
  EXPECT_FALSE(measured.has_phases);
  EXPECT_EQ(measured.points[0].phases.rs, pi);
  EXPECT_EQ(measured.points[0].phases.rp, 0.0);
  EXPECT_EQ(loaded.warnings,
            (std::vector<std::string>{
                "coating 'vendor': 'v.csv' gives no phases; those of an ideal coating are taken"}));
}

constexpr std::string_view phased =
    "wavelength_nm,angle_deg,Rs,Rp,Ts,Tp,phase_rs_deg,phase_rp_deg,phase_ts_deg,"
    "phase_tp_deg\n"
    "500,0,0.1,0.2,0.3,0.4,-90,90.5,10,20\n"
    "500,30,0.1,0.2,0.3,0.4,-80,-120,10,20\n"
    "600,0,0.1,0.2,0.3,0.4,170,-10,-170,30\n"
    "600,30,0.1,0.2,0.3,0.4,-175,10,10,20\n";

TEST_F(MeasuredCoating, ReadsPhasesInRadians) {
  put("inside/v.csv", phased);
  const Loaded loaded = with("{file: v.csv, phases: delay}");
  ASSERT_EQ(loaded.report(), "");
  EXPECT_TRUE(loaded.warnings.empty());
  const auto& measured = std::get<Measured>(loaded.assembly->coatings[0].kind);
  EXPECT_TRUE(measured.has_phases);
  EXPECT_DOUBLE_EQ(measured.points[0].phases.rs, -pi / 2);
  EXPECT_DOUBLE_EQ(measured.points[0].phases.tp, pi / 9);
}

TEST_F(MeasuredCoating, TurnsPhasesOfTheOtherSignAround) {
  put("inside/v.csv", phased);
  const Measured measured = curves("{file: v.csv, phases: advance}");
  EXPECT_DOUBLE_EQ(measured.points[0].phases.rs, pi / 2);
  EXPECT_DOUBLE_EQ(measured.points[0].phases.ts, -pi / 18);
}

TEST_F(MeasuredCoating, CarriesPhasesOnFromTheirNeighbours) {
  put("inside/v.csv", phased);
  const auto points = curves("v.csv").points;
  EXPECT_NEAR(points[1].phases.rp, 240 * pi / 180, 1e-12);  // −120 beside 90.5
  EXPECT_NEAR(points[2].phases.rs, -190 * pi / 180, 1e-12); // 170 beside −90
  EXPECT_NEAR(points[3].phases.rs, -175 * pi / 180, 1e-12);
}

TEST_F(MeasuredCoating, KeepsItsMediumAndShiftIndex) {
  put("inside/v.csv", plain);
  const Loaded loaded = with("{file: v.csv, from: water, shift_index: 1.9}");
  ASSERT_EQ(loaded.report(), "");
  const auto& measured = std::get<Measured>(loaded.assembly->coatings[0].kind);
  EXPECT_EQ(loaded.assembly->media[*measured.from].name, "water");
  EXPECT_EQ(measured.shift_index, 1.9);
  EXPECT_FALSE(curves("v.csv").from);
  EXPECT_FALSE(curves("v.csv").shift_index);
}

TEST_F(MeasuredCoating, StandsOnTheSideThatIsNoGasAndNeedsNone) {
  put("inside/v.csv", plain);
  const Loaded loaded = with("v.csv");
  ASSERT_EQ(loaded.report(), "");
  const auto& surfaces = loaded.assembly->surfaces;
  EXPECT_EQ(surfaces[0].coating->substrate, Side::beyond);
  EXPECT_EQ(surfaces[1].coating->substrate, Side::before);
  EXPECT_EQ(surfaces[2].coating->substrate, Side::beyond);
  EXPECT_EQ(surfaces[3].coating->substrate, Side::beyond);
  EXPECT_FALSE(surfaces[3].beyond);
}

TEST_F(MeasuredCoating, ReachesToTheEndsOfItsWavelengths) {
  put("inside/v.csv", plain);
  EXPECT_EQ(with("v.csv", "500, 600").report(), "");
  EXPECT_EQ(with("v.csv", "600.5").faults.kept()[0].message,
            "'v.csv' reaches from 500 to 600 nm; the light has 600.5 nm");
}

TEST_F(MeasuredCoating, IsFoundInAFolderBelow) {
  put("inside/data/v.csv", plain);
  EXPECT_EQ(curves("./data/../data/v.csv").points.size(), 2U);
}

TEST_F(MeasuredCoating, MayLieOutsideOnlyWhereThatIsAllowed) {
  put("v.csv", plain);
  EXPECT_EQ(with("../v.csv").faults.kept()[0].message,
            "'../v.csv' lies outside the folder of the assembly file");
  EXPECT_EQ(with((root() / "v.csv").string()).faults.count(), 1U);
  EXPECT_EQ(with("../v.csv", "550", true).report(), "");
}

TEST_F(MeasuredCoating, IsOutsideWhereALinkLeadsOut) {
  put("v.csv", plain);
  std::filesystem::create_symlink(root() / "v.csv", root() / "inside/link.csv");
  std::filesystem::create_directory_symlink(root(), root() / "inside/up");
  EXPECT_EQ(with("link.csv").faults.kept()[0].message,
            "'link.csv' lies outside the folder of the assembly file");
  EXPECT_EQ(with("up/v.csv").faults.kept()[0].message,
            "'up/v.csv' lies outside the folder of the assembly file");
}

TEST_F(MeasuredCoating, DoesNotLieInAFolderWhoseNameOnlyBeginsAlike) {
  std::filesystem::create_directories(root() / "inside-out");
  put("inside-out/v.csv", plain);
  EXPECT_EQ(with("../inside-out/v.csv").faults.count(), 1U);
}

TEST_F(MeasuredCoating, IsRefusedBeyondEightMegabytes) {
  put("inside/v.csv", std::string((8U << 20U) + 1, '\n'));
  EXPECT_EQ(with("v.csv").faults.kept()[0].message,
            "'v.csv': the files of measured curves are larger than 8 MB");
}

TEST_F(MeasuredCoating, StopsAfterTwentyFaults) {
  std::string text = "wavelength_nm,angle_deg,Rs,Rp,Ts,Tp\n";
  for (int i = 0; i < 1000; ++i)
    text += "x,0,0,0,1,1\n";
  put("inside/v.csv", text);
  EXPECT_EQ(with("v.csv").faults.count(), 20U);
}

} // namespace
} // namespace lightledger::assembly
