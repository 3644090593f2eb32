#include "handover.hpp"

#include <lightledger/trace/parallel.hpp>

#include <tbb/global_control.h>
#include <tbb/info.h>
#include <tbb/parallel_for.h>
#include <tbb/task_arena.h>

#include <map>
#include <memory>
#include <mutex>

namespace lightledger::trace {

void parallel_jobs(std::size_t count, const std::function<void(std::size_t)>& job) {
  Handover to_jobs;
  Handover from_jobs;
  to_jobs.give();
  tbb::parallel_for(std::size_t{0}, count, [&](std::size_t number) {
    to_jobs.take();
    job(number);
    from_jobs.give();
  });
  from_jobs.take();
}

namespace {

/// One arena for each number of threads, kept: arenas that come and go can be left without their workers.
tbb::task_arena& arena_of(int threads) {
  static std::mutex guard;
  static std::map<int, std::unique_ptr<tbb::task_arena>> arenas;
  const std::lock_guard lock(guard);
  auto& arena = arenas[threads];
  if (!arena)
    arena = std::make_unique<tbb::task_arena>(threads);
  return *arena;
}

} // namespace

void with_threads(int threads, const std::function<void()>& work) {
  Handover to_work;
  Handover from_work;
  const auto handed_over = [&] {
    to_work.take();
    work();
    from_work.give();
  };
  to_work.give();
  if (threads <= tbb::info::default_concurrency()) {
    arena_of(threads > 0 ? threads : tbb::task_arena::automatic).execute(handed_over);
  } else {
    // A number asked for holds also where the machine has fewer cores.
    const tbb::global_control allowed(tbb::global_control::max_allowed_parallelism,
                                      static_cast<std::size_t>(threads));
    tbb::task_arena(threads).execute(handed_over);
  }
  from_work.take();
}

} // namespace lightledger::trace
