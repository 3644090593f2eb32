// This order: the list of sets, then what includes this file once a set, then the passes.
// clang-format off
#include "targets.hpp"

#undef HWY_TARGET_INCLUDE
#define HWY_TARGET_INCLUDE "trace/kernel/kernel.cpp"
#include <hwy/foreach_target.h>

#include "arrive-inl.hpp"
#include "kernel.hpp"
#include "launch-inl.hpp"
#include "respond-inl.hpp"
#include "settle-inl.hpp"
// clang-format on

HWY_BEFORE_NAMESPACE();
namespace lightledger::trace::HWY_NAMESPACE {

constexpr InstructionSet compiled_for = HWY_TARGET == HWY_AVX3   ? InstructionSet::avx512
                                        : HWY_TARGET == HWY_AVX2 ? InstructionSet::avx2
                                        : HWY_TARGET == HWY_NEON ? InstructionSet::neon
                                                                 : InstructionSet::portable;

constexpr Kernel passes = {&launch, &arrive, &respond, &settle, compiled_for};

} // namespace lightledger::trace::HWY_NAMESPACE
HWY_AFTER_NAMESPACE();

#if HWY_ONCE

namespace lightledger::trace {

const Kernel* kernel_for(InstructionSet set) {
  [[maybe_unused]] const std::int64_t supported = hwy::SupportedTargets();
#if HWY_TARGETS & HWY_AVX3
  if (set == InstructionSet::avx512 && (supported & HWY_AVX3) != 0)
    return &N_AVX3::passes;
#endif
#if HWY_TARGETS & HWY_AVX2
  if (set == InstructionSet::avx2 && (supported & HWY_AVX2) != 0)
    return &N_AVX2::passes;
#endif
#if HWY_TARGETS & HWY_NEON
  if (set == InstructionSet::neon && (supported & HWY_NEON) != 0)
    return &N_NEON::passes;
#endif
#if HWY_TARGETS & HWY_SCALAR
  if (set == InstructionSet::portable)
    return &N_SCALAR::passes;
#elif HWY_TARGETS & HWY_EMU128
  if (set == InstructionSet::portable)
    return &N_EMU128::passes;
#endif
  return nullptr;
}

} // namespace lightledger::trace
#endif
