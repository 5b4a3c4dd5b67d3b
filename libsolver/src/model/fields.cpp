#include "model/fields.hpp"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <algorithm>
#include <cmath>

namespace annulet {

namespace {

constexpr double faulty = std::numeric_limits<double>::quiet_NaN();

const char* type_name(const toml::node& node) {
    if (node.is_table()) return "a table";
    if (node.is_array()) return "a list";
    if (node.is_string()) return "a text";
    if (node.is_boolean()) return "true or false";
    if (node.is_number()) return "a number";
    return "a date or time";
}

// A bound far beyond anything built is not worth telling unless it is the one that was passed.
std::string limits_text(const Range& range, const Kind& kind, double value) {
    const bool far = range.most == ranges::farthest_m;
    const bool below = std::isfinite(range.most) && (!far || value > range.most || range.least == -range.most);
    const bool above = std::isfinite(range.least) && !(far && value > range.most && range.least == 0);
    const std::string least = to_text(range.least, kind), most = to_text(range.most, kind);
    if (above && below) {
        return range.above_least ? fmt::format("greater than {} and at most {}", least, most)
                                 : fmt::format("from {} to {}", least, most);
    }
    if (above) return (range.above_least ? "greater than " : "at least ") + least;
    return "at most " + most;
}

bool inside(double value, const Range& range) {
    return value <= range.most && (range.above_least ? value > range.least : value >= range.least);
}

}  // namespace

double Context::quantity(const toml::node& node, const std::string& what, const Kind& kind, const Range& range) {
    if (!node.is_number() && !node.is_string()) {
        faults.add(position_of(node),
                   fmt::format("{} must be {}, but is {}", what, kind_with_article(kind), type_name(node)),
                   node.is_array() || node.is_table() ? "" : fmt::format("write it as \"{}\"", kind.example));
        return faulty;
    }
    const auto found = parameters.evaluate(node, what);
    if (!found) return faulty;
    Quantity value = *found;
    if (value.is_bare() && !kind.dimension.none()) {
        value = {value.value * bare_scale(kind.dimension, parameters.unit_m()), kind.dimension, false};
    }
    if (value.dimension != kind.dimension) {
        faults.add(position_of(node),
                   fmt::format("{} must be {}, but is {}", what, kind_with_article(kind), kind_with_article(value)),
                   fmt::format("write it as \"{}\", or an expression of that kind", kind.example));
        return faulty;
    }
    if (!inside(value.value, range)) {
        faults.add(position_of(node), fmt::format("{} must be {}, but is {}", what,
                                                  limits_text(range, kind, value.value), to_text(value.value, kind)));
        return faulty;
    }
    return value.value;
}

std::vector<double> Context::coordinates(const toml::node& node, const std::string& what, const Range& range) {
    const toml::array* array = node.as_array();
    if (array == nullptr) {
        faults.add(position_of(node), fmt::format("{} must be a point, but is {}", what, type_name(node)),
                   "write it as [x, y]");
        return {};
    }
    if (array->size() < 2 || array->size() > 3) {
        faults.add(position_of(node),
                   fmt::format("{} must be a point, but has {} coordinate{}", what, array->size(),
                               array->size() == 1 ? "" : "s"),
                   "write it as [x, y] or [x, y, z]");
        return {};
    }
    std::vector<double> values;
    const char* axis = "xyz";
    for (std::size_t i = 0; i < array->size(); ++i) {
        values.push_back(quantity((*array)[i], fmt::format("{} of {}", axis[i], what), kinds::length, range));
    }
    const bool good = std::none_of(values.begin(), values.end(), [](double v) { return std::isnan(v); });
    return good ? values : std::vector<double>{};
}

std::optional<Vec2> Context::point2(const toml::node& node, const std::string& what) {
    const auto values = coordinates(node, what);
    if (values.size() == 2) return Vec2{values[0], values[1]};
    if (values.size() == 3) {
        faults.add(position_of(node), fmt::format("{} lies in a plane and takes two coordinates, but has three", what));
    }
    return std::nullopt;
}

std::optional<Vec3> Context::point3(const toml::node& node, const std::string& what) {
    const auto values = coordinates(node, what);
    if (values.size() == 3) return Vec3{values[0], values[1], values[2]};
    if (values.size() == 2) {
        faults.add(position_of(node), fmt::format("{} lies in space and takes three coordinates, but has two", what));
    }
    return std::nullopt;
}

std::string item_label(const char* kind, const toml::table& table, std::size_t index) {
    if (const auto name = table["name"].value<std::string>(); name && !name->empty()) {
        return fmt::format("{} '{}'", kind, *name);
    }
    return fmt::format("{} {}", kind, index + 1);
}

Fields::Fields(const toml::table& table, std::string what, Context& context, std::vector<std::string> allowed,
               const std::vector<std::string>& reserved)
    : table_(table), what_(std::move(what)), context_(context) {
    for (const auto& [key, node] : table) {
        const std::string name(key.str());
        if (std::find(allowed.begin(), allowed.end(), name) != allowed.end()) continue;
        if (std::find(reserved.begin(), reserved.end(), name) != reserved.end()) {
            context_.faults.add(position_of(key), fmt::format("'{}' is reserved for a later version", name),
                                "remove it: the model is solved without");
        } else {
            report_unknown(key, allowed);
        }
    }
}

void Fields::report_unknown(const toml::key& key, const std::vector<std::string>& allowed) {
    const std::string name(key.str());
    const std::string near = nearest(name, allowed);
    context_.faults.add(position_of(key), fmt::format("unknown key '{}' in {}", name, what_),
                        near.empty() ? fmt::format("known keys are {}", fmt::join(allowed, ", "))
                                     : fmt::format("did you mean '{}'?", near));
}

std::string Fields::named(std::string_view key) const {
    return fmt::format("'{}' of {}", key, what_);
}

Position Fields::where(std::string_view key) const {
    const toml::node* node = table_.get(key);
    return node == nullptr ? where() : position_of(*node);
}

const toml::node* Fields::need(std::string_view key, const char* example) {
    const toml::node* node = get(key);
    if (node == nullptr) {
        context_.faults.add(where(), fmt::format("{} has no '{}'", what_, key),
                            fmt::format("add {} = {}", key, example));
    }
    return node;
}

const toml::array* Fields::list(std::string_view key) {
    const toml::node* node = get(key);
    if (node == nullptr) return nullptr;
    const toml::array* array = node->as_array();
    if (array == nullptr) {
        context_.faults.add(position_of(*node),
                            fmt::format("{} must be a list, but is {}", named(key), type_name(*node)));
        return nullptr;
    }
    if (array->size() > longest_list) {
        context_.faults.add(position_of(*node),
                            fmt::format("{} has {} entries, more than {}", named(key), array->size(), longest_list));
        return nullptr;
    }
    return array;
}

const toml::array* Fields::need_list(std::string_view key, const char* example) {
    return need(key, example) == nullptr ? nullptr : list(key);
}

const toml::table* Fields::table(std::string_view key) {
    const toml::node* node = get(key);
    if (node == nullptr) return nullptr;
    if (node->is_table()) return node->as_table();
    context_.faults.add(position_of(*node), fmt::format("{} must be a table, but is {}", named(key), type_name(*node)),
                        fmt::format("write {} = {{ ... }}", key));
    return nullptr;
}

double Fields::need(std::string_view key, const Kind& kind, const Range& range) {
    const toml::node* node = need(key, fmt::format("\"{}\"", kind.example).c_str());
    return node == nullptr ? faulty : context_.quantity(*node, named(key), kind, range);
}

double Fields::number(std::string_view key, const Kind& kind, const Range& range, double otherwise) {
    const toml::node* node = get(key);
    return node == nullptr ? otherwise : context_.quantity(*node, named(key), kind, range);
}

std::optional<double> Fields::optional(std::string_view key, const Kind& kind, const Range& range) {
    const toml::node* node = get(key);
    if (node == nullptr) return std::nullopt;
    return context_.quantity(*node, named(key), kind, range);
}

std::optional<int> Fields::whole(std::string_view key, int least, int most) {
    const auto value = optional(key, kinds::number, {static_cast<double>(least), static_cast<double>(most)});
    if (!value || std::isnan(*value)) return std::nullopt;
    if (*value != std::round(*value)) {
        context_.faults.add(where(key), fmt::format("{} must be a whole number, but is {:.6g}", named(key), *value));
        return std::nullopt;
    }
    return static_cast<int>(*value);
}

std::string Fields::text(std::string_view key, std::string otherwise) {
    const toml::node* node = get(key);
    if (node == nullptr) return otherwise;
    if (const auto* string = node->as_string()) return string->get();
    context_.faults.add(position_of(*node), fmt::format("{} must be a text, but is {}", named(key), type_name(*node)),
                        "write it in quotes");
    return {};
}

std::string Fields::need_text(std::string_view key, const char* example) {
    if (need(key, example) == nullptr) return {};
    const std::string found = text(key);
    if (found.empty() && get(key)->is_string()) {
        context_.faults.add(where(key), fmt::format("{} is empty", named(key)));
    }
    return found;
}

bool Fields::flag(std::string_view key) {
    const toml::node* node = get(key);
    if (node == nullptr) return false;
    if (const auto value = node->value_exact<bool>()) return *value;
    context_.faults.add(position_of(*node),
                        fmt::format("{} must be true or false, but is {}", named(key), type_name(*node)));
    return false;
}

std::optional<Vec2> Fields::need_point2(std::string_view key) {
    const toml::node* node = need(key, "[0, 0]");
    return node == nullptr ? std::nullopt : context_.point2(*node, named(key));
}

std::optional<Vec3> Fields::need_point3(std::string_view key) {
    const toml::node* node = need(key, "[0, 0, 0]");
    return node == nullptr ? std::nullopt : context_.point3(*node, named(key));
}

std::string Fields::exactly_one(const std::vector<std::string>& keys, const char* noun, const std::string& help) {
    std::vector<std::string> present;
    for (const std::string& key : keys) {
        if (has(key)) present.push_back(key);
    }
    if (present.size() == 1) return present.front();
    if (present.empty()) {
        context_.faults.add(where(), fmt::format("{} has no {}", what_, noun),
                            help.empty() ? fmt::format("add one of {}", fmt::join(keys, ", ")) : help);
        return {};
    }
    std::sort(present.begin(), present.end(), [this](const auto& a, const auto& b) { return where(a) < where(b); });
    context_.faults.add(
        where(present[1]),
        fmt::format("{} has {} {}s, '{}' and '{}'", what_, present.size(), noun, present[0], present[1]),
        fmt::format("keep exactly one of {}", fmt::join(keys, ", ")));
    return {};
}

void Fields::refuse(std::initializer_list<const char*> keys, const std::string& reason, const std::string& help) {
    for (const char* key : keys) {
        if (has(key)) context_.faults.add(where(key), fmt::format("'{}' has no meaning {}", key, reason), help);
    }
}

}  // namespace annulet
