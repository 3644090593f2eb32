#pragma once

#ifdef LIGHTLEDGER_WATCHED_THREADS
extern "C" {
void __tsan_acquire(void* place); // NOLINT(bugprone-reserved-identifier)
void __tsan_release(void* place); // NOLINT(bugprone-reserved-identifier)
}
#endif

namespace lightledger::trace {

/// Tells ThreadSanitizer that what was done before `give` is seen after `take`, which oneTBB sees to: Debian's
/// is built without it, so its own ways of synchronising are not visible. Nothing in other flavours.
class Handover {
public:
#ifdef LIGHTLEDGER_WATCHED_THREADS
  void give() { __tsan_release(&m_place); }
  void take() { __tsan_acquire(&m_place); }

private:
  char m_place = 0;
#else
  void give() {}
  void take() {}
#endif
};

} // namespace lightledger::trace
