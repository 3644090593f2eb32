#include <lightledger/report/coating.hpp>

#include <gmock/gmock.h>
#include <gtest/gtest.h>
#include <nlohmann/json.hpp>

namespace lightledger::report {
namespace {

using testing::HasSubstr;

analysis::CoatingCurve curve() {
  return {"ar",
          "air",
          "fused-silica",
          {{532.0, 0.0, {0.01, 0.98, 0.01, 180.0, -12.5}, {0.01, 0.98, 0.01, 0.0, -12.5}},
           {532.0, 45.0, {0.03, 0.97, 0.0, 180.0, {}}, {0.0, 1.0, 0.0, {}, 0.0}}}};
}

TEST(CoatingJson, HasEveryFigureInItsOrderAndNullForNoPhase) {
  const auto json =
      nlohmann::ordered_json::parse(coating_json({"0.1.0", "coating", "Title", {}}, curve()))["coating"];
  EXPECT_EQ(json["name"], "ar");
  EXPECT_EQ(json["incident"], "air");
  EXPECT_EQ(json["substrate"], "fused-silica");
  EXPECT_EQ(
      json["rows"][1].dump(),
      R"({"wavelength_nm":532.0,"angle_deg":45.0,"Rs":0.03,"Rp":0.0,"Ts":0.97,"Tp":1.0,"As":0.0,"Ap":0.0,)"
      R"("phase_rs_deg":180.0,"phase_rp_deg":null,"phase_ts_deg":null,"phase_tp_deg":0.0})");
}

TEST(CoatingCsv, IsTheSameTable) {
  EXPECT_EQ(
      coating_csv(curve()),
      "wavelength_nm,angle_deg,Rs,Rp,Ts,Tp,As,Ap,phase_rs_deg,phase_rp_deg,phase_ts_deg,phase_tp_deg\r\n"
      "532,0,0.01,0.01,0.98,0.98,0.01,0.01,180,0,-12.5,-12.5\r\n"
      "532,45,0.03,0,0.97,1,0,0,180,,,0\r\n");
}

TEST(CoatingText, NamesTheMediaAndTheRangeOfTheReflectance) {
  EXPECT_EQ(coating_text(curve(), {}, {}),
            R"(ar    from air to fused-silica

wavelength nm  angle deg       Rs       Rp       Ts       Tp       As       Ap
          532          0   0.0100   0.0100   0.9800   0.9800   0.0100   0.0100
          532         45   0.0300        -   0.9700   1.0000        -        -

Reflects from 1.0 % at 532 nm, 0 deg to 1.5 % at 532 nm, 45 deg.
)");
}

TEST(CoatingText, ShowsPhasesWhereTheyFit) {
  const std::string text = coating_text(curve(), {}, {.width = 120});
  EXPECT_THAT(text, HasSubstr("Ap   rs deg   rp deg   ts deg   tp deg\n"));
  EXPECT_THAT(text, HasSubstr("180.00     0.00   -12.50   -12.50\n"));
}

TEST(CoatingText, GivesFractionsInDecibelsOnRequest) {
  EXPECT_THAT(coating_text(curve(), {}, {.decibels = true}), HasSubstr("-20.000  -20.000   -0.088"));
}

} // namespace
} // namespace lightledger::report
