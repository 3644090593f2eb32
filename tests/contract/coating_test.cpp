#include "program.hpp"
#include "systems.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lightledger::contract {
namespace {

using testing::HasSubstr;
using Keys = std::vector<std::string>;

TEST(CoatingCommand, KeepsTheContractsKeysAndTheirOrder) {
  const Json json = json_of({"coating", lidar, "lens_ar"});
  EXPECT_EQ(keys_of(json), (Keys{"lightledger", "contract", "command", "title", "warnings", "coating"}));
  EXPECT_EQ(keys_of(json["coating"]), (Keys{"name", "incident", "substrate", "rows"}));
  EXPECT_EQ(keys_of(json["coating"]["rows"][0]),
            (Keys{"wavelength_nm", "angle_deg", "Rs", "Rp", "Ts", "Tp", "As", "Ap", "phase_rs_deg",
                  "phase_rp_deg", "phase_ts_deg", "phase_tp_deg"}));
}

TEST(CoatingCommand, TakesItsDefaultsFromTheFile) {
  const Json coating = json_of({"coating", lidar, "lens_ar"})["coating"];
  EXPECT_EQ(coating["incident"], "air");
  EXPECT_EQ(coating["substrate"], "crown-517642");
  ASSERT_EQ(coating["rows"].size(), 1U);
  EXPECT_EQ(coating["rows"][0]["wavelength_nm"], 532.0);
  EXPECT_EQ(coating["rows"][0]["angle_deg"], 0.0);
}

TEST(CoatingCommand, IncludesTheEndOfARangeThatIsHit) {
  const Json rows = json_of({"coating", lidar, "lens_ar", "--wavelengths", "500:501:0.1", "--angles",
                             "0:25:10"})["coating"]["rows"];
  ASSERT_EQ(rows.size(), 11U * 3U);
  EXPECT_EQ(rows.back()["wavelength_nm"], 501.0);
  EXPECT_EQ(rows.back()["angle_deg"], 20.0);
  EXPECT_EQ(rows[1]["wavelength_nm"], 500.0);
  EXPECT_EQ(rows[1]["angle_deg"], 10.0);
}

TEST(CoatingCommand, ConservesPower) {
  for (const char* name : {"hard_ar", "lens_ar", "protected", "line_filter"}) {
    const Json result = json_of({"coating", lidar, name, "--angles", "0:90:15"});
    for (const Json& row : result["coating"]["rows"])
      for (const char* polarization : {"s", "p"})
        EXPECT_NEAR(row[std::string("R") + polarization].get<double>() +
                        row[std::string("T") + polarization].get<double>() +
                        row[std::string("A") + polarization].get<double>(),
                    1.0, 1e-12)
            << name << ' ' << row;
  }
}

TEST(CoatingCommand, OfTheBareBoundaryIsFresnels) {
  const Json row = json_of({"coating", minimal, "bare"})["coating"]["rows"][0];
  const double n = 1.46071; // fused silica at 532 nm, Malitson (1965)
  EXPECT_NEAR(row["Rs"].get<double>(), (n - 1) * (n - 1) / ((n + 1) * (n + 1)), 1e-6);
  EXPECT_EQ(row["phase_rs_deg"], 180.0);
  EXPECT_EQ(row["phase_rp_deg"], 0.0);
  EXPECT_EQ(row["As"], 0.0);
}

TEST(CoatingCommand, HasNoTransmittedPhaseIntoAnOpaqueSubstrate) {
  const Json row = json_of({"coating", lidar, "protected", "--angles", "45"})["coating"]["rows"][0];
  EXPECT_GT(row["Ts"].get<double>(), 0.0);
  EXPECT_TRUE(row["phase_ts_deg"].is_null());
  EXPECT_FALSE(row["phase_rs_deg"].is_null());
}

TEST(CoatingCommand, IsTotallyReflectedBeyondTheCriticalAngle) {
  const Json row = json_of({"coating", lidar, "lens_ar", "--incident", "crown-517642", "--substrate", "air",
                            "--angles", "60"})["coating"]["rows"][0];
  EXPECT_EQ(row["Ts"], 0.0);
  EXPECT_EQ(row["Tp"], 0.0);
  EXPECT_NEAR(row["Rs"].get<double>(), 1.0, 1e-13);
  EXPECT_TRUE(row["phase_ts_deg"].is_null());
}

TEST(CoatingCommand, WritesTheSameTableAsCsv) {
  const Outcome outcome = run({"coating", lidar, "line_filter", "--csv", "-"});
  EXPECT_THAT(outcome.out, HasSubstr("wavelength_nm,angle_deg,Rs,Rp,Ts,Tp,As,Ap,phase_rs_deg,"));
  EXPECT_THAT(outcome.out, HasSubstr("\r\n532,0,0.06,0.06,0.92,0.92,"));
}

TEST(CoatingCommand, RefusesWhatItCannotCompute) {
  for (const auto& [arguments, message] :
       {std::pair<Arguments, const char*>{{"nothing"}, "the file has no coating 'nothing'"},
        {{"lens_ar", "--substrate", "cheese"}, "there is no medium 'cheese' for --substrate"},
        {{"lens_ar", "--incident", "Al"}, "Al is opaque at 532 nm"},
        {{"lens_ar", "--angles", "0:100:10"}, "100 deg is no angle of incidence"},
        {{"lens_ar", "--wavelengths", "50"}, "is known from"}}) {
    Arguments all{"coating", lidar};
    all.insert(all.end(), arguments.begin(), arguments.end());
    const Outcome outcome = run(all);
    EXPECT_EQ(outcome.code, 2) << message;
    EXPECT_EQ(outcome.out, "");
    EXPECT_THAT(outcome.err, HasSubstr(message));
  }
}

TEST(MediaCommand, KeepsTheContractsKeysAndTheirOrder) {
  const Json json = json_of({"media"});
  EXPECT_EQ(keys_of(json), (Keys{"lightledger", "contract", "command", "title", "warnings", "media"}));
  EXPECT_TRUE(json["title"].is_null());
  EXPECT_EQ(keys_of(json["media"][0]), (Keys{"name", "range_nm", "index_587", "source"}));
  EXPECT_EQ(json["media"][0]["name"], "air");
}

TEST(MediaCommand, PrintsIndicesOfOneMedium) {
  const Json media = json_of({"media", "fused-silica", "--wavelengths", "400:700:50"})["media"];
  ASSERT_EQ(media.size(), 1U);
  EXPECT_EQ(keys_of(media[0]), (Keys{"name", "range_nm", "index_587", "source", "rows"}));
  ASSERT_EQ(media[0]["rows"].size(), 7U);
  EXPECT_EQ(keys_of(media[0]["rows"][0]), (Keys{"wavelength_nm", "n", "kappa"}));
  EXPECT_NEAR(media[0]["rows"][0]["n"].get<double>(), 1.47012, 5e-6);
}

TEST(MediaCommand, RefusesWhatIsNotKnown) {
  const Outcome range = run({"media", "fused-silica", "--wavelengths", "100"});
  EXPECT_EQ(range.code, 2);
  EXPECT_THAT(range.err, HasSubstr("fused-silica is known from 210 to 3710 nm, not at 100 nm"));
  const Outcome name = run({"media", "fused-silca"});
  EXPECT_EQ(name.code, 2);
  EXPECT_THAT(name.err, HasSubstr("did you mean 'fused-silica'?"));
}

} // namespace
} // namespace lightledger::contract
