# The page's own files and d3 (Debian's node-d3) become string constants inside lightledger_report.
add_executable(embed_text ${PROJECT_SOURCE_DIR}/tools/cmake/embed_text.cpp)

find_file(D3_SCRIPT d3.min.js PATHS /usr/share/nodejs/d3/dist NO_DEFAULT_PATH REQUIRED)
set(page ${PROJECT_SOURCE_DIR}/src/report/page)
set(page_scripts figures state data parts glance verdicts ledger stream ghosts sphere polarization coatings basis main)
list(TRANSFORM page_scripts PREPEND ${page}/)
list(TRANSFORM page_scripts APPEND .js)

set(page_resources ${PROJECT_BINARY_DIR}/generated/page_resources.cpp)
add_custom_command(
  OUTPUT ${page_resources}
  COMMAND embed_text ${page_resources} report/page_resources.hpp lightledger::report::page_resources
    html= ${page}/page.html style= ${page}/style.css script= ${page_scripts} d3= ${D3_SCRIPT}
  DEPENDS embed_text ${page}/page.html ${page}/style.css ${page_scripts}
  COMMENT "Embedding the page"
  VERBATIM)
target_sources(lightledger_report PRIVATE ${page_resources})
