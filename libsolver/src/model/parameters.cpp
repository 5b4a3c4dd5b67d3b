#include "model/parameters.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace annulet {

Parameters::Parameters(const ParsedText& parsed, const std::map<std::string, std::string>& overrides, double unit_m,
                       Faults& faults)
    : parsed_(parsed), faults_(faults) {
    scope_.unit_m = unit_m;
    scope_.lookup = [this](const std::string& name, std::size_t offset) { return lookup(name, offset); };
    if (const toml::node* node = parsed.root.get("parameters")) {
        if (const toml::table* table = node->as_table()) {
            read_names(*table);
        } else {
            faults_.add(position_of(*node), "'parameters' must be a table",
                        "write [parameters] and below it name = value");
        }
    }
    read_overrides(overrides);
}

void Parameters::read_names(const toml::table& table) {
    for (const auto& [key, node] : table) {
        const std::string name(key.str());
        if (!is_identifier(name)) {
            faults_.add(position_of(key), fmt::format("'{}' cannot be the name of a parameter", name),
                        "use letters, digits and _, beginning with a letter");
            continue;
        }
        if (is_reserved_name(name)) {
            faults_.add(position_of(key),
                        fmt::format("a parameter cannot be called '{}', which is a function or constant", name),
                        "choose another name");
            continue;
        }
        entries_[name].node = &node;
        scope_.names.push_back(name);
    }
}

void Parameters::read_overrides(const std::map<std::string, std::string>& overrides) {
    for (const auto& [name, text] : overrides) {
        const auto found = entries_.find(name);
        if (found == entries_.end()) {
            const std::string near = nearest(name, scope_.names);
            faults_.add({}, fmt::format("--set {}={}: the model has no parameter '{}'", name, text, name),
                        near.empty() ? "" : fmt::format("did you mean '{}'?", near));
            continue;
        }
        found->second.override_text = &text;
    }
}

std::string Parameters::cycle_through(const std::string& name) const {
    std::string chain;
    for (auto at = std::find(running_.begin(), running_.end(), name); at != running_.end(); ++at) chain += *at + " -> ";
    return chain + name;
}

Quantity Parameters::lookup(const std::string& name, std::size_t offset) {
    const auto found = entries_.find(name);
    if (found == entries_.end()) {
        const std::string near = nearest(name, scope_.names);
        const bool unit = find_unit(name).has_value();
        throw ExpressionFault{offset, fmt::format("unknown parameter '{}'", name),
                              !near.empty() ? fmt::format("did you mean '{}'?", near)
                              : unit        ? fmt::format("a unit stands after a number, as in 1 {}", name)
                                            : "define it under [parameters]"};
    }
    Entry& entry = found->second;
    if (entry.state == State::running) {
        throw ExpressionFault{offset, fmt::format("parameter '{}' depends on itself: {}", name, cycle_through(name)),
                              ""};
    }
    if (entry.state == State::fresh) {
        entry.state = State::running;
        running_.push_back(name);
        const auto value = resolve(name, entry);
        running_.pop_back();
        entry.state = value ? State::done : State::failed;
        if (value) entry.value = *value;
    }
    if (entry.state == State::failed) throw AlreadyReported{};
    return entry.value;
}

std::optional<Quantity> Parameters::resolve(const std::string& name, Entry& entry) {
    if (entry.override_text != nullptr) return overridden(name, entry);
    return evaluate(*entry.node, fmt::format("parameter '{}'", name));
}

std::optional<Quantity> Parameters::overridden(const std::string& name, Entry& entry) {
    const std::string& text = *entry.override_text;
    const std::string option = fmt::format("--set {}={}", name, text);
    Quantity value;
    try {
        value = evaluate_expression(text, scope_);
    } catch (const ExpressionFault& fault) {
        faults_.add({}, fmt::format("{}: {}", option, fault.message), fault.help);
        return std::nullopt;
    } catch (const AlreadyReported&) {
        return std::nullopt;
    }
    const auto written = evaluate(*entry.node, fmt::format("parameter '{}'", name));
    if (!written || written->is_bare() || written->dimension == value.dimension) return value;
    if (!value.is_bare()) {
        faults_.add({}, fmt::format("{}: parameter '{}' is {}, but this is {}", option, name,
                                    kind_with_article(*written), kind_with_article(value)));
        return std::nullopt;
    }
    double scale = bare_scale(written->dimension, scope_.unit_m);
    if (const auto* string = entry.node->as_string()) {
        // "868.3 MHz" overridden by 433 means 433 MHz.
        const auto last_blank_or_digit = string->get().find_last_of(" 0123456789.");
        const auto unit = find_unit(std::string_view(string->get()).substr(last_blank_or_digit + 1));
        if (unit && unit->dimension == written->dimension) return unit->times(value.value);
    }
    return Quantity{value.value * scale, written->dimension, false};
}

std::optional<Quantity> Parameters::evaluate(const toml::node& node, const std::string& what) {
    if (node.is_number()) {
        const double value = node.value<double>().value();
        if (std::isfinite(value)) return Quantity{value, {}, false};
        faults_.add(position_of(node), fmt::format("{} is not a finite number", what));
        return std::nullopt;
    }
    const auto* string = node.as_string();
    if (string == nullptr) {
        faults_.add(position_of(node), fmt::format("{} must be a number or a text with a unit or expression", what));
        return std::nullopt;
    }
    try {
        return evaluate_expression(string->get(), scope_);
    } catch (const ExpressionFault& fault) {
        faults_.add(parsed_.within(node, string->get(), fault.offset), fmt::format("{}: {}", what, fault.message),
                    fault.help);
    } catch (const AlreadyReported&) {
    }
    return std::nullopt;
}

std::map<std::string, double> Parameters::evaluate_all() {
    std::map<std::string, double> values;
    for (auto& [name, entry] : entries_) {
        try {
            values[name] = lookup(name, 0).value;
        } catch (const AlreadyReported&) {
        }
    }
    return values;
}

}  // namespace annulet
