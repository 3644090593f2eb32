#pragma once

#include <string_view>

/// The files of `src/report/page`, and the chart library, as the build embeds them.
namespace lightledger::report::page_resources {

extern const std::string_view html;   ///< with places `{{name}}` to be filled
extern const std::string_view style;  ///< CSS
extern const std::string_view script; ///< all scripts of the page, in their order
extern const std::string_view d3;     ///< d3.min.js

} // namespace lightledger::report::page_resources
