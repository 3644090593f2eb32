#pragma once

#include "answer.hpp"

namespace lightledger::app {

/// The commands whose result is a picture or a page.
[[nodiscard]] Answer answer_draw(const Options& options, const Input& input);
[[nodiscard]] Answer answer_report(const Options& options, const Input& input);

} // namespace lightledger::app
