#include "model/outline.hpp"
#include "model/reading.hpp"

#include <annulet/core/constants.hpp>

#include <fmt/format.h>
#include <Eigen/Geometry>

#include <cmath>

namespace annulet {

namespace {

constexpr double full_turn_rad = 2 * constants::pi * (1 + 1e-12);

std::string millimetres(double length_m) {
    return to_text(length_m, kinds::length.dimension);
}
std::string place(const Vec3& p) {
    return fmt::format("({:.6g}, {:.6g}, {:.6g}) mm", p.x() * 1e3, p.y() * 1e3, p.z() * 1e3);
}

// A direction; its length does not matter, but must not be nothing.
Vec3 read_direction(Fields& fields, const char* key) {
    const toml::node* node = fields.get(key);
    if (node == nullptr) return {0, 0, 1};
    Context& context = fields.context();
    const toml::array* list = node->as_array();
    if (list == nullptr || list->size() != 3) {
        context.faults.add(position_of(*node),
                           fmt::format("{} must be a direction of three numbers", fields.named(key)),
                           "write [0, 0, 1]");
        return {0, 0, 1};
    }
    Vec3 direction;
    for (int i = 0; i < 3; ++i) {
        direction[i] =
            context.quantity((*list)[static_cast<std::size_t>(i)], fmt::format("{} of {}", "xyz"[i], fields.named(key)),
                             kinds::number, {-1e9, 1e9});
    }
    if (direction.norm() == 0)
        context.faults.add(position_of(*node), fmt::format("{} has no length", fields.named(key)), "write [0, 0, 1]");
    return direction.normalized();
}

class WirePathReader {
public:
    WirePathReader(const std::string& what, Context& context) : what_(what), context_(context) {}

    WirePath read(const toml::array& list) {
        if (list.size() < 2) {
            context_.faults.add(position_of(list), fmt::format("the path of {} has fewer than two points", what_),
                                "a wire runs from one point at least to another, or along an arc");
            return {};
        }
        for (std::size_t i = 0; i < list.size(); ++i) {
            const std::string label = fmt::format("point {} of {}", i + 1, what_);
            const bool good = list[i].is_table() ? add_arc(list[i], i, label) : add_point(list[i], i, label);
            if (!good) break;
        }
        return std::move(path_);
    }

private:
    bool add_point(const toml::node& node, std::size_t i, const std::string& label) {
        const auto point = context_.point3(node, label);
        if (!point) return false;
        if (i > 0 && (*point - at_).norm() < tiny_m) {
            context_.faults.add(position_of(node),
                                fmt::format("points {} and {} of {} coincide at {}", i, i + 1, what_, place(*point)),
                                "leave one of them out");
        }
        path_.pieces.emplace_back(*point);
        at_ = *point;
        return true;
    }

    bool add_arc(const toml::node& node, std::size_t i, const std::string& label) {
        if (i == 0) {
            context_.faults.add(position_of(node), fmt::format("the path of {} begins with an arc", what_),
                                "begin with the point where the arc starts");
            return false;
        }
        const std::size_t before = context_.faults.count();
        Fields outer(*node.as_table(), label, context_, {"arc"});
        const toml::table* table =
            outer.need("arc", "{ center = [0, 0, 0], sweep = \"90 deg\" }") == nullptr ? nullptr : outer.table("arc");
        if (table == nullptr) return false;
        Fields fields(*table, "the arc at " + label, context_, {"center", "normal", "sweep"});
        WireArc arc;
        arc.centre = fields.need_point3("center").value_or(Vec3{0, 0, 0});
        arc.normal = read_direction(fields, "normal");
        arc.sweep_rad = fields.need("sweep", kinds::angle, {-full_turn_rad, full_turn_rad});
        if (context_.faults.count() != before) return false;
        check_arc(arc, fields, label);
        if (context_.faults.count() != before) return false;
        at_ = arc.centre + Eigen::AngleAxisd(arc.sweep_rad, arc.normal) * (at_ - arc.centre);
        path_.pieces.emplace_back(arc);
        return true;
    }

    void check_arc(const WireArc& arc, const Fields& fields, const std::string& label) {
        if (std::abs(arc.sweep_rad) < 1e-9) {
            context_.faults.add(fields.where("sweep"), fmt::format("{} is zero", fields.named("sweep")));
        }
        const Vec3 arm = at_ - arc.centre;
        if (arm.norm() < tiny_m) {
            context_.faults.add(
                fields.where("center"),
                fmt::format("the arc at {} has its center on its starting point {}", label, place(at_)));
        } else if (std::abs(arm.dot(arc.normal)) > 1e-6 * arm.norm()) {
            context_.faults.add(fields.where(),
                                fmt::format("the arc at {} starts at {}, {} out of the plane of its center and normal",
                                            label, place(at_), millimetres(std::abs(arm.dot(arc.normal)))),
                                "move the center, or turn the normal square to the line from the center to the start");
        }
    }

    std::string what_;
    Context& context_;
    WirePath path_;
    Vec3 at_{0, 0, 0};
};

WireCircle read_circle(Fields fields, double wire_radius_m) {
    WireCircle circle;
    circle.centre = fields.need_point3("center").value_or(Vec3{0, 0, 0});
    circle.radius_m = fields.need("radius", kinds::length, ranges::positive_length);
    circle.normal = read_direction(fields, "normal");
    if (circle.radius_m <= wire_radius_m) {
        fields.context().faults.add(
            fields.where("radius"),
            fmt::format("{} must be greater than the radius of the wire, {}, but is {}", fields.named("radius"),
                        millimetres(wire_radius_m), millimetres(circle.radius_m)));
    }
    return circle;
}

WireHelix read_helix(Fields fields, double wire_radius_m) {
    WireHelix helix;
    helix.centre = fields.need_point3("center").value_or(Vec3{0, 0, 0});
    helix.radius_m = fields.need("radius", kinds::length, ranges::positive_length);
    helix.pitch_m = fields.need("pitch", kinds::length, ranges::coordinate);
    helix.turns = fields.need("turns", kinds::number, {0, 10'000, true});
    helix.axis = read_direction(fields, "axis");
    if (helix.radius_m <= wire_radius_m) {
        fields.context().faults.add(
            fields.where("radius"),
            fmt::format("{} must be greater than the radius of the wire, {}, but is {}", fields.named("radius"),
                        millimetres(wire_radius_m), millimetres(helix.radius_m)));
    }
    if (helix.turns > 1 && std::abs(helix.pitch_m) <= 2 * wire_radius_m) {
        fields.context().faults.add(
            fields.where("pitch"),
            fmt::format("{} must exceed the diameter of the wire, {}, or its turns touch, but is {}",
                        fields.named("pitch"), millimetres(2 * wire_radius_m), millimetres(helix.pitch_m)));
    }
    return helix;
}

void read_centre_line(Fields& fields, Wire& wire) {
    const std::string kind = fields.exactly_one({"path", "circle", "helix"}, "shape");
    if (kind.empty()) return;
    Context& context = fields.context();
    if (kind == "path") {
        if (const toml::array* list = fields.list("path"))
            wire.shape = WirePathReader(fields.what(), context).read(*list);
        return;
    }
    const toml::table* table = fields.table(kind);
    if (table == nullptr) return;
    const std::string what = fmt::format("the {} of {}", kind, fields.what());
    if (kind == "circle") {
        wire.shape = read_circle({*table, what, context, {"center", "radius", "normal"}}, wire.radius_m);
    } else {
        wire.shape = read_helix({*table, what, context, {"center", "radius", "pitch", "turns", "axis"}}, wire.radius_m);
    }
}

}  // namespace

void read_wires(Reading& reading) {
    Names names("wire", reading.faults());
    for_each_table(reading, "wire", [&](const toml::table& table, std::size_t index) {
        Wire wire;
        wire.name = table["name"].value_or(fmt::format("wire {}", index + 1));
        names.add(wire.name, position_of(table));
        reading.omittable.insert(wire.name);
        if (reading.omitted(wire.name)) return;
        reading.wire_names.insert(wire.name);
        Fields fields(table, item_label("wire", table, index), reading.context,
                      {"name", "radius", "path", "circle", "helix", "material", "conductivity", "roughness"});
        wire.name = fields.text("name", wire.name);
        wire.where = fields.where();
        wire.radius_m = fields.need("radius", kinds::length, ranges::positive_length);
        wire.conductor = read_conductor(fields, false);
        read_centre_line(fields, wire);
        reading.model.wires.push_back(std::move(wire));
    });
}

}  // namespace annulet
