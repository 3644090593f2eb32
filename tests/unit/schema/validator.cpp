#include "validator.hpp"

#include <algorithm>
#include <cmath>
#include <cstddef>
#include <map>
#include <regex>
#include <stdexcept>

namespace lightledger::schema {

namespace {

using Violations = std::vector<Violation>;

/// The value of a keyword, the schema it stands in, and what it is to be applied to.
struct Case {
  const Json& value;
  const Json& schema;
  const Json& instance;
  const std::string& address;
};

bool is_of_type(const Json& instance, const std::string& type) {
  if (type == "integer")
    return instance.is_number() && std::trunc(instance.get<double>()) == instance.get<double>();
  return type == "number" ? instance.is_number() : type == instance.type_name();
}

std::string below(const std::string& address, const std::string& key) {
  return address.empty() ? key : address + '.' + key;
}

std::string below(const std::string& address, std::size_t index) {
  return address + '[' + std::to_string(index) + ']';
}

const std::regex& regex_of(const std::string& pattern) {
  static std::map<std::string, std::regex> known;
  const auto found = known.find(pattern);
  return found != known.end() ? found->second : known.emplace(pattern, std::regex(pattern)).first->second;
}

std::vector<std::string> keys_of(const Json& object) {
  std::vector<std::string> keys;
  for (const auto& [key, value] : object.items())
    keys.push_back(key);
  return keys;
}

std::size_t number_or(const Json& schema, const char* keyword, std::size_t fallback) {
  return schema.contains(keyword) ? schema[keyword].get<std::size_t>() : fallback;
}

/// One walk through schema and instance.
class Walk {
public:
  explicit Walk(const Json& root) : m_root(root) {}

  void apply(const Json& schema, const Json& instance, const std::string& address, Violations& all) const {
    if (schema == false)
      all.push_back({address, "false", instance.dump(), {}});
    if (!schema.is_object())
      return;
    for (const auto& [keyword, value] : schema.items()) {
      const auto known = rules().find(keyword);
      if (known == rules().end())
        throw std::invalid_argument("the keyword " + keyword + " is not known");
      if (known->second != nullptr)
        (this->*known->second)({value, schema, instance, address}, all);
    }
  }

private:
  using Rule = void (Walk::*)(const Case&, Violations&) const;

  static const std::map<std::string, Rule>& rules();

  [[nodiscard]] Violations outcome(const Json& schema, const Case& at) const {
    Violations all;
    apply(schema, at.instance, at.address, all);
    return all;
  }
  [[nodiscard]] bool holds(const Json& schema, const Json& instance) const {
    Violations all;
    apply(schema, instance, {}, all);
    return all.empty();
  }
  static void require(bool met, const char* keyword, const Case& at, Violations& all) {
    if (!met)
      all.push_back({at.address, keyword, at.instance.dump(), {}});
  }

  // NOLINTBEGIN(readability-convert-member-functions-to-static): all have the signature of a rule

  void reference(const Case& at, Violations& all) const {
    const std::string target = at.value.get<std::string>();
    const Json::json_pointer pointer(target.substr(1));
    if (!target.starts_with('#') || !m_root.contains(pointer))
      throw std::invalid_argument("the reference " + target + " leads nowhere");
    apply(m_root[pointer], at.instance, at.address, all);
  }

  void type(const Case& at, Violations& all) const {
    const Json types = at.value.is_array() ? at.value : Json::array({at.value});
    require(
        std::any_of(types.begin(), types.end(), [&](const Json& t) { return is_of_type(at.instance, t); }),
        "type", at, all);
  }
  void constant(const Case& at, Violations& all) const { require(at.instance == at.value, "const", at, all); }
  void enumeration(const Case& at, Violations& all) const {
    require(std::find(at.value.begin(), at.value.end(), at.instance) != at.value.end(), "enum", at, all);
  }

  void minimum(const Case& at, Violations& all) const {
    require(!at.instance.is_number() || at.instance >= at.value, "minimum", at, all);
  }
  void maximum(const Case& at, Violations& all) const {
    require(!at.instance.is_number() || at.instance <= at.value, "maximum", at, all);
  }
  void exclusive_minimum(const Case& at, Violations& all) const {
    require(!at.instance.is_number() || at.instance > at.value, "exclusiveMinimum", at, all);
  }
  void exclusive_maximum(const Case& at, Violations& all) const {
    require(!at.instance.is_number() || at.instance < at.value, "exclusiveMaximum", at, all);
  }

  void min_length(const Case& at, Violations& all) const {
    require(!at.instance.is_string() || at.instance.get_ref<const std::string&>().size() >= at.value,
            "minLength", at, all);
  }
  void pattern(const Case& at, Violations& all) const {
    require(!at.instance.is_string() ||
                std::regex_search(at.instance.get_ref<const std::string&>(), regex_of(at.value)),
            "pattern", at, all);
  }

  void min_items(const Case& at, Violations& all) const {
    require(!at.instance.is_array() || at.instance.size() >= at.value, "minItems", at, all);
  }
  void max_items(const Case& at, Violations& all) const {
    require(!at.instance.is_array() || at.instance.size() <= at.value, "maxItems", at, all);
  }
  void prefix_items(const Case& at, Violations& all) const {
    for (std::size_t i = 0; at.instance.is_array() && i < std::min(at.instance.size(), at.value.size()); ++i)
      apply(at.value[i], at.instance[i], below(at.address, i), all);
  }
  void items(const Case& at, Violations& all) const {
    const std::size_t first = at.schema.contains("prefixItems") ? at.schema["prefixItems"].size() : 0;
    for (std::size_t i = first; at.instance.is_array() && i < at.instance.size(); ++i)
      apply(at.value, at.instance[i], below(at.address, i), all);
  }
  void contains(const Case& at, Violations& all) const {
    if (!at.instance.is_array())
      return;
    const auto count = static_cast<std::size_t>(std::count_if(
        at.instance.begin(), at.instance.end(), [&](const Json& item) { return holds(at.value, item); }));
    require(count >= number_or(at.schema, "minContains", 1), "contains", at, all);
    require(count <= number_or(at.schema, "maxContains", at.instance.size()), "maxContains", at, all);
  }

  void properties(const Case& at, Violations& all) const {
    for (const auto& [key, schema] : at.value.items())
      if (at.instance.is_object() && at.instance.contains(key))
        apply(schema, at.instance[key], below(at.address, key), all);
  }
  void additional_properties(const Case& at, Violations& all) const {
    if (!at.instance.is_object())
      return;
    static const Json none = Json::object();
    const Json& known = at.schema.contains("properties") ? at.schema["properties"] : none;
    for (const auto& [key, value] : at.instance.items()) {
      if (known.contains(key))
        continue;
      if (at.value == false)
        all.push_back({at.address, "additionalProperties", key, keys_of(known)});
      else
        apply(at.value, value, below(at.address, key), all);
    }
  }
  void property_names(const Case& at, Violations& all) const {
    for (const auto& [key, value] : at.instance.items())
      if (at.instance.is_object())
        apply(at.value, key, below(at.address, key), all);
  }
  void required(const Case& at, Violations& all) const {
    for (const Json& key : at.value)
      if (at.instance.is_object() && !at.instance.contains(key.get<std::string>()))
        all.push_back({at.address, "required", key, {}});
  }
  void dependent_required(const Case& at, Violations& all) const {
    for (const auto& [key, needed] : at.value.items())
      if (at.instance.is_object() && at.instance.contains(key))
        required({needed, at.schema, at.instance, at.address}, all);
  }
  void dependent_schemas(const Case& at, Violations& all) const {
    for (const auto& [key, schema] : at.value.items())
      if (at.instance.is_object() && at.instance.contains(key))
        apply(schema, at.instance, at.address, all);
  }

  void all_of(const Case& at, Violations& all) const {
    for (const Json& schema : at.value)
      apply(schema, at.instance, at.address, all);
  }
  [[nodiscard]] std::size_t count_alternatives(const Case& at, Violations& why) const {
    std::size_t held = 0;
    for (const Json& schema : at.value) {
      const Violations found = outcome(schema, at);
      held += found.empty() ? 1 : 0;
      why.insert(why.end(), found.begin(), found.end());
    }
    return held;
  }
  void any_of(const Case& at, Violations& all) const {
    Violations why;
    if (count_alternatives(at, why) == 0)
      all.insert(all.end(), why.begin(), why.end());
  }
  void one_of(const Case& at, Violations& all) const {
    Violations why;
    const std::size_t held = count_alternatives(at, why);
    require(held == 1, "oneOf", at, all);
    if (held == 0)
      all.insert(all.end(), why.begin(), why.end());
  }
  void negation(const Case& at, Violations& all) const {
    require(!holds(at.value, at.instance), "not", at, all);
  }
  void condition(const Case& at, Violations& all) const {
    const char* const branch = holds(at.value, at.instance) ? "then" : "else";
    if (at.schema.contains(branch))
      apply(at.schema[branch], at.instance, at.address, all);
  }

  // NOLINTEND(readability-convert-member-functions-to-static)

  const Json& m_root;
};

/// Keywords without a rule say something to people only, or are read by another keyword's rule.
const std::map<std::string, Walk::Rule>& Walk::rules() {
  static const std::map<std::string, Rule> all{
      {"$schema", nullptr},
      {"$defs", nullptr},
      {"title", nullptr},
      {"description", nullptr},
      {"default", nullptr},
      {"then", nullptr},
      {"else", nullptr},
      {"minContains", nullptr},
      {"maxContains", nullptr},
      {"$ref", &Walk::reference},
      {"type", &Walk::type},
      {"const", &Walk::constant},
      {"enum", &Walk::enumeration},
      {"minimum", &Walk::minimum},
      {"maximum", &Walk::maximum},
      {"exclusiveMinimum", &Walk::exclusive_minimum},
      {"exclusiveMaximum", &Walk::exclusive_maximum},
      {"minLength", &Walk::min_length},
      {"pattern", &Walk::pattern},
      {"minItems", &Walk::min_items},
      {"maxItems", &Walk::max_items},
      {"prefixItems", &Walk::prefix_items},
      {"items", &Walk::items},
      {"contains", &Walk::contains},
      {"properties", &Walk::properties},
      {"additionalProperties", &Walk::additional_properties},
      {"propertyNames", &Walk::property_names},
      {"required", &Walk::required},
      {"dependentRequired", &Walk::dependent_required},
      {"dependentSchemas", &Walk::dependent_schemas},
      {"allOf", &Walk::all_of},
      {"anyOf", &Walk::any_of},
      {"oneOf", &Walk::one_of},
      {"not", &Walk::negation},
      {"if", &Walk::condition},
  };
  return all;
}

} // namespace

std::vector<Violation> Validator::check(const Json& instance) const {
  Violations all;
  Walk(m_schema).apply(m_schema, instance, {}, all);
  return all;
}

} // namespace lightledger::schema
