#include "report/csv.hpp"
#include "sample.hpp"

#include <lightledger/report/budget.hpp>

#include <gtest/gtest.h>

#include <cmath>

namespace lightledger::report {
namespace {

std::string first_line(const std::string& text) {
  return text.substr(0, text.find("\r\n"));
}

TEST(Csv, QuotesOnlyWhatNeedsIt) {
  Csv csv;
  csv.cell("plain").cell("a,b").cell("say \"so\"").cell("two\nlines").end_row();
  EXPECT_EQ(csv.text(), "plain,\"a,b\",\"say \"\"so\"\"\",\"two\nlines\"\r\n");
}

TEST(Csv, WritesNumbersThatReadBackTheSame) {
  Csv csv;
  csv.cell(0.1 + 0.2).cell(-0.0).cell(1e-300).end_row();
  EXPECT_EQ(csv.text(), "0.30000000000000004,0,1e-300\r\n");
}

TEST(Csv, LeavesTheCellEmptyWhereThereIsNoNumber) {
  Csv csv;
  csv.cell(std::nullopt).cell(std::nan("")).cell(1.0).end_row();
  EXPECT_EQ(csv.text(), ",,1\r\n");
}

TEST(BudgetCsv, HasOneRowAStationUnderItsHeadings) {
  const std::string csv = budget_csv(sample::budget());
  EXPECT_EQ(first_line(csv),
            "station,name,does,incident,onward,aside,absorbed,clipped,missed,scattered,extra,bulk,"
            "transmittance,pass_s,pass_p,incidence_min_deg,incidence_mean_deg,incidence_max_deg");
  EXPECT_EQ(std::ranges::count(csv, '\n'), 5);
  EXPECT_NE(csv.find("\r\n1,window,refract,1,0.9986,0.0014,0,0,0,0,0,0,0.9986,0.9986,0.9986,0,0.5,1.25\r\n"),
            std::string::npos);
}

TEST(BudgetCsv, NamesTheWavelengthOfASplitRowFirst) {
  analysis::Budget budget = sample::budget();
  budget.ledgers = {{532.0, std::nullopt, {budget.stations[1]}}};
  const std::string csv = budget_csv(budget);
  EXPECT_TRUE(csv.starts_with("wavelength_nm,station,name"));
  EXPECT_NE(csv.find("\r\n,1,window"), std::string::npos);
  EXPECT_NE(csv.find("\r\n532,1,fold"), std::string::npos);
}

TEST(BudgetCsv, NumbersAnUnnamedField) {
  analysis::Budget budget = sample::budget();
  budget.ledgers = {{std::nullopt, "axis", {budget.stations[1]}},
                    {std::nullopt, std::nullopt, {budget.stations[1]}}};
  const std::string csv = budget_csv(budget);
  EXPECT_TRUE(csv.starts_with("field,station,name"));
  EXPECT_NE(csv.find("\r\naxis,1,fold"), std::string::npos);
  EXPECT_NE(csv.find("\r\n2,1,fold"), std::string::npos);
}

} // namespace
} // namespace lightledger::report
