// JSON as people read it: objects one key to a line, lists of plain values on one line.
#pragma once

#include <nlohmann/json.hpp>

#include <string>

namespace annulet {

/// Ends with a newline. Bytes that are no UTF-8 are replaced rather than refused: the result matters more than a
/// name. Numbers that JSON has no word for become null.
std::string json_text(const nlohmann::ordered_json& value);

}  // namespace annulet
