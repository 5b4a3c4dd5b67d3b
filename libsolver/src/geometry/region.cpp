#include <algorithm>
#include <annulet/core/constants.hpp>
#include <annulet/geometry/region.hpp>
#include <annulet/geometry/ribbon.hpp>
#include <clipper.hpp>
#include <cmath>
#include <limits>

namespace annulet {

namespace {

using constants::pi;

constexpr double chord_rad = pi / 180;

double distance_to_segment(const Vec2& a, const Vec2& b, const Vec2& p) {
    const Vec2 along = b - a;
    const double length2 = along.squaredNorm();
    const double u = length2 > 0 ? std::clamp((p - a).dot(along) / length2, 0.0, 1.0) : 0.0;
    return (p - a - u * along).norm();
}

void add_arc(Loop& loop, const Vec2& centre, double radius_m, double start_rad, double sweep_rad) {
    const int steps = std::max(1, static_cast<int>(std::ceil(std::abs(sweep_rad) / chord_rad)));
    for (int i = 0; i <= steps; ++i) {
        const double angle = start_rad + sweep_rad * i / steps;
        loop.push_back(centre + radius_m * Vec2(std::cos(angle), std::sin(angle)));
    }
}

Loop circle(const Vec2& centre, double radius_m) {
    Loop loop;
    add_arc(loop, centre, radius_m, 0, 2 * pi);
    loop.pop_back();
    return loop;
}

std::vector<Loop> loops_of(const Ring& ring) {
    return {circle(ring.centre, ring.radius_m + ring.width_m / 2),
            circle(ring.centre, ring.radius_m - ring.width_m / 2)};
}

void add_edge(Loop& loop, const Ribbon& ribbon, double tau) {
    for (const Curve::Piece& piece : ribbon.centre().pieces()) {
        const int steps = piece.is_arc ? static_cast<int>(std::ceil(std::abs(piece.sweep_rad) / chord_rad)) : 1;
        for (int i = 0; i < steps; ++i) loop.push_back(ribbon.point(piece.start_m + piece.length_m * i / steps, tau));
    }
    if (!ribbon.closed()) loop.push_back(ribbon.point(ribbon.length_m(), tau));
}

std::vector<Loop> loops_of(const StripPath& path) {
    return outline(Ribbon(path));
}

std::vector<Loop> loops_of(const Polygon& polygon) {
    return {polygon.corners};
}

std::vector<Loop> loops_of(const Rectangle& rectangle) {
    const double c = std::cos(rectangle.rotation_rad), s = std::sin(rectangle.rotation_rad);
    const Vec2 x = 0.5 * rectangle.size.x() * Vec2(c, s), y = 0.5 * rectangle.size.y() * Vec2(-s, c);
    return {{rectangle.centre - x - y, rectangle.centre + x - y, rectangle.centre + x + y, rectangle.centre - x + y}};
}

std::vector<Loop> loops_of(const Disc& disc) {
    return {circle(disc.centre, disc.radius_m)};
}

std::vector<Loop> loops_of(const Sector& sector) {
    if (std::abs(sector.sweep_rad) > 2 * pi * (1 - 1e-9)) {
        if (sector.inner_radius_m <= 0) return {circle(sector.centre, sector.outer_radius_m)};
        return {circle(sector.centre, sector.outer_radius_m), circle(sector.centre, sector.inner_radius_m)};
    }
    Loop loop;
    add_arc(loop, sector.centre, sector.outer_radius_m, sector.start_rad, sector.sweep_rad);
    if (sector.inner_radius_m > 0)
        add_arc(loop, sector.centre, sector.inner_radius_m, sector.start_rad + sector.sweep_rad, -sector.sweep_rad);
    else
        loop.push_back(sector.centre);
    return {loop};
}

}  // namespace

std::vector<Loop> outline(const Ribbon& ribbon) {
    Loop right, left;
    add_edge(right, ribbon, -1);
    add_edge(left, ribbon, 1);
    std::reverse(left.begin(), left.end());
    if (ribbon.closed()) return {right, left};
    right.insert(right.end(), left.begin(), left.end());
    return {right};
}

Box box_of(std::span<const Loop> loops) {
    Box box{loops[0][0], loops[0][0]};
    for (const Loop& loop : loops)
        for (const Vec2& p : loop) {
            box.low = box.low.cwiseMin(p);
            box.high = box.high.cwiseMax(p);
        }
    return box;
}

bool apart(const Box& a, const Box& b, double margin_m) {
    return ((a.low - b.high).array() > margin_m).any() || ((b.low - a.high).array() > margin_m).any();
}

double distance_to(std::span<const Loop> loops, const Vec2& p) {
    double nearest = std::numeric_limits<double>::infinity();
    for (const Loop& loop : loops)
        for (std::size_t i = 0; i < loop.size(); ++i)
            nearest = std::min(nearest, distance_to_segment(loop[i], loop[(i + 1) % loop.size()], p));
    return nearest;
}

bool inside(std::span<const Loop> loops, const Vec2& p) {
    bool odd = false;
    for (const Loop& loop : loops)
        for (std::size_t i = 0, j = loop.size() - 1; i < loop.size(); j = i++) {
            const Vec2 &a = loop[i], &b = loop[j];
            if ((a.y() > p.y()) == (b.y() > p.y())) continue;
            if (p.x() < a.x() + (b.x() - a.x()) * (p.y() - a.y()) / (b.y() - a.y())) odd = !odd;
        }
    return odd;
}

double signed_area(const Loop& loop) {
    double twice = 0;
    for (std::size_t i = 0, j = loop.size() - 1; i < loop.size(); j = i++) twice += cross(loop[j], loop[i]);
    return 0.5 * twice;
}

double union_area(std::span<const Loop> loops, double grain_m) {
    ClipperLib::Paths paths;
    for (const Loop& loop : loops) {
        ClipperLib::Path path;
        for (const Vec2& p : loop) path.emplace_back(std::llround(p.x() / grain_m), std::llround(p.y() / grain_m));
        paths.push_back(std::move(path));
    }
    ClipperLib::Clipper clipper;
    clipper.AddPaths(paths, ClipperLib::ptSubject, true);
    ClipperLib::Paths joined;
    clipper.Execute(ClipperLib::ctUnion, joined, ClipperLib::pftNonZero, ClipperLib::pftNonZero);
    double area = 0;
    for (const ClipperLib::Path& path : joined) area += ClipperLib::Area(path);
    return area * grain_m * grain_m;
}

Region::Region(Shape shape)
    : shape_(std::move(shape)), loops_(std::visit([](const auto& kind) { return loops_of(kind); }, shape_)) {}

double Region::level(const Vec2& p) const {
    if (const auto* ring = std::get_if<Ring>(&shape_))
        return std::abs((p - ring->centre).norm() - ring->radius_m) - ring->width_m / 2;
    if (const auto* disc = std::get_if<Disc>(&shape_)) return (p - disc->centre).norm() - disc->radius_m;
    if (const auto* rectangle = std::get_if<Rectangle>(&shape_)) {
        const double c = std::cos(rectangle->rotation_rad), s = std::sin(rectangle->rotation_rad);
        const Vec2 d = p - rectangle->centre;
        return std::max(std::abs(c * d.x() + s * d.y()) - rectangle->size.x() / 2,
                        std::abs(c * d.y() - s * d.x()) - rectangle->size.y() / 2);
    }
    const double distance = distance_to(loops_, p);
    return inside(loops_, p) ? -distance : distance;
}

}  // namespace annulet
