# The fuzz flavour: libFuzzer (clang) over the loader and what follows it; built and run by tools/fuzz alone.
add_executable(load_fuzzer fuzz/load_fuzzer.cpp fuzz/hostile_input.cpp)
target_include_directories(load_fuzzer PRIVATE ${CMAKE_CURRENT_SOURCE_DIR})
target_link_libraries(load_fuzzer PRIVATE lightledger_trace fmt::fmt)
target_link_options(load_fuzzer PRIVATE -fsanitize=fuzzer)
