#include "model/outline.hpp"
#include "model/reading.hpp"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <cmath>
#include <set>

namespace annulet {

namespace {

const std::vector<std::string> placement_keys{"on", "bridge", "across", "wire", "width", "gap", "at"};

std::vector<std::string> with_placement(std::vector<std::string> keys) {
    keys.insert(keys.end(), placement_keys.begin(), placement_keys.end());
    return keys;
}

// Height for points of two coordinates: the named face or, where all metal lies in one plane, that plane.
class PlaneOf {
public:
    PlaneOf(Fields& fields, Reading& reading) : fields_(fields), reading_(reading) {
        if (fields.has("on")) height_ = read_face(*fields.get("on"), fields.named("on"), reading);
    }

    std::optional<Vec3> point(const toml::node& node, const std::string& what) {
        const auto values = reading_.context.coordinates(node, what);
        if (values.size() == 3) return Vec3{values[0], values[1], values[2]};
        if (values.size() < 2) return std::nullopt;
        const auto height = plane(node, what);
        if (!height) return std::nullopt;
        return Vec3{values[0], values[1], *height};
    }

private:
    std::optional<double> plane(const toml::node& node, const std::string& what) {
        if (height_) return height_;
        std::set<double> planes;
        for (const Metal& metal : reading_.model.metals) planes.insert(metal.plane_m);
        if (planes.size() == 1) return *planes.begin();
        // A metal whose plane is faulty has been reported; its port is not to blame.
        if (reading_.metals_faulty || reported_) return std::nullopt;
        reported_ = true;
        const std::string why =
            planes.empty() ? "there is no flat metal" : fmt::format("metal lies in {} planes", planes.size());
        reading_.faults().add(
            position_of(node), fmt::format("{} has two coordinates, but {}", what, why),
            planes.empty() ? "give three coordinates"
                           : fmt::format("add on = \"board.top\" to {}, or give three coordinates", fields_.what()));
        return std::nullopt;
    }

    Fields& fields_;
    Reading& reading_;
    std::optional<double> height_;
    bool reported_ = false;
};

struct Ends {
    Vec3 from, to;
};

std::optional<Ends> read_ends(Fields& fields, const std::string& key, Reading& reading) {
    PlaneOf plane(fields, reading);
    const toml::array* list = fields.list(key);
    if (list == nullptr) return std::nullopt;
    if (list->size() != 2) {
        reading.faults().add(position_of(*list),
                             fmt::format("{} must have two points, but has {}", fields.named(key), list->size()),
                             fmt::format("write {} = [[x1, y1], [x2, y2]]", key));
        return std::nullopt;
    }
    const auto from = plane.point((*list)[0], "first point of " + fields.named(key));
    const auto to = plane.point((*list)[1], "second point of " + fields.named(key));
    if (!from || !to) return std::nullopt;
    if ((*from - *to).norm() < tiny_m) {
        reading.faults().add(position_of(*list),
                             fmt::format("{} has no length: both points are ({:.6g}, {:.6g}) mm", fields.named(key),
                                         from->x() * 1e3, from->y() * 1e3),
                             "a port or part always has a physical length");
        return std::nullopt;
    }
    return Ends{*from, *to};
}

std::optional<Placement> read_on_wire(Fields& fields, Reading& reading) {
    const std::string name = fields.need_text("wire", "\"lead\"");
    const std::size_t before = reading.faults().count();
    const double at = fields.number("at", kinds::number, {0, 1}, 0.5);
    const double gap = fields.need("gap", kinds::length, ranges::positive_length);
    if (reading.omitted(name)) {
        reading.faults().add(fields.where("wire"),
                             fmt::format("{} lies on wire '{}', which is left out", fields.what(), name),
                             "leave out the part with it");
        return std::nullopt;
    }
    if (!name.empty() && reading.wire_names.count(name) == 0) {
        const std::string near = nearest(name, {reading.wire_names.begin(), reading.wire_names.end()});
        reading.faults().add(
            fields.where("wire"), fmt::format("{} lies on wire '{}', which does not exist", fields.what(), name),
            !near.empty()                ? fmt::format("did you mean '{}'?", near)
            : reading.wire_names.empty() ? "the model has no [[wire]]"
                                         : fmt::format("wires are {}", fmt::join(reading.wire_names, ", ")));
    }
    if (reading.faults().count() != before) return std::nullopt;
    return OnWire{name, at, gap};
}

std::optional<Placement> read_placement(Fields& fields, Reading& reading, Position& where) {
    const std::string kind = fields.exactly_one({"bridge", "across", "wire"}, "place");
    if (kind.empty()) return std::nullopt;
    where = fields.where(kind);
    if (kind == "wire") {
        fields.refuse({"width", "on"}, "on a wire", "remove it");
        return read_on_wire(fields, reading);
    }
    if (kind == "bridge") {
        fields.refuse({"gap"}, "on a bridge, whose length is that between its points", "a bridge takes 'width'");
        fields.refuse({"at"}, "on a bridge", "'at' belongs to 'wire'");
        const double width = fields.need("width", kinds::length, ranges::positive_length);
        const auto ends = read_ends(fields, kind, reading);
        return ends ? std::optional<Placement>(Bridge{ends->from, ends->to, width}) : std::nullopt;
    }
    fields.refuse({"width"}, "on a slit drawn from edge to edge", "'across' takes 'gap', its length along the current");
    fields.refuse({"at"}, "on a slit", "'at' belongs to 'wire'");
    const double gap = fields.need("gap", kinds::length, ranges::positive_length);
    const auto ends = read_ends(fields, kind, reading);
    if (ends && std::abs(ends->from.z() - ends->to.z()) > tiny_m) {
        reading.faults().add(where, fmt::format("{} joins two planes", fields.named("across")),
                             "use 'bridge' between two faces");
    }
    return ends ? std::optional<Placement>(Across{ends->from, ends->to, gap}) : std::nullopt;
}

std::optional<FeedLine> read_line(Fields& fields) {
    const toml::table* table = fields.table("line");
    if (table == nullptr) return std::nullopt;
    Fields line(*table, "the line of " + fields.what(), fields.context(), {"impedance", "length", "velocity_factor"});
    return FeedLine{line.need("impedance", kinds::resistance, {0.1, 1e4}),
                    line.need("length", kinds::length, ranges::not_negative_length),
                    line.number("velocity_factor", kinds::number, {0.05, 1}, 1)};
}

void read_values(Fields& fields, Lumped& part) {
    part.resistance_ohm = fields.optional("resistance", kinds::resistance, ranges::not_negative);
    part.inductance_h = fields.optional("inductance", kinds::inductance, ranges::positive);
    part.capacitance_f = fields.optional("capacitance", kinds::capacitance, ranges::positive);
    part.quality = fields.optional("quality", kinds::number, ranges::positive);
    part.self_resonance_hz = fields.optional("self_resonance", kinds::frequency, ranges::frequency);
    Faults& faults = fields.context().faults;
    const bool reactive = fields.has("inductance") || fields.has("capacitance");
    if (!reactive && !fields.has("resistance")) {
        faults.add(fields.where(), fmt::format("{} has no value", fields.what()),
                   "give one or more of resistance, inductance, capacitance; a short is drawn as metal");
    } else if (!reactive) {
        fields.refuse({"quality", "self_resonance"}, "on a part without inductance or capacitance");
    }
    if (fields.has("inductance") && fields.has("capacitance")) {
        fields.refuse({"self_resonance"}, "on a part that has inductance and capacitance already");
    }
    if (fields.has("quality") && reactive) {
        part.quality_at_hz = fields.need("quality_at", kinds::frequency, ranges::frequency);
    } else if (!fields.has("quality")) {
        fields.refuse({"quality_at"}, "without 'quality'");
    }
}

}  // namespace

void read_ports(Reading& reading) {
    Names names("port", reading.faults());
    for_each_table(reading, "port", [&](const toml::table& table, std::size_t index) {
        Port port;
        Fields fields(table, item_label("port", table, index), reading.context,
                      with_placement({"name", "reference_impedance", "line"}));
        port.name = fields.need_text("name", "\"feed\"");
        names.add(port.name, fields.where());
        reading.fixed.insert(port.name);
        port.where = fields.where();
        if (const auto placement = read_placement(fields, reading, port.where)) port.placement = *placement;
        port.reference_ohm = fields.number("reference_impedance", kinds::resistance, {1e-3, 1e6}, 50);
        port.line = read_line(fields);
        reading.model.ports.push_back(std::move(port));
    });
}

void read_lumped(Reading& reading) {
    Names names("lumped part", reading.faults());
    for_each_table(reading, "lumped", [&](const toml::table& table, std::size_t index) {
        Lumped part;
        part.name = table["name"].value_or(std::string());
        names.add(part.name, position_of(table));
        reading.omittable.insert(part.name);
        if (reading.omitted(part.name)) return;
        Fields fields(table, item_label("lumped part", table, index), reading.context,
                      with_placement({"name", "resistance", "inductance", "capacitance", "quality", "quality_at",
                                      "self_resonance"}));
        part.name = fields.need_text("name", "\"trim\"");
        part.where = fields.where();
        if (const auto placement = read_placement(fields, reading, part.where)) part.placement = *placement;
        read_values(fields, part);
        reading.model.lumped.push_back(std::move(part));
    });
}

}  // namespace annulet
