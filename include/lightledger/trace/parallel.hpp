#pragma once

#include <cstddef>
#include <functional>

namespace lightledger::trace {

/// Calls `job(i)` for every i below `count`; jobs must be independent. Calls may be nested.
void parallel_jobs(std::size_t count, const std::function<void(std::size_t)>& job);

/// Does `work`, whose parallel jobs then share at most `threads` threads (0: as many as the machine has).
void with_threads(int threads, const std::function<void()>& work);

} // namespace lightledger::trace
