#include "kernel.hpp"

#include <lightledger/trace/instruction_set.hpp>

#include <atomic>

namespace lightledger::trace {
namespace {

const Kernel* fastest() {
  for (const InstructionSet set : instruction_sets)
    if (const Kernel* found = kernel_for(set))
      return found;
  return nullptr;
}

std::atomic<const Kernel*>& chosen() {
  static std::atomic<const Kernel*> kernel = fastest();
  return kernel;
}

} // namespace

const char* name(InstructionSet set) {
  switch (set) {
  case InstructionSet::avx512:
    return "avx512";
  case InstructionSet::avx2:
    return "avx2";
  case InstructionSet::neon:
    return "neon";
  case InstructionSet::portable:
    return "portable";
  }
  return "";
}

bool available(InstructionSet set) {
  return kernel_for(set) != nullptr;
}

InstructionSet instruction_set_in_use() {
  return kernel().compiled_for;
}

void use(InstructionSet set) {
  if (const Kernel* found = kernel_for(set))
    chosen().store(found, std::memory_order_release);
}

const Kernel& kernel() {
  return *chosen().load(std::memory_order_acquire);
}

} // namespace lightledger::trace
