#pragma once

namespace lightledger::trace {

/// What the kernel is compiled for; `portable` runs on every processor.
enum class InstructionSet { avx512, avx2, neon, portable };

inline constexpr InstructionSet instruction_sets[] = {InstructionSet::avx512, InstructionSet::avx2,
                                                      InstructionSet::neon, InstructionSet::portable};

/// As the command line writes it.
[[nodiscard]] const char* name(InstructionSet set);

/// Whether this program holds it and this machine runs it.
[[nodiscard]] bool available(InstructionSet set);

/// The one in use: the fastest available, until use() says otherwise.
[[nodiscard]] InstructionSet instruction_set_in_use();

/// From now on, for an available one. Not to be called while rays are traced.
void use(InstructionSet set);

} // namespace lightledger::trace
