#include "report/csv.hpp"
#include "sample.hpp"

#include <lightledger/report/budget.hpp>

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <sstream>
#include <string>

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
            "transmittance,pass_s,pass_p,incidence_min_deg,incidence_mean_deg,incidence_max_deg,"
            "wavelength_nm,field,field_x,field_y");
  EXPECT_NE(
      csv.find("\r\n1,window,refract,1,0.9986,0.0014,0,0,0,0,0,0,0.9986,0.9986,0.9986,0,0.5,1.25,,,,\r\n"),
      std::string::npos);
}

TEST(BudgetCsv, EndsWithWhatIsDeliveredOfEachWavelengthAndField) {
  const std::string csv = budget_csv(sample::budget());
  EXPECT_TRUE(csv.ends_with("\r\n4,sensor,detect,,0.88989,,,,,,,,,,,,,,532,,,\r\n"
                            "4,sensor,detect,,0.88989,,,,,,,,,,,,,,,1,0,0\r\n"));
  EXPECT_EQ(std::ranges::count(csv, '\n'), 7);
}

TEST(BudgetCsv, HasAsManyCellsInEveryRow) {
  std::istringstream rows(budget_csv(sample::budget()));
  for (std::string row; std::getline(rows, row);)
    EXPECT_EQ(std::ranges::count(row, ','), 21) << row;
}

TEST(BudgetCsv, HasAllStationsOfASplitWavelength) {
  analysis::Budget budget = sample::budget();
  budget.ledgers = {{532.0, std::nullopt, {budget.stations[0], budget.stations[1]}}};
  const std::string csv = budget_csv(budget);
  EXPECT_NE(
      csv.find(
          "\r\n1,window,refract,1,0.9986,0.0014,0,0,0,0,0,0,0.9986,0.9986,0.9986,0,0.5,1.25,532,,,\r\n2,"),
      std::string::npos);
  EXPECT_EQ(std::ranges::count(csv, '\n'), 8);
}

TEST(BudgetCsv, HasAllStationsOfASplitFieldAndNumbersAnUnnamedOne) {
  analysis::Budget budget = sample::budget();
  budget.by_field = {{"axis", {0.0, 0.0}, 0.9}, {std::nullopt, {0.0, 0.4}, 0.8}};
  budget.ledgers = {{std::nullopt, "axis", {budget.stations[3]}},
                    {std::nullopt, std::nullopt, {budget.stations[3]}}};
  const std::string csv = budget_csv(budget);
  EXPECT_TRUE(csv.ends_with("\r\n1,sensor,detect,0.88989,0.88989,0,0,0,0,0,0,0,,,,,,,,axis,0,0\r\n"
                            "1,sensor,detect,0.88989,0.88989,0,0,0,0,0,0,0,,,,,,,,2,0,0.4\r\n"));
}

} // namespace
} // namespace lightledger::report
