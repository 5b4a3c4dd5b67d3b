#include "model/outline.hpp"
#include "model/reading.hpp"

#include <annulet/core/constants.hpp>

#include <fmt/format.h>

#include <cmath>

namespace annulet {

namespace {

constexpr Range full_turn{0, 2 * constants::pi*(1 + 1e-12), true};

// A shape is handed on only when reading it added no fault.
template <class T>
std::optional<T> unless_faulty(T shape, std::size_t faults_before, const Context& context) {
    if (context.faults.count() != faults_before) return std::nullopt;
    return shape;
}

std::string place(const Vec2& p) {
    return fmt::format("({:.6g}, {:.6g}) mm", p.x() * 1e3, p.y() * 1e3);
}

std::optional<Shape> read_ring(Fields fields) {
    const std::size_t before = fields.context().faults.count();
    Ring ring;
    ring.centre = fields.need_point2("center").value_or(Vec2{0, 0});
    ring.radius_m = fields.need("radius", kinds::length, ranges::positive_length);
    ring.width_m = fields.need("width", kinds::length, ranges::positive_length);
    if (ring.width_m >= 2 * ring.radius_m) {
        fields.context().faults.add(
            fields.where("width"),
            fmt::format("{} must be less than twice the radius, {}, but is {}", fields.named("width"),
                        to_text(2 * ring.radius_m, kinds::length.dimension),
                        to_text(ring.width_m, kinds::length.dimension)),
            "radius is that of the centre line; a full disc is 'disc'");
    }
    return unless_faulty<Shape>(ring, before, fields.context());
}

std::optional<Shape> read_rectangle(Fields fields) {
    const std::size_t before = fields.context().faults.count();
    Rectangle rectangle;
    rectangle.centre = fields.need_point2("center").value_or(Vec2{0, 0});
    if (const toml::node* node = fields.need("size", "[16, 1.2]")) {
        const auto size = fields.context().coordinates(*node, fields.named("size"), ranges::positive_length);
        if (size.size() == 2) rectangle.size = {size[0], size[1]};
        if (size.size() == 3)
            fields.context().faults.add(position_of(*node),
                                        fmt::format("{} has three entries, not two", fields.named("size")));
    }
    rectangle.rotation_rad = fields.number("rotation", kinds::angle, ranges::any, 0);
    return unless_faulty<Shape>(rectangle, before, fields.context());
}

std::optional<Shape> read_disc(Fields fields) {
    const std::size_t before = fields.context().faults.count();
    Disc disc;
    disc.centre = fields.need_point2("center").value_or(Vec2{0, 0});
    disc.radius_m = fields.need("radius", kinds::length, ranges::positive_length);
    return unless_faulty<Shape>(disc, before, fields.context());
}

std::optional<Shape> read_sector(Fields fields) {
    const std::size_t before = fields.context().faults.count();
    Sector sector;
    sector.centre = fields.need_point2("center").value_or(Vec2{0, 0});
    sector.inner_radius_m = fields.number("inner_radius", kinds::length, ranges::not_negative_length, 0);
    sector.outer_radius_m = fields.need("outer_radius", kinds::length, ranges::positive_length);
    sector.start_rad = fields.number("start", kinds::angle, ranges::any, 0);
    sector.sweep_rad = fields.need("sweep", kinds::angle, full_turn);
    if (sector.inner_radius_m >= sector.outer_radius_m) {
        fields.context().faults.add(
            fields.where("inner_radius"),
            fmt::format("{} must be less than the outer radius, {}, but is {}", fields.named("inner_radius"),
                        to_text(sector.outer_radius_m, kinds::length.dimension),
                        to_text(sector.inner_radius_m, kinds::length.dimension)));
    }
    return unless_faulty<Shape>(sector, before, fields.context());
}

std::vector<Vec2> read_corners(const toml::array& list, const std::string& what, Context& context) {
    std::vector<Vec2> corners;
    for (std::size_t i = 0; i < list.size(); ++i) {
        const auto corner = context.point2(list[i], fmt::format("corner {} of the {}", i + 1, what));
        if (!corner) continue;
        const bool last_is_first =
            !corners.empty() && i + 1 == list.size() && (*corner - corners.front()).norm() < tiny_m;
        if (last_is_first) continue;
        if (!corners.empty() && (*corner - corners.back()).norm() < tiny_m) {
            context.faults.add(
                position_of(list[i]),
                fmt::format("corners {} and {} of the {} coincide at {}", i, i + 1, what, place(*corner)),
                "leave one of them out");
        }
        corners.push_back(*corner);
    }
    return corners;
}

std::optional<Shape> read_polygon(const toml::node& node, const std::string& what, Context& context) {
    const std::size_t before = context.faults.count();
    const toml::array* list = node.as_array();
    if (const toml::table* table = node.as_table())
        list = Fields(*table, "the " + what, context, {"points"}).need_list("points", "[[0, 0], [10, 0], [0, 10]]");
    if (list == nullptr) {
        if (!node.is_table())
            context.faults.add(position_of(node), fmt::format("the {} must be a list of points", what),
                               "write it as { points = [[0, 0], [10, 0], [0, 10]] }");
        return std::nullopt;
    }
    if (list->size() > longest_list) {
        context.faults.add(position_of(*list),
                           fmt::format("the {} has {} corners, more than {}", what, list->size(), longest_list));
        return std::nullopt;
    }
    const Polygon polygon{read_corners(*list, what, context)};
    if (context.faults.count() != before) return std::nullopt;
    if (polygon.corners.size() < 3) {
        context.faults.add(position_of(*list),
                           fmt::format("the {} has {} corners, fewer than 3", what, polygon.corners.size()));
    } else if (const auto edges = first_crossing(polygon.corners, true)) {
        context.faults.add(
            position_of(*list),
            fmt::format("the outline of the {} crosses or touches itself: the edges from {} and from {}", what,
                        place(polygon.corners[edges->first]), place(polygon.corners[edges->second])),
            "list the corners in order around the figure; holes are separate cuts");
    } else if (enclosed_area_m2(polygon.corners) < tiny_m * tiny_m) {
        context.faults.add(position_of(*list), fmt::format("the {} encloses no area", what));
    }
    return unless_faulty<Shape>(polygon, before, context);
}

}  // namespace

std::optional<Shape> read_shape(Fields& fields) {
    const std::string kind = fields.exactly_one(shape_keys, "shape");
    if (kind.empty()) return std::nullopt;
    Context& context = fields.context();
    const std::string what = kind + " of " + fields.what();
    if (kind == "polygon") return read_polygon(*fields.get(kind), what, context);
    const toml::table* table = fields.table(kind);
    if (table == nullptr) return std::nullopt;
    if (kind == "ring") return read_ring({*table, "the " + what, context, {"center", "radius", "width"}});
    if (kind == "rectangle") return read_rectangle({*table, "the " + what, context, {"center", "size", "rotation"}});
    if (kind == "disc") return read_disc({*table, "the " + what, context, {"center", "radius"}});
    if (kind == "sector") {
        return read_sector(
            {*table, "the " + what, context, {"center", "inner_radius", "outer_radius", "start", "sweep"}});
    }
    const auto path = read_path(*table, what, context);
    return path ? std::optional<Shape>(*path) : std::nullopt;
}

std::optional<Shape> read_shape_table(const toml::node& node, const std::string& what, Context& context) {
    const toml::table* table = node.as_table();
    if (table == nullptr) {
        context.faults.add(position_of(node), fmt::format("{} must be a table with a shape", what),
                           "write { disc = { center = [0, 0], radius = 5 } }");
        return std::nullopt;
    }
    Fields fields(*table, what, context, shape_keys);
    return read_shape(fields);
}

}  // namespace annulet
