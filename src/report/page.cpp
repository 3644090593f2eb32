#include "losses.hpp"
#include "page_data.hpp"
#include "page_resources.hpp"
#include "prose.hpp"
#include "xml.hpp"

#include <lightledger/report/drawing.hpp>
#include <lightledger/report/page.hpp>

#include <functional>
#include <map>

namespace lightledger::report {
namespace {

using assembly::Assembly;

/// JSON that may stand inside a script element: no `<`, which could only be part of a string.
std::string inside_script(const Json& json) {
  std::string safe;
  for (const char character : json.dump(-1, ' ', false, Json::error_handler_t::replace))
    if (character == '<')
      safe += "\\u003c";
    else
      safe += character;
  return safe;
}

/// The text with each `{{name}}` replaced by what the name stands for.
std::string filled(std::string_view text,
                   const std::map<std::string_view, std::function<std::string()>>& values) {
  std::string result;
  while (true) {
    const std::size_t start = text.find("{{");
    result += text.substr(0, start);
    if (start == std::string_view::npos)
      return result;
    const std::size_t end = text.find("}}", start);
    result += values.at(text.substr(start + 2, end - start - 2))();
    text.remove_prefix(end + 2);
  }
}

/// Line breaks stay as they are; all else as in other markup.
std::string markup_of_lines(const std::string& text) {
  std::string markup;
  std::string_view rest = text;
  while (!rest.empty()) {
    const std::size_t end = std::min(rest.find('\n'), rest.size());
    markup += xml_text(rest.substr(0, end));
    markup += '\n';
    rest.remove_prefix(std::min(end + 1, rest.size()));
  }
  return markup;
}

} // namespace

std::string page(const Assembly& assembly, const PageContent& content) {
  const std::string title = assembly.title.empty() ? content.file : assembly.title;
  return filled(page_resources::html,
                {{"title", [&] { return xml_text(title); }},
                 {"light", [&] { return xml_text(describe_light(assembly.light)); }},
                 {"losses", [&] { return xml_text(describe_losses(content.budget.stations, false)); }},
                 {"drawing", [&] { return drawing_svg(title, content.drawing); }},
                 {"input", [&] { return markup_of_lines(content.text); }},
                 {"version", [&] { return xml_text(content.envelope.version); }},
                 {"data", [&] { return inside_script(page_data(assembly, content)); }},
                 {"style", [] { return std::string(page_resources::style); }},
                 {"script", [] { return std::string(page_resources::script); }},
                 {"d3", [] { return std::string(page_resources::d3); }}});
}

std::string page_json(const Assembly& assembly, const PageContent& content) {
  Json data = page_data(assembly, content);
  data.erase("pictures");
  return json_document(content.envelope, "report", std::move(data));
}

} // namespace lightledger::report
