#pragma once

/// The instruction sets that the kernel is compiled for: of those that Highway knows, AVX-512, AVX2 with FMA,
/// NEON, and the portable one. The others neither fuse nor are wide enough to be worth their place.
#define HWY_DISABLED_TARGETS                                                                                 \
  (HWY_SSSE3 | HWY_SSE4 | HWY_AVX3_DL | HWY_SVE | HWY_SVE2 | HWY_SVE_256 | HWY_SVE2_128 | HWY_PPC8 |         \
   HWY_RVV | HWY_WASM | HWY_WASM_EMU256)
