#include <lightledger/report/media.hpp>

#include <gtest/gtest.h>
#include <nlohmann/json.hpp>

namespace lightledger::report {
namespace {

using analysis::MediumEntry;

const Envelope envelope{"0.1.0", "media", std::nullopt, {}};

const MediumEntry air{"air", {}, 1.0, "by convention", {}};
const MediumEntry metal{"metal", {400.0, 700.0}, 0.5, "measured, once", {}};

MediumEntry metal_with_rows() {
  MediumEntry entry = metal;
  entry.rows = {{500.0, optics::Index{0.6, 3.25}}, {800.0, std::nullopt}};
  return entry;
}

TEST(MediaJson, HasNoTitleAndNullForAnUnboundedRange) {
  const auto json = nlohmann::ordered_json::parse(media_json(envelope, {air, metal}));
  EXPECT_TRUE(json["title"].is_null());
  EXPECT_EQ(json["media"].dump(),
            R"([{"name":"air","range_nm":[0.0,null],"index_587":1.0,"source":"by convention"},)"
            R"({"name":"metal","range_nm":[400.0,700.0],"index_587":0.5,"source":"measured, once"}])");
}

TEST(MediaJson, HasRowsWithWavelengths) {
  const auto json = nlohmann::ordered_json::parse(media_json(envelope, {metal_with_rows()}));
  EXPECT_EQ(
      json["media"][0]["rows"].dump(),
      R"([{"wavelength_nm":500.0,"n":0.6,"kappa":3.25},{"wavelength_nm":800.0,"n":null,"kappa":null}])");
}

TEST(MediaCsv, ListsMediaOrTheirRows) {
  EXPECT_EQ(media_csv({air, metal}), "name,from_nm,to_nm,index_587,source\r\n"
                                     "air,0,,1,by convention\r\n"
                                     "metal,400,700,0.5,\"measured, once\"\r\n");
  EXPECT_EQ(media_csv({metal_with_rows()}), "name,wavelength_nm,n,kappa\r\n"
                                            "metal,500,0.6,3.25\r\n"
                                            "metal,800,,\r\n");
}

TEST(MediaText, ListsOneMediumALine) {
  EXPECT_EQ(media_text({air, metal}, {}, {}), "medium  range nm    n 587.6 nm  source\n"
                                              "air     any           1.000000  by convention\n"
                                              "metal   400 to 700    0.500000  measured, once\n");
}

TEST(MediaText, GivesTheTableOfASingleMedium) {
  EXPECT_EQ(media_text({metal_with_rows()}, {}, {}), "metal    400 to 700 nm    n at 587.6 nm: 0.500000\n"
                                                     "Source: measured, once\n\n"
                                                     "wavelength nm         n      kappa\n"
                                                     "          500  0.600000  3.250e+00\n"
                                                     "          800         -          -\n");
}

TEST(MediaText, EndsWithTheWarnings) {
  const std::string text = media_text({metal_with_rows()}, {"nothing changes"}, {});
  EXPECT_TRUE(text.ends_with("\nWarning: nothing changes\n"));
}

} // namespace
} // namespace lightledger::report
