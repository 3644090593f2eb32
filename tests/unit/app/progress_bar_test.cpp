#include "app/progress_bar.hpp"

#include <gtest/gtest.h>

namespace lightledger::app {
namespace {

TEST(ProgressLine, ShowsTheShareAndTheTimeLeftAtThePaceSoFar) {
  EXPECT_EQ(progress_line(0.25, 10.0), "tracing  =======.......................   25 %  30 s left");
}

TEST(ProgressLine, TellsMinutesAndHours) {
  EXPECT_TRUE(progress_line(0.5, 125.0).ends_with("  2 min 05 s left"));
  EXPECT_TRUE(progress_line(0.5, 3720.0).ends_with("  1 h 02 min left"));
}

TEST(ProgressLine, KnowsNothingOfTheTimeLeftBeforeAnythingIsDone) {
  EXPECT_EQ(progress_line(0.0, 10.0), "tracing  ..............................    0 %");
}

TEST(ProgressLine, EndsAtTheWhole) {
  EXPECT_EQ(progress_line(1.5, 10.0), "tracing  ==============================  100 %  0 s left");
}

} // namespace
} // namespace lightledger::app
