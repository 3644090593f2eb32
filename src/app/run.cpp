#include "run.hpp"

#include "answer.hpp"
#include "output.hpp"
#include "outputs.hpp"
#include "parse.hpp"

#include <variant>

namespace lightledger::app {
namespace {

int print(const std::string& text) {
  Output("-").stage(text);
  return 0;
}

} // namespace

int run(const std::vector<std::string>& arguments) {
  const std::variant<std::string, Options> parsed = parse(arguments);
  if (const auto* text = std::get_if<std::string>(&parsed))
    return print(*text);
  const auto& options = std::get<Options>(parsed);
  if (options.isa)
    trace::use(*options.isa);
  const Input input = read_input(options);
  Outputs outputs(options);
  const Answer result = answer(options, input);
  outputs.write(result);
  return result.met ? 0 : 1;
}

} // namespace lightledger::app
