#include "model/outline.hpp"
#include "model/reading.hpp"

#include <annulet/core/constants.hpp>

#include <fmt/format.h>
#include <Eigen/Geometry>

#include <algorithm>
#include <cmath>

namespace annulet {

namespace {

constexpr double full_turn_rad = 2 * constants::pi * (1 + 1e-12);

std::string millimetres(double length_m) {
    return to_text(length_m, kinds::length.dimension);
}
std::string place(const Vec2& p) {
    return fmt::format("({:.6g}, {:.6g}) mm", p.x() * 1e3, p.y() * 1e3);
}

class PathReader {
public:
    PathReader(const toml::table& table, const std::string& what, Context& context)
        : what_(what), context_(context), fields_(table, "the " + what, context, {"points", "width", "closed"}) {}

    std::optional<StripPath> read() {
        const std::size_t before = context_.faults.count();
        read_widths();
        read_points();
        const bool close = fields_.flag("closed");
        if (context_.faults.count() != before) return std::nullopt;
        finish(close);
        if (context_.faults.count() != before) return std::nullopt;
        return path_;
    }

private:
    void read_widths() {
        const toml::node* node = fields_.need("width", "2");
        if (node == nullptr) return;
        const toml::array* pair = node->as_array();
        if (pair == nullptr) {
            path_.width_start_m = path_.width_end_m =
                context_.quantity(*node, fields_.named("width"), kinds::length, ranges::positive_length);
            return;
        }
        if (pair->size() != 2) {
            context_.faults.add(
                position_of(*node),
                fmt::format("{} must be one width or two, but has {} entries", fields_.named("width"), pair->size()),
                "write [width at the start, width at the end] for a taper");
            return;
        }
        path_.width_start_m =
            context_.quantity((*pair)[0], "first " + fields_.named("width"), kinds::length, ranges::positive_length);
        path_.width_end_m =
            context_.quantity((*pair)[1], "second " + fields_.named("width"), kinds::length, ranges::positive_length);
    }

    void read_points() {
        const toml::array* list = fields_.need_list("points", "[[0, 0], [10, 0]]");
        if (list == nullptr) return;
        if (list->size() < 2) {
            context_.faults.add(position_of(*list), fmt::format("the {} has fewer than two points", what_),
                                "a path runs from one point at least to another, or along an arc");
            return;
        }
        for (std::size_t i = 0; i < list->size(); ++i) {
            const std::string label = fmt::format("point {} of the {}", i + 1, what_);
            const toml::node& node = (*list)[i];
            if (node.is_table()) {
                if (!add_arc(node, i, label)) return;
            } else if (!add_point(node, i, label)) {
                return;
            }
        }
    }

    bool add_point(const toml::node& node, std::size_t i, const std::string& label) {
        const auto point = context_.point2(node, label);
        if (!point) return false;
        if (i == 0) {
            path_.start = *point;
        } else if ((*point - at_).norm() < tiny_m) {
            context_.faults.add(
                position_of(node),
                fmt::format("points {} and {} of the {} coincide at {}", i, i + 1, what_, place(*point)),
                "leave one of them out");
        } else {
            path_.pieces.push_back({false, *point, Vec2{0, 0}, 0});
        }
        at_ = *point;
        return true;
    }

    bool add_arc(const toml::node& node, std::size_t i, const std::string& label) {
        if (i == 0) {
            context_.faults.add(position_of(node), fmt::format("the {} begins with an arc", what_),
                                "begin with the point where the arc starts");
            return false;
        }
        const std::size_t before = context_.faults.count();
        Fields outer(*node.as_table(), label, context_, {"arc"});
        const toml::table* table =
            outer.need("arc", "{ center = [0, 0], sweep = \"90 deg\" }") == nullptr ? nullptr : outer.table("arc");
        if (table == nullptr) return false;
        Fields arc(*table, "the arc at " + label, context_, {"center", "sweep"});
        const auto centre = arc.need_point2("center");
        const double sweep = arc.need("sweep", kinds::angle, {-full_turn_rad, full_turn_rad});
        if (!centre || context_.faults.count() != before) return false;
        if (std::abs(sweep) < 1e-9) {
            context_.faults.add(arc.where("sweep"), fmt::format("{} is zero", arc.named("sweep")));
            return false;
        }
        const double radius = (at_ - *centre).norm();
        if (radius < tiny_m) {
            context_.faults.add(
                arc.where("center"),
                fmt::format("the arc at {} has its center on its starting point {}", label, place(at_)));
            return false;
        }
        check_tightness(radius, node, label);
        const bool whole = std::abs(sweep) > full_turn_rad - 1e-9;
        const Vec2 end = whole ? at_ : Vec2(*centre + Eigen::Rotation2Dd(sweep) * (at_ - *centre));
        path_.pieces.push_back({true, end, *centre, sweep});
        at_ = end;
        return true;
    }

    void check_tightness(double radius, const toml::node& node, const std::string& label) {
        const double half_width = std::max(path_.width_start_m, path_.width_end_m) / 2;
        if (!(radius <= half_width)) return;
        context_.faults.add(position_of(node),
                            fmt::format("the arc at {} has radius {}, not more than half the width {}", label,
                                        millimetres(radius), millimetres(2 * half_width)),
                            "its inner edge would cross itself; widen the arc or narrow the strip");
    }

    void finish(bool close) {
        const bool meets = (at_ - path_.start).norm() < tiny_m;
        if (close && !meets) path_.pieces.push_back({false, path_.start, Vec2{0, 0}, 0});
        path_.closed = close || meets;
        if (path_.closed) path_.pieces.back().end = path_.start;
        if (path_.closed && path_.width_start_m != path_.width_end_m) {
            context_.faults.add(fields_.where("width"), fmt::format("the closed {} cannot be tapered", what_),
                                "give one width, or leave the path open");
        }
        const auto line = centre_line(path_);
        if (const auto edges = first_crossing(line, path_.closed)) {
            context_.faults.add(fields_.where("points"),
                                fmt::format("the {} crosses, touches or folds back on itself near {}", what_,
                                            place(line[edges->second])),
                                "draw the branches as separate metal: pieces that overlap are one conductor");
        }
    }

    std::string what_;
    Context& context_;
    Fields fields_;
    StripPath path_;
    Vec2 at_{0, 0};
};

}  // namespace

std::optional<StripPath> read_path(const toml::node& node, const std::string& what, Context& context) {
    return PathReader(*node.as_table(), what, context).read();
}

}  // namespace annulet
