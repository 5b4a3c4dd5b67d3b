#include <annulet/model/drawing.hpp>

#include "model/reading.hpp"

#include <fmt/format.h>

#include <algorithm>

namespace annulet {

namespace {

const std::vector<std::string> top_keys{"title",   "unit",  "parameters",  "laminate", "metal", "via",
                                        "wire",    "port",  "lumped",      "ground",   "goal",  "transmit",
                                        "feature", "sweep", "fabrication", "accuracy"};

std::vector<std::size_t> line_starts_of(const std::string& text) {
    std::vector<std::size_t> starts{0};
    for (std::size_t i = 0; i < text.size(); ++i) {
        if (text[i] == '\n') starts.push_back(i + 1);
    }
    return starts;
}

double length_unit(const ParsedText& parsed, Faults& faults) {
    constexpr double millimetre = 1e-3;
    const toml::node* node = parsed.root.get("unit");
    if (node == nullptr) return millimetre;
    const auto unit = find_unit(node->value_or(std::string()));
    if (unit && unit->dimension == kinds::length.dimension) return unit->scale;
    faults.add(position_of(*node), "'unit' must be a unit of length",
               "write \"um\", \"mm\", \"cm\", \"m\", \"mil\" or \"inch\"");
    return millimetre;
}

// The remedy for the commonest slip, whose description by the parser leads astray.
std::string syntax_help(const std::string& description) {
    const bool open_text = description.find("parsing string") != std::string::npos &&
                           description.find("control characters") != std::string::npos;
    return open_text ? "a text ends with its quote on the same line" : "";
}

}  // namespace

void for_each_table(Reading& reading, const char* key,
                    const std::function<void(const toml::table&, std::size_t)>& read) {
    const toml::node* node = reading.context.parsed.root.get(key);
    if (node == nullptr) return;
    const toml::array* list = node->as_array();
    if (list == nullptr) {
        reading.faults().add(position_of(*node), fmt::format("'{}' must be a list of tables", key),
                             fmt::format("write [[{}]] with double brackets", key));
        return;
    }
    if (list->size() > longest_list) {
        reading.faults().add(position_of((*list)[0]), fmt::format("the model has {} entries of '{}', more than {}",
                                                                  list->size(), key, longest_list));
        return;
    }
    for (std::size_t i = 0; i < list->size(); ++i) {
        if (const toml::table* table = (*list)[i].as_table()) {
            read(*table, i);
        } else {
            reading.faults().add(position_of((*list)[i]), fmt::format("each entry of '{}' must be a table", key),
                                 fmt::format("write [[{}]] with double brackets", key));
        }
    }
}

void Names::add(const std::string& name, Position where) {
    if (name.empty()) return;
    const auto [found, added] = lines_.emplace(name, where.line);
    if (added) return;
    faults_.add(where, fmt::format("{} '{}' has the name of the one in line {}", kind_, name, found->second),
                "give each its own name");
}

Drawing::Drawing(std::shared_ptr<const ParsedText> parsed) : parsed_(std::move(parsed)) {}
const std::string& Drawing::text() const {
    return parsed_->text;
}
const std::string& Drawing::file_name() const {
    return parsed_->file_name;
}

std::vector<std::string> Drawing::parameter_names() const {
    std::vector<std::string> names;
    if (const toml::table* table = parsed_->root["parameters"].as_table()) {
        for (const auto& [key, node] : *table) names.emplace_back(key.str());
    }
    return names;
}

Drawing read_drawing(std::string text, std::string file_name) {
    if (text.size() > largest_text_bytes) {
        throw InputError({{Severity::error,
                           {},
                           fmt::format("the file has {} bytes, more than {}", text.size(), largest_text_bytes),
                           "is this a model file?"}});
    }
    auto parsed = std::make_shared<ParsedText>();
    parsed->text = std::move(text);
    parsed->file_name = std::move(file_name);
    parsed->line_starts = line_starts_of(parsed->text);
    try {
        parsed->root = toml::parse(parsed->text, parsed->file_name);
    } catch (const toml::parse_error& fault) {
        const Position where{static_cast<int>(fault.source().begin.line),
                             static_cast<int>(fault.source().begin.column)};
        throw InputError({{Severity::error, where, fmt::format("not valid TOML: {}", fault.description()),
                           syntax_help(std::string(fault.description()))}});
    }
    return Drawing(std::move(parsed));
}

Model evaluate(const Drawing& drawing, const std::map<std::string, std::string>& set,
               const std::vector<std::string>& omit) {
    const ParsedText& parsed = drawing.parsed();
    Faults faults;
    Parameters parameters(parsed, set, length_unit(parsed, faults), faults);
    Model model;
    model.file = parsed.file_name;
    model.title = parsed.root["title"].value_or(std::string());
    Reading reading{{parsed, faults, parameters}, model, {omit.begin(), omit.end()}};
    Fields(parsed.root, "the model", reading.context, top_keys, {"coating", "body"}).text("title");
    model.parameters_si = parameters.evaluate_all();
    read_laminates(reading);
    read_metals(reading);
    read_vias(reading);
    read_wires(reading);
    read_ports(reading);
    read_lumped(reading);
    read_settings(reading);
    read_features(reading);
    check_together(reading);
    faults.throw_if_any();
    return model;
}

}  // namespace annulet
