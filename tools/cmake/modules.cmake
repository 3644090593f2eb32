# lightledger_module(NAME LINKS target...): the library of src/NAME, with its headers in include/lightledger/NAME.
function(lightledger_module name)
  cmake_parse_arguments(MODULE "" "" "LINKS;PRIVATE_LINKS" ${ARGN})
  file(GLOB_RECURSE sources CONFIGURE_DEPENDS ${PROJECT_SOURCE_DIR}/src/${name}/*.cpp)
  add_library(lightledger_${name} STATIC ${sources})
  target_include_directories(lightledger_${name}
    PUBLIC $<BUILD_INTERFACE:${PROJECT_SOURCE_DIR}/include> $<INSTALL_INTERFACE:include>
    PRIVATE ${PROJECT_SOURCE_DIR}/src)
  target_link_libraries(lightledger_${name} PUBLIC ${MODULE_LINKS} PRIVATE ${MODULE_PRIVATE_LINKS})
  target_compile_features(lightledger_${name} PUBLIC cxx_std_20)
endfunction()

# lightledger_tests(NAME FOLDER... [LINKS target...]): one test program NAME from all sources below the folders.
function(lightledger_tests name)
  cmake_parse_arguments(TESTS "" "" "LINKS" ${ARGN})
  set(sources)
  foreach(folder ${TESTS_UNPARSED_ARGUMENTS})
    file(GLOB_RECURSE found CONFIGURE_DEPENDS ${PROJECT_SOURCE_DIR}/tests/${folder}/*.cpp)
    list(APPEND sources ${found})
  endforeach()
  set(sanitized 0)
  if(LIGHTLEDGER_SANITIZE)
    set(sanitized 1)
  endif()
  add_executable(${name} ${sources})
  target_include_directories(${name} PRIVATE ${PROJECT_SOURCE_DIR}/tests ${PROJECT_SOURCE_DIR}/src)
  target_compile_definitions(${name} PRIVATE
    LIGHTLEDGER_SOURCE_DIR="${PROJECT_SOURCE_DIR}"
    LIGHTLEDGER_PROGRAM="$<TARGET_FILE:lightledger>"
    LIGHTLEDGER_BUILD_DIR="${PROJECT_BINARY_DIR}"
    LIGHTLEDGER_SANITIZED=${sanitized})
  target_link_libraries(${name} PRIVATE ${TESTS_LINKS})
  add_test(NAME ${name} COMMAND ${name} WORKING_DIRECTORY ${PROJECT_SOURCE_DIR})
endfunction()
