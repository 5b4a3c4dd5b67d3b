#include "model/outline.hpp"

#include <annulet/core/constants.hpp>

#include <Eigen/Geometry>
#include <algorithm>
#include <clipper.hpp>
#include <cmath>
#include <numeric>

namespace annulet {

namespace {

using ClipperLib::Paths;
using constants::pi;

constexpr double grid_per_m = 1e10;  // of the integer coordinates of Clipper: 0.1 nm, up to 1e8 m

double cross(const Vec2& a, const Vec2& b) {
    return a.x() * b.y() - a.y() * b.x();
}

// On which side of the line a-b lies p: 0 when nearer to it than `tiny_m`.
int side(const Vec2& a, const Vec2& b, const Vec2& p) {
    const Vec2 edge = b - a;
    const double area = cross(edge, p - a);
    const double nothing = tiny_m * edge.norm();
    return area > nothing ? 1 : area < -nothing ? -1 : 0;
}

bool between(const Vec2& a, const Vec2& b, const Vec2& p) {
    return (p - a).dot(b - a) >= -tiny_m * tiny_m && (p - b).dot(a - b) >= -tiny_m * tiny_m;
}

bool meet(const Vec2& a, const Vec2& b, const Vec2& c, const Vec2& d) {
    if (std::min(a.y(), b.y()) > std::max(c.y(), d.y()) + tiny_m) return false;
    if (std::min(c.y(), d.y()) > std::max(a.y(), b.y()) + tiny_m) return false;
    const int ac = side(a, b, c), ad = side(a, b, d), ca = side(c, d, a), cb = side(c, d, b);
    if (ac * ad < 0 && ca * cb < 0) return true;
    return (ac == 0 && between(a, b, c)) || (ad == 0 && between(a, b, d)) || (ca == 0 && between(c, d, a)) ||
           (cb == 0 && between(c, d, b));
}

// Edges in a common corner `b` lie on each other when they run back.
bool folds(const Vec2& a, const Vec2& b, const Vec2& c) {
    return side(a, b, c) == 0 && (a - b).dot(c - b) > 0;
}

void append_arc(std::vector<Vec2>& points, const Vec2& centre, const Vec2& start, double sweep, double step) {
    const Vec2 arm = start - centre;  // before `points` moves: `start` may lie in it
    const int chords = std::max(1, static_cast<int>(std::ceil(std::abs(sweep) / step)));
    for (int i = 1; i <= chords; ++i) {
        points.push_back(centre + Eigen::Rotation2Dd(sweep * i / chords) * arm);
    }
}

std::vector<Vec2> circle(const Vec2& centre, double radius) {
    std::vector<Vec2> points;
    append_arc(points, centre, centre + Vec2{radius, 0}, 2 * pi, pi / 90);
    return points;
}

Paths to_clipper(const Loops& loops) {
    Paths paths;
    for (const auto& loop : loops) {
        ClipperLib::Path path;
        for (const Vec2& p : loop)
            path.emplace_back(std::llround(p.x() * grid_per_m), std::llround(p.y() * grid_per_m));
        paths.push_back(std::move(path));
    }
    return paths;
}

Loops from_clipper(const Paths& paths) {
    Loops loops;
    for (const auto& path : paths) {
        auto& loop = loops.emplace_back();
        for (const auto& p : path) {
            loop.emplace_back(static_cast<double>(p.X) / grid_per_m, static_cast<double>(p.Y) / grid_per_m);
        }
    }
    return loops;
}

Paths combine(const Paths& a, const Paths& b, ClipperLib::ClipType type) {
    ClipperLib::Clipper clipper;
    clipper.AddPaths(a, ClipperLib::ptSubject, true);
    clipper.AddPaths(b, ClipperLib::ptClip, true);
    Paths result;
    clipper.Execute(type, result, ClipperLib::pftEvenOdd, ClipperLib::pftEvenOdd);
    return result;
}

Loops loops_of(const Ring& ring) {
    return {circle(ring.centre, ring.radius_m + ring.width_m / 2),
            circle(ring.centre, ring.radius_m - ring.width_m / 2)};
}

Loops loops_of(const StripPath& path) {
    const double width = std::max(path.width_start_m, path.width_end_m);
    ClipperLib::ClipperOffset offset(2.0, 1e-6 * grid_per_m);
    offset.AddPaths(to_clipper({centre_line(path)}), ClipperLib::jtMiter,
                    path.closed ? ClipperLib::etClosedLine : ClipperLib::etOpenButt);
    Paths result;
    offset.Execute(result, width / 2 * grid_per_m);
    return from_clipper(result);
}

Loops loops_of(const Polygon& polygon) {
    return {polygon.corners};
}

Loops loops_of(const Rectangle& rectangle) {
    const Eigen::Rotation2Dd turn(rectangle.rotation_rad);
    std::vector<Vec2> corners;
    for (const Vec2& sign : {Vec2{-1, -1}, Vec2{1, -1}, Vec2{1, 1}, Vec2{-1, 1}}) {
        corners.push_back(rectangle.centre + turn * Vec2(sign.cwiseProduct(rectangle.size) / 2));
    }
    return {corners};
}

Loops loops_of(const Disc& disc) {
    return {circle(disc.centre, disc.radius_m)};
}

Loops loops_of(const Sector& sector) {
    const Vec2 direction{std::cos(sector.start_rad), std::sin(sector.start_rad)};
    std::vector<Vec2> points{sector.centre + sector.outer_radius_m * direction};
    append_arc(points, sector.centre, points.front(), sector.sweep_rad, pi / 90);
    const Vec2 end = (points.back() - sector.centre) / sector.outer_radius_m;
    points.push_back(sector.centre + sector.inner_radius_m * end);
    if (sector.inner_radius_m > 0) append_arc(points, sector.centre, Vec2(points.back()), -sector.sweep_rad, pi / 90);
    return {points};
}

}  // namespace

std::vector<Vec2> centre_line(const StripPath& path) {
    std::vector<Vec2> points{path.start};
    for (const CurvePiece& piece : path.pieces) {
        if (piece.is_arc) {
            append_arc(points, piece.centre, Vec2(points.back()), piece.sweep_rad, pi / 36);
            points.back() = piece.end;
        } else {
            points.push_back(piece.end);
        }
    }
    if (path.closed && (points.back() - points.front()).norm() < tiny_m) points.pop_back();
    return points;
}

std::optional<std::pair<std::size_t, std::size_t>> first_crossing(std::span<const Vec2> points, bool closed) {
    const std::size_t n = points.size(), edges = closed ? n : n - 1;
    const auto end = [&](std::size_t i) { return points[(i + 1) % n]; };
    const auto left = [&](std::size_t i) { return std::min(points[i].x(), end(i).x()); };
    const auto right = [&](std::size_t i) { return std::max(points[i].x(), end(i).x()); };
    std::vector<std::size_t> order(edges);
    std::iota(order.begin(), order.end(), 0U);
    std::sort(order.begin(), order.end(), [&](std::size_t i, std::size_t j) { return left(i) < left(j); });
    std::optional<std::pair<std::size_t, std::size_t>> found;
    for (std::size_t a = 0; a < edges; ++a) {
        for (std::size_t b = a + 1; b < edges && left(order[b]) <= right(order[a]) + tiny_m; ++b) {
            const auto [i, j] = std::minmax(order[a], order[b]);
            const bool next = j == i + 1, wraps = closed && i == 0 && j == n - 1;
            const bool crosses = (next && folds(points[i], end(i), end(j))) ||
                                 (wraps && folds(points[j], points[i], end(i))) ||
                                 (!next && !wraps && meet(points[i], end(i), points[j], end(j)));
            if (crosses && (!found || std::pair(i, j) < *found)) found = {i, j};
        }
    }
    return found;
}

double enclosed_area_m2(std::span<const Vec2> corners) {
    double twice = 0;
    for (std::size_t i = 0; i < corners.size(); ++i) twice += cross(corners[i], corners[(i + 1) % corners.size()]);
    return std::abs(twice) / 2;
}

Loops outline_loops(const Shape& shape) {
    return std::visit([](const auto& kind) { return loops_of(kind); }, shape);
}

Loops grown(const Loops& loops, double margin_m) {
    ClipperLib::ClipperOffset offset(2.0, 1e-5 * grid_per_m);
    offset.AddPaths(combine(to_clipper(loops), {}, ClipperLib::ctUnion), ClipperLib::jtMiter,
                    ClipperLib::etClosedPolygon);
    Paths result;
    offset.Execute(result, margin_m * grid_per_m);
    return from_clipper(result);
}

double common_area_m2(const Loops& a, const Loops& a_holes, const Loops& b, const Loops& b_holes) {
    const Paths first = combine(to_clipper(a), to_clipper(a_holes), ClipperLib::ctDifference);
    const Paths second = combine(to_clipper(b), to_clipper(b_holes), ClipperLib::ctDifference);
    double area = 0;
    for (const auto& path : combine(first, second, ClipperLib::ctIntersection)) area += ClipperLib::Area(path);
    return std::abs(area) / (grid_per_m * grid_per_m);
}

}  // namespace annulet
