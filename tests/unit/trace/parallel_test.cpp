#include <lightledger/trace/parallel.hpp>

#include <gtest/gtest.h>

#include <array>
#include <atomic>
#include <chrono>
#include <cstdlib>
#include <numeric>
#include <stdexcept>
#include <thread>
#include <vector>

namespace lightledger::trace {
namespace {

TEST(Parallel, DoesEveryJobOnce) {
  std::vector<int> done(1000, 0);
  parallel_jobs(done.size(), [&](std::size_t job) { ++done[job]; });
  EXPECT_EQ(done, std::vector<int>(1000, 1));
}

TEST(Parallel, NestsJobsInJobs) {
  std::vector<std::vector<int>> done(20, std::vector<int>(30, 0));
  with_threads(4, [&] {
    parallel_jobs(done.size(), [&](std::size_t outer) {
      parallel_jobs(done[outer].size(), [&](std::size_t inner) { ++done[outer][inner]; });
      EXPECT_EQ(std::accumulate(done[outer].begin(), done[outer].end(), 0), 30);
    });
  });
  EXPECT_EQ(done, std::vector(20, std::vector<int>(30, 1)));
}

TEST(Parallel, HandsOnWhatAJobThrows) {
  const auto fail = [](std::size_t job) {
    if (job == 7)
      throw std::runtime_error("seven");
  };
  EXPECT_THROW(parallel_jobs(10, fail), std::runtime_error);
}

/// Waits a while for another thread, without ordering what the two do.
void meet_another(std::atomic<int>& arrived) {
  arrived.fetch_add(1, std::memory_order_relaxed);
  const auto patience = std::chrono::steady_clock::now() + std::chrono::seconds(2);
  while (arrived.load(std::memory_order_relaxed) < 2 && std::chrono::steady_clock::now() < patience)
    continue;
}

std::array<std::thread::id, 2> threads_of_two_jobs() {
  std::atomic<int> arrived = 0;
  std::array<std::thread::id, 2> thread;
  with_threads(2, [&] {
    parallel_jobs(2, [&](std::size_t job) {
      meet_another(arrived);
      thread[job] = std::this_thread::get_id();
    });
  });
  return thread;
}

/// On a busy machine the second thread may come late: some tries.
TEST(Parallel, GivesAsManyThreadsAsAskedFor) {
  bool two = false;
  for (int attempt = 0; attempt < 10 && !two; ++attempt) {
    const auto thread = threads_of_two_jobs();
    two = thread[0] != thread[1];
  }
  EXPECT_TRUE(two);
}

#ifdef __SANITIZE_THREAD__

/// Two jobs that count in the same variable.
void race() {
  std::atomic<int> arrived = 0;
  int counted = 0;
  with_threads(2, [&] {
    parallel_jobs(2, [&](std::size_t) {
      meet_another(arrived);
      ++counted;
    });
  });
  std::exit(counted > 0 ? 0 : 1);
}

TEST(ParallelDeathTest, ThreadSanitizerSeesJobsThatRace) {
  GTEST_FLAG_SET(death_test_style, "threadsafe");
  constexpr int exit_code_of_a_report = 66;
  EXPECT_EXIT(race(), testing::ExitedWithCode(exit_code_of_a_report), "data race");
}

#endif

} // namespace
} // namespace lightledger::trace
