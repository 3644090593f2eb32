#include "fuzz/hostile_input.hpp"

#include <cstddef>
#include <cstdint>

// The name is that of libFuzzer's interface; an exception ends the run as a find.
extern "C" int LLVMFuzzerTestOneInput(const std::uint8_t* data, std::size_t size) {
  lightledger::fuzz::take({reinterpret_cast<const char*>(data), size});
  return 0;
}
