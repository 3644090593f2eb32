#pragma once

#include <string>
#include <string_view>

namespace lightledger::report {

/// RFC 4648, with padding.
[[nodiscard]] std::string base64(std::string_view bytes);

} // namespace lightledger::report
