# The built-in media: media.yaml becomes constant tables inside lightledger_optics.
add_executable(tabulate_media ${PROJECT_SOURCE_DIR}/tools/cmake/tabulate_media.cpp)
target_link_libraries(tabulate_media PRIVATE yaml-cpp fmt::fmt)

set(media_yaml ${PROJECT_SOURCE_DIR}/src/optics/media.yaml)
set(media_tables ${PROJECT_BINARY_DIR}/generated/tabulated_media.cpp)
file(MAKE_DIRECTORY ${PROJECT_BINARY_DIR}/generated)
add_custom_command(
  OUTPUT ${media_tables}
  COMMAND tabulate_media ${media_yaml} ${media_tables}
  DEPENDS tabulate_media ${media_yaml}
  COMMENT "Tabulating the built-in media"
  VERBATIM)
target_sources(lightledger_optics PRIVATE ${media_tables})
