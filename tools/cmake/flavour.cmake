# The compiler's side of a flavour: language level, warnings, sanitizers.
set(CMAKE_CXX_STANDARD 20)
set(CMAKE_CXX_STANDARD_REQUIRED ON)
set(CMAKE_CXX_EXTENSIONS OFF)
set(CMAKE_EXPORT_COMPILE_COMMANDS ON)

set(LIGHTLEDGER_SANITIZE "" CACHE STRING "sanitizers to build with, as -fsanitize= takes them")

add_compile_options(-Wall -Wextra -Wpedantic -Wshadow -Wconversion -Wno-sign-conversion -Werror)
# g++ 12 sees overlapping copies in "literal" + std::string where there are none (GCC bug 105651).
add_compile_options($<$<CXX_COMPILER_ID:GNU>:-Wno-restrict>)
# No silent fusing: the same source gives the same bits on every machine.
add_compile_options(-ffp-contract=off)
# Mathematical functions tell of trouble by their value; errno would keep loops over them from being vectorised.
add_compile_options(-fno-math-errno)

if(LIGHTLEDGER_SANITIZE)
  # With sanitizers g++ 12 takes strings in lists for never set.
  add_compile_options($<$<CXX_COMPILER_ID:GNU>:-Wno-maybe-uninitialized>)
  add_compile_options(-fsanitize=${LIGHTLEDGER_SANITIZE} -fno-sanitize-recover=all -fno-omit-frame-pointer)
  add_link_options(-fsanitize=${LIGHTLEDGER_SANITIZE})
endif()
