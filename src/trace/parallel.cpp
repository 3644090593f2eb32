#include "parallel.hpp"

#include <tbb/parallel_for.h>
#include <tbb/task_arena.h>

namespace lightledger::trace {

void parallel_jobs(std::size_t count, const std::function<void(std::size_t)>& job) {
  tbb::parallel_for(std::size_t{0}, count, job);
}

void with_threads(int threads, const std::function<void()>& work) {
  tbb::task_arena(threads > 0 ? threads : tbb::task_arena::automatic).execute(work);
}

} // namespace lightledger::trace
