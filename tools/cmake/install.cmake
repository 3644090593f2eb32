# cmake --install: libraries with their headers and package, the program, and what stands beside it.
include(GNUInstallDirs)
include(CMakePackageConfigHelpers)

# Manual page and completions are written from the program's own tables of commands and options.
add_executable(write_companions ${PROJECT_SOURCE_DIR}/tools/cmake/write_companions.cpp)
target_link_libraries(write_companions PRIVATE lightledger_app)
set(companions ${PROJECT_BINARY_DIR}/companions)
set(companion_files ${companions}/lightledger.1 ${companions}/lightledger.bash ${companions}/_lightledger
  ${companions}/lightledger.fish)
file(MAKE_DIRECTORY ${companions})
add_custom_command(
  OUTPUT ${companion_files}
  COMMAND write_companions ${companions}
  DEPENDS write_companions
  COMMENT "Writing the manual page and completions"
  VERBATIM)
add_custom_target(companions ALL DEPENDS ${companion_files})

set(lightledger_modules optics assembly trace analysis report)
foreach(module ${lightledger_modules})
  set_target_properties(lightledger_${module} PROPERTIES EXPORT_NAME ${module})
endforeach()
list(TRANSFORM lightledger_modules PREPEND lightledger_ OUTPUT_VARIABLE lightledger_libraries)
install(TARGETS ${lightledger_libraries} EXPORT lightledger)
install(TARGETS lightledger)
install(DIRECTORY ${PROJECT_SOURCE_DIR}/include/ DESTINATION ${CMAKE_INSTALL_INCLUDEDIR})

set(data ${CMAKE_INSTALL_DATADIR}/lightledger)
set(package ${CMAKE_INSTALL_LIBDIR}/cmake/lightledger)
install(EXPORT lightledger NAMESPACE lightledger:: FILE lightledger-targets.cmake DESTINATION ${package})
configure_package_config_file(${PROJECT_SOURCE_DIR}/tools/cmake/lightledger-config.cmake.in
  ${PROJECT_BINARY_DIR}/lightledger-config.cmake INSTALL_DESTINATION ${package} PATH_VARS data)
write_basic_package_version_file(${PROJECT_BINARY_DIR}/lightledger-config-version.cmake
  COMPATIBILITY SameMinorVersion)
install(FILES ${PROJECT_BINARY_DIR}/lightledger-config.cmake
  ${PROJECT_BINARY_DIR}/lightledger-config-version.cmake DESTINATION ${package})

install(FILES ${PROJECT_SOURCE_DIR}/src/optics/media.yaml DESTINATION ${data})
install(DIRECTORY ${PROJECT_SOURCE_DIR}/systems DESTINATION ${data})
install(DIRECTORY ${PROJECT_SOURCE_DIR}/docs DESTINATION ${data}) # the systems name its schema to editors
install(FILES ${companions}/lightledger.1 DESTINATION ${CMAKE_INSTALL_MANDIR}/man1)
install(FILES ${companions}/lightledger.bash DESTINATION ${CMAKE_INSTALL_DATADIR}/bash-completion/completions
  RENAME lightledger)
install(FILES ${companions}/_lightledger DESTINATION ${CMAKE_INSTALL_DATADIR}/zsh/site-functions)
install(FILES ${companions}/lightledger.fish
  DESTINATION ${CMAKE_INSTALL_DATADIR}/fish/vendor_completions.d)
