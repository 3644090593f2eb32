#include "report/table.hpp"

#include <gtest/gtest.h>

namespace lightledger::report {
namespace {

TEST(Table, AlignsColumnsUnderTheirHeadings) {
  Table table({{"name", Align::left}, {"share"}});
  table.add({"window", "1.0000"});
  table.add({"fold", "-"});
  EXPECT_EQ(table.text(false), "name     share\n"
                               "window  1.0000\n"
                               "fold         -\n");
}

TEST(Table, AlignsNamesInAnyScript) {
  Table table({{"name", Align::left}, {"x"}});
  table.add({"窓", "1"});
  table.add({"fenêtre", "2"});
  EXPECT_EQ(table.text(false), "name     x\n"
                               "窓       1\n"
                               "fenêtre  2\n");
}

TEST(Table, LeavesNoBlanksAtTheEndOfALine) {
  Table table({{"x"}, {"name", Align::left}});
  table.add({"1", "long name"});
  table.add({"2", "short"});
  EXPECT_EQ(table.text(false).find(" \n"), std::string::npos);
}

TEST(Table, KeepsTheLeastWidthOfAColumn) {
  Table table({{"x", Align::right, 7}});
  table.add({"-"});
  EXPECT_EQ(table.text(false), "      x\n      -\n");
}

TEST(Table, EmphasisesStrongCellsWithoutMovingTheOthers) {
  Table table({{"x", Align::right, 4}, {"y"}});
  table.add({Cell("1", true), "2"});
  EXPECT_EQ(table.text(true), "   x  y\n   \x1b[1;31m1\x1b[0m  2\n");
  EXPECT_EQ(table.text(false), "   x  y\n   1  2\n");
}

} // namespace
} // namespace lightledger::report
