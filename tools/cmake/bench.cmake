# The benchmarks; tools/bench builds them. Textbook and reference get all that the compiler can do for this machine.
find_package(benchmark REQUIRED)

file(GLOB bench_sources CONFIGURE_DEPENDS ${PROJECT_SOURCE_DIR}/tests/bench/*.cpp)
file(GLOB bench_reference CONFIGURE_DEPENDS ${PROJECT_SOURCE_DIR}/tests/reference/*.cpp)
list(FILTER bench_reference EXCLUDE REGEX "_test\\.cpp$|random|reversal|unfolded")
add_executable(lightledger_bench ${bench_sources} ${bench_reference})
target_include_directories(lightledger_bench PRIVATE ${PROJECT_SOURCE_DIR}/tests)
target_compile_definitions(lightledger_bench PRIVATE LIGHTLEDGER_SOURCE_DIR="${PROJECT_SOURCE_DIR}")
target_compile_options(lightledger_bench PRIVATE -O3)
set_source_files_properties(${PROJECT_SOURCE_DIR}/tests/bench/textbook.cpp ${bench_reference}
  PROPERTIES COMPILE_OPTIONS "-march=native;-ffp-contract=fast;-Wno-maybe-uninitialized")
target_link_libraries(lightledger_bench PRIVATE lightledger_trace benchmark::benchmark nlohmann_json::nlohmann_json Eigen3::Eigen fmt::fmt)
add_dependencies(lightledger_bench lightledger)
