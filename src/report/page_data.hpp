#pragma once

#include "json.hpp"

#include <lightledger/report/page.hpp>

namespace lightledger::report {

/// All that the page's scripts read.
[[nodiscard]] Json page_data(const assembly::Assembly& assembly, const PageContent& content);

} // namespace lightledger::report
