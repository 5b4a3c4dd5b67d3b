#include "io/json_text.hpp"

#include <algorithm>

namespace annulet {
namespace {

using Json = nlohmann::ordered_json;

std::string plain(const Json& value) {
    return value.dump(-1, ' ', false, Json::error_handler_t::replace);
}

bool is_plain(const Json& value) {
    if (!value.is_structured() || value.empty()) return true;
    return value.is_array() &&
           std::none_of(value.begin(), value.end(), [](const Json& v) { return v.is_structured(); });
}

std::string text(const Json& value, const std::string& indent) {
    if (is_plain(value)) return plain(value);
    const std::string inner = indent + "  ";
    std::string body;
    for (const auto& item : value.items()) {
        body += (body.empty() ? "\n" : ",\n") + inner;
        if (value.is_object()) body += plain(Json(item.key())) + ": ";
        body += text(item.value(), inner);
    }
    return (value.is_object() ? "{" : "[") + body + "\n" + indent + (value.is_object() ? "}" : "]");
}

}  // namespace

std::string json_text(const Json& value) {
    return text(value, "") + "\n";
}

}  // namespace annulet
