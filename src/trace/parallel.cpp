#include <lightledger/trace/parallel.hpp>

#include <tbb/global_control.h>
#include <tbb/parallel_for.h>
#include <tbb/task_arena.h>

namespace lightledger::trace {

void parallel_jobs(std::size_t count, const std::function<void(std::size_t)>& job) {
  tbb::parallel_for(std::size_t{0}, count, job);
}

void with_threads(int threads, const std::function<void()>& work) {
  if (threads <= 0) {
    tbb::task_arena().execute(work);
    return;
  }
  // A number asked for holds also where the machine has fewer cores.
  const tbb::global_control allowed(tbb::global_control::max_allowed_parallelism,
                                    static_cast<std::size_t>(threads));
  tbb::task_arena(threads).execute(work);
}

} // namespace lightledger::trace
