#include "model/reading.hpp"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <algorithm>
#include <cmath>

namespace annulet {

namespace {

constexpr int most_points = 1'000'000;

std::string hertz(double frequency_hz) {
    return to_text(frequency_hz, kinds::frequency.dimension);
}

// The table `key` of the file as fields, if present and a table.
std::optional<Fields> section(Reading& reading, const char* key, std::vector<std::string> allowed) {
    const toml::node* node = reading.context.parsed.root.get(key);
    if (node == nullptr) return std::nullopt;
    if (const toml::table* table = node->as_table())
        return Fields(*table, fmt::format("[{}]", key), reading.context, std::move(allowed));
    reading.faults().add(position_of(*node), fmt::format("'{}' must be a table", key),
                         fmt::format("write [{}] once, with single brackets", key));
    return std::nullopt;
}

std::optional<Band> read_band(Fields& fields) {
    const toml::array* list = fields.list("band");
    if (list == nullptr) return std::nullopt;
    Context& context = fields.context();
    if (list->size() != 2) {
        context.faults.add(position_of(*list),
                           fmt::format("{} must have two frequencies, but has {}", fields.named("band"), list->size()),
                           "write band = [\"863 MHz\", \"870 MHz\"]");
        return std::nullopt;
    }
    const Band band{
        context.quantity((*list)[0], "start of " + fields.named("band"), kinds::frequency, ranges::frequency),
        context.quantity((*list)[1], "end of " + fields.named("band"), kinds::frequency, ranges::frequency)};
    if (band.from_hz >= band.to_hz) {
        context.faults.add(position_of(*list),
                           fmt::format("{} must rise, but runs from {} to {}", fields.named("band"),
                                       hertz(band.from_hz), hertz(band.to_hz)),
                           "write the lower frequency first");
    }
    return band;
}

void read_rejected(Fields& goal, Reading& reading) {
    const toml::array* list = goal.list("reject");
    if (list == nullptr) return;
    Names names("reject band", reading.faults());
    for (std::size_t i = 0; i < list->size(); ++i) {
        const toml::table* table = (*list)[i].as_table();
        if (table == nullptr) {
            reading.faults().add(position_of((*list)[i]), "each entry of 'reject' must be a table",
                                 "write { name = \"broadcast\", band = [\"470 MHz\", \"694 MHz\"] }");
            continue;
        }
        Fields fields(*table, item_label("reject band", *table, i), reading.context, {"name", "band"});
        const std::string name = fields.need_text("name", "\"broadcast\"");
        names.add(name, fields.where());
        fields.need("band", "[\"470 MHz\", \"694 MHz\"]");
        if (const auto band = read_band(fields)) reading.model.goal.reject.push_back({name, *band});
    }
}

void read_goal(Reading& reading) {
    auto fields = section(reading, "goal", {"band", "vswr", "reject"});
    if (!fields) return;
    Goal& goal = reading.model.goal;
    goal.where = fields->where();
    goal.band = read_band(*fields);
    goal.vswr = fields->number("vswr", kinds::number, {1, 1000, true}, 2);
    read_rejected(*fields, reading);
}

void read_frequencies(Fields& fields, SweepRange& sweep) {
    fields.refuse({"from", "to", "points"}, "beside 'at'", "keep either at = [...] or from, to and points");
    const toml::array* list = fields.list("at");
    if (list == nullptr) return;
    if (list->empty())
        fields.context().faults.add(position_of(*list), "'at' of [sweep] is an empty list",
                                    "write at = [\"868.3 MHz\"]");
    for (const toml::node& node : *list) {
        sweep.at_hz.push_back(
            fields.context().quantity(node, "frequency in 'at' of [sweep]", kinds::frequency, ranges::frequency));
    }
    std::sort(sweep.at_hz.begin(), sweep.at_hz.end());
    sweep.at_hz.erase(std::unique(sweep.at_hz.begin(), sweep.at_hz.end()), sweep.at_hz.end());
    if (!sweep.at_hz.empty()) {
        sweep.from_hz = sweep.at_hz.front();
        sweep.to_hz = sweep.at_hz.back();
        sweep.points = static_cast<int>(sweep.at_hz.size());
    }
}

void read_sweep(Reading& reading) {
    auto fields = section(reading, "sweep", {"from", "to", "points", "at"});
    if (!fields) return;
    SweepRange& sweep = reading.model.sweep;
    if (fields->has("at")) {
        read_frequencies(*fields, sweep);
        return;
    }
    sweep.from_hz = fields->need("from", kinds::frequency, ranges::frequency);
    sweep.to_hz = fields->need("to", kinds::frequency, ranges::frequency);
    sweep.points = fields->whole("points", 2, most_points).value_or(201);
    if (sweep.from_hz >= sweep.to_hz) {
        reading.faults().add(
            fields->where("to"),
            fmt::format("[sweep] must rise, but runs from {} to {}", hertz(sweep.from_hz), hertz(sweep.to_hz)),
            "exchange them, or write at = [...] for single frequencies");
    }
}

void read_transmit(Reading& reading) {
    auto fields = section(reading, "transmit", {"power", "duty"});
    if (!fields) return;
    reading.model.transmit = Transmit{fields->need("power", kinds::power, {0, 1e6, true}),
                                      fields->number("duty", kinds::fraction, {0, 1, true}, 1)};
}

void read_ground(Reading& reading) {
    auto fields = section(reading, "ground", {"plane"});
    if (fields) reading.model.ground_plane_m = fields->need("plane", kinds::length, ranges::coordinate);
}

void read_fabrication(Reading& reading) {
    auto fields = section(reading, "fabrication", {"minimum_slot", "minimum_web", "tool_radius", "tolerance"});
    if (!fields) return;
    Fabrication& fabrication = reading.model.fabrication;
    fabrication.minimum_slot_m = fields->optional("minimum_slot", kinds::length, ranges::positive_length);
    fabrication.minimum_web_m = fields->optional("minimum_web", kinds::length, ranges::positive_length);
    fabrication.tool_radius_m = fields->optional("tool_radius", kinds::length, ranges::not_negative_length);
    const toml::table* table = fields->table("tolerance");
    if (table == nullptr) return;
    Fields tolerance(*table, "'tolerance' of [fabrication]", reading.context,
                     {"etch", "rout", "thickness", "permittivity"});
    fabrication.etch_m = tolerance.optional("etch", kinds::length, ranges::not_negative_length);
    fabrication.rout_m = tolerance.optional("rout", kinds::length, ranges::not_negative_length);
    fabrication.thickness_fraction = tolerance.optional("thickness", kinds::fraction, {0, 1});
    fabrication.permittivity_fraction = tolerance.optional("permittivity", kinds::fraction, {0, 1});
}

void read_accuracy(Reading& reading) {
    auto fields =
        section(reading, "accuracy", {"resonance", "laminate", "layers", "cells_across", "cells_per_wavelength"});
    if (!fields) return;
    Accuracy& accuracy = reading.model.accuracy;
    accuracy.resonance_fraction = fields->optional("resonance", kinds::fraction, {1e-6, 0.5});
    const std::string method = fields->text("laminate", "full");
    if (method == "static") {
        accuracy.laminate = LaminateMethod::fixed_static;
    } else if (method != "full" && fields->get("laminate")->is_string()) {
        reading.faults().add(
            fields->where("laminate"),
            fmt::format("'laminate' of [accuracy] must be \"full\" or \"static\", but is \"{}\"", method));
    }
    accuracy.layers = fields->whole("layers", 1, 20).value_or(accuracy.layers);
    accuracy.cells_across = fields->whole("cells_across", 1, 50);
    accuracy.cells_per_wavelength = fields->optional("cells_per_wavelength", kinds::number, {5, 500});
}

// The text of a parameter's value as it would be given to --set.
std::string value_text(const toml::node& node) {
    if (const auto* string = node.as_string()) return string->get();
    return fmt::format("{}", node.value<double>().value_or(0));
}

void read_feature_settings(Fields& off, Feature& feature, Reading& reading) {
    const toml::table* set = off.table("set");
    if (set == nullptr) return;
    for (const auto& [key, node] : *set) {
        const std::string name(key.str());
        if (!reading.context.parameters.contains(name)) {
            const std::string near = nearest(name, reading.context.parameters.names());
            reading.faults().add(
                position_of(key), fmt::format("feature '{}' sets '{}', which is no parameter", feature.name, name),
                near.empty() ? "define it under [parameters]" : fmt::format("did you mean '{}'?", near));
        } else if (reading.context.parameters.evaluate(node, fmt::format("'{}' of feature '{}'", name, feature.name))) {
            feature.set[name] = value_text(node);
        }
    }
}

void read_feature_omissions(Fields& off, Feature& feature, Reading& reading) {
    const toml::array* list = off.list("omit");
    if (list == nullptr) return;
    for (const toml::node& node : *list) {
        const std::string name = node.value_or(std::string());
        if (!node.is_string() || name.empty()) {
            reading.faults().add(
                position_of(node),
                fmt::format("each entry of 'omit' of feature '{}' must be the name of an item", feature.name),
                "write omit = [\"trim\"]");
        } else if (reading.fixed.count(name) > 0 && reading.omittable.count(name) == 0) {
            reading.faults().add(position_of(node),
                                 fmt::format("feature '{}' leaves out '{}', which is a port", feature.name, name),
                                 "a port cannot be left out");
        } else if (reading.omittable.count(name) == 0) {
            const std::string near = nearest(name, {reading.omittable.begin(), reading.omittable.end()});
            reading.faults().add(position_of(node),
                                 fmt::format("feature '{}' leaves out '{}', which does not exist", feature.name, name),
                                 near.empty() ? "" : fmt::format("did you mean '{}'?", near));
        } else {
            feature.omit.push_back(name);
        }
    }
}

}  // namespace

void read_features(Reading& reading) {
    Names names("feature", reading.faults());
    for_each_table(reading, "feature", [&](const toml::table& table, std::size_t index) {
        Fields fields(table, item_label("feature", table, index), reading.context, {"name", "off"});
        const std::size_t before = reading.faults().count();
        Feature feature;
        feature.name = fields.need_text("name", "\"series capacitor\"");
        names.add(feature.name, fields.where());
        feature.where = fields.where();
        if (fields.need("off", "{ set = { gap = 1.0 }, omit = [\"trim\"] }") == nullptr) return;
        const toml::table* off_table = fields.table("off");
        if (off_table == nullptr) return;
        Fields off(*off_table, "'off' of " + fields.what(), reading.context, {"set", "omit"});
        read_feature_settings(off, feature, reading);
        read_feature_omissions(off, feature, reading);
        if (reading.faults().count() == before && feature.set.empty() && feature.omit.empty()) {
            reading.faults().add(fields.where("off"), fmt::format("{} changes nothing", off.what()),
                                 "write set = { parameter = value } or omit = [\"item\"]");
        }
        reading.model.features.push_back(std::move(feature));
    });
}

void read_settings(Reading& reading) {
    read_ground(reading);
    read_goal(reading);
    read_transmit(reading);
    read_sweep(reading);
    read_fabrication(reading);
    read_accuracy(reading);
}

}  // namespace annulet
