#include "report/base64.hpp"

#include <lightledger/assembly/load.hpp>
#include <lightledger/report/page.hpp>

#include <gmock/gmock.h>
#include <gtest/gtest.h>
#include <nlohmann/json.hpp>

#include <filesystem>
#include <string>

namespace lightledger::report {
namespace {

using testing::HasSubstr;
using testing::Not;
using testing::StartsWith;

struct Made {
  assembly::Assembly assembly;
  PageContent content;
};

Made made(const std::string& title = "Rain window") {
  const auto path = std::filesystem::path(LIGHTLEDGER_SOURCE_DIR) / "systems/minimal.yaml";
  assembly::Loaded loaded = assembly::load(path, {{"light.rays", "{pattern: rings, rings: 2, spokes: 4}"}});
  EXPECT_TRUE(loaded.assembly) << loaded.report();
  assembly::Assembly assembly = *std::move(loaded.assembly);
  assembly.title = title;
  analysis::Budget budget = *analysis::budget(assembly, {.split = analysis::Split::both}).budget;
  PageContent content{{"0.1.0", "report", title, {"mind the gap"}},
                      "minimal.yaml",
                      "train: <3>\n",
                      budget,
                      analysis::judge_all(assembly, budget),
                      *analysis::drawing(assembly).drawing,
                      {},
                      {},
                      {},
                      {},
                      {}};
  return {std::move(assembly), std::move(content)};
}

std::string page_of(const Made& what) {
  return page(what.assembly, what.content);
}

/// The text between two marks.
std::string between(const std::string& text, const std::string& before, const std::string& after) {
  const std::size_t start = text.find(before) + before.size();
  return text.substr(start, text.find(after, start) - start);
}

const std::string data_start = "<script type=\"application/json\" id=\"data\">";

TEST(Page, IsOneDocumentThatMayAskForNothing) {
  const std::string html = page_of(made());
  EXPECT_THAT(html, StartsWith("<!DOCTYPE html>"));
  EXPECT_THAT(html, HasSubstr("default-src 'none'"));
  EXPECT_THAT(html, Not(HasSubstr(" src=\"http")));
  EXPECT_THAT(html, Not(HasSubstr("{{")));
}

TEST(Page, HoldsTheDataOfTheCommands) {
  const Made what = made();
  const auto data = nlohmann::json::parse(between(page_of(what), data_start, "</script>"));
  EXPECT_EQ(data["budget"]["budget"]["delivered"].get<double>(), what.content.budget.delivered);
  EXPECT_EQ(data["budget"]["command"], "budget");
  EXPECT_EQ(data["check"]["check"]["all_met"], true);
  EXPECT_TRUE(data["ghosts"].is_null());
  EXPECT_EQ(data["budget"]["warnings"][0], "mind the gap");
}

TEST(Page, TakesAnyTitleAsText) {
  const std::string title = "</script><script>alert(1)</script>";
  const std::string html = page_of(made(title));
  EXPECT_THAT(html, Not(HasSubstr("<script>alert")));
  const auto data = nlohmann::json::parse(between(html, data_start, "</script>"));
  EXPECT_EQ(data["budget"]["title"], title);
}

TEST(Page, ShowsTheInputAsItStands) {
  EXPECT_THAT(page_of(made()), HasSubstr("train: &lt;3&gt;\n</pre>"));
}

TEST(Page, LeavesFaintGhostsToTheirCommand) {
  Made what = made();
  nlohmann::json paths = nlohmann::json::array();
  for (int i = 0; i < 100'000; ++i)
    paths.push_back({{"bounces", {"a", "b"}}, {"power", 1e-9}});
  what.content.ghosts = nlohmann::json{{"ghosts", {{"paths", paths}}}}.dump();
  const std::string html = page_of(what);
  EXPECT_LT(html.size(), 1'000'000U);
  const auto data = nlohmann::json::parse(between(html, data_start, "</script>"));
  const std::size_t kept = data["ghosts"]["ghosts"]["paths"].size();
  EXPECT_GT(kept, 1000U);
  EXPECT_EQ(data["pictures"]["left_out"].get<std::size_t>() + kept, 100'000U);
}

TEST(PageJson, HasTheEnvelopeAndEachCommandsDocument) {
  const Made what = made();
  const auto json = nlohmann::json::parse(page_json(what.assembly, what.content));
  EXPECT_EQ(json["command"], "report");
  EXPECT_EQ(json["report"]["check"]["command"], "check");
}

TEST(PageText, SaysTheVerdictAndWhereThePageIs) {
  const Made what = made();
  const std::string text = page_text(what.assembly, what.content, "out.html", {});
  EXPECT_THAT(text, HasSubstr("Every requirement is met."));
  EXPECT_THAT(text, HasSubstr("The page is in out.html."));
  EXPECT_THAT(text, HasSubstr("Warning: mind the gap"));
}

/// Test vectors of RFC 4648, section 10.
TEST(Base64, HasTheVectorsOfItsStandard) {
  EXPECT_EQ(base64(""), "");
  EXPECT_EQ(base64("f"), "Zg==");
  EXPECT_EQ(base64("fo"), "Zm8=");
  EXPECT_EQ(base64("foo"), "Zm9v");
  EXPECT_EQ(base64("foobar"), "Zm9vYmFy");
  EXPECT_EQ(base64("\xFF\xFE"), "//4=");
}

} // namespace
} // namespace lightledger::report
