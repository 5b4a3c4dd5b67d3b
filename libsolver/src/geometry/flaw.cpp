// Faults that a shape has by itself, whatever lies around it.
#include <fmt/format.h>

#include <annulet/core/constants.hpp>
#include <annulet/geometry/ribbon.hpp>
#include <cmath>

namespace annulet {

namespace {

constexpr double sharpest_turn_cosine = -0.94;  // 160 degrees: the mitre is then 5.8 half widths long

std::string mm(double metres) {
    return fmt::format("{:.4g} mm", metres * 1e3);
}

bool positive(double value) {
    return std::isfinite(value) && value > 0;
}

std::string flaw_of(const Ring& ring) {
    if (!ring.centre.allFinite()) return "has a centre that is not a finite number";
    if (!positive(ring.radius_m)) return "has a radius of " + mm(ring.radius_m) + ", which is not positive";
    if (!positive(ring.width_m)) return "has a width of " + mm(ring.width_m) + ", which is not positive";
    if (ring.width_m >= 2 * ring.radius_m)
        return fmt::format("has no opening: its width of {} is not below twice its radius of {}", mm(ring.width_m),
                           mm(ring.radius_m));
    return {};
}

std::string flaw_of_piece(const CurvePiece& piece, const Vec2& from, std::size_t number, double width_m) {
    if (!piece.end.allFinite() || !piece.centre.allFinite() || !std::isfinite(piece.sweep_rad))
        return fmt::format("has a number that is not finite in piece {} of its path", number);
    const double radius = (from - piece.centre).norm();
    const double length = piece.is_arc ? radius * std::abs(piece.sweep_rad) : (piece.end - from).norm();
    if (length < 1e-9) return fmt::format("has no length in piece {} of its path", number);
    if (!piece.is_arc) return {};
    if (radius <= 0.5 * width_m)
        return fmt::format("curls over itself: the radius of {} of piece {} is not above half its width of {}",
                           mm(radius), number, mm(width_m));
    if (std::abs(piece.sweep_rad) > 2 * constants::pi * (1 + 1e-9))
        return fmt::format("curls over itself: piece {} of its path turns by more than a full circle", number);
    if (std::abs((piece.end - piece.centre).norm() - radius) > 1e-6 * radius)
        return fmt::format("has an arc in piece {} of its path whose ends are at different distances from its centre",
                           number);
    return {};
}

std::string flaw_of_corner(const Curve::Piece& before, const Curve::Piece& after) {
    if (piece_tangent(before, 1).dot(piece_tangent(after, 0)) > sharpest_turn_cosine) return {};
    return fmt::format("folds back on itself at ({:.4g}, {:.4g}) mm", after.from.x() * 1e3, after.from.y() * 1e3);
}

// Both edges must run forward between the mitres at the two ends of every piece.
std::string flaw_of_edges(const Ribbon& ribbon) {
    const auto& pieces = ribbon.centre().pieces();
    for (std::size_t k = 0; k < pieces.size(); ++k) {
        const Curve::Piece& piece = pieces[k];
        for (const double tau : {-1.0, 1.0}) {
            const Ribbon::Sample from = ribbon.sample_on(k, 0, tau);
            const Ribbon::Sample to = ribbon.sample_on(k, 1, tau);
            const bool forward = piece.is_arc ? (to.angle_rad - from.angle_rad) * piece.sweep_rad > 0
                                              : (to.point - from.point).dot(piece.to - piece.from) > 0;
            if (!forward)
                return fmt::format("curls over itself: piece {} of its path, {} long, is too short for its width",
                                   k + 1, mm(piece.length_m));
        }
    }
    return {};
}

std::string flaw_of(const StripPath& path) {
    if (path.pieces.empty()) return "has an empty path";
    if (!path.start.allFinite()) return "has a start that is not a finite number";
    for (const double width : {path.width_start_m, path.width_end_m})
        if (!positive(width)) return "has a width of " + mm(width) + ", which is not positive";
    const double widest = std::max(path.width_start_m, path.width_end_m);
    Vec2 from = path.start;
    for (std::size_t k = 0; k < path.pieces.size(); ++k) {
        if (std::string text = flaw_of_piece(path.pieces[k], from, k + 1, widest); !text.empty()) return text;
        from = path.pieces[k].end;
    }
    if (path.closed && (from - path.start).norm() > 1e-6 * widest) return "is closed but does not end where it starts";
    if (path.closed && path.width_start_m != path.width_end_m) return "is closed but ends with another width";
    const Curve curve(path.start, path.pieces);
    const auto& pieces = curve.pieces();
    for (std::size_t k = path.closed ? 0 : 1; k < pieces.size(); ++k)
        if (std::string text = flaw_of_corner(pieces[(k + pieces.size() - 1) % pieces.size()], pieces[k]);
            !text.empty())
            return text;
    return flaw_of_edges(Ribbon(path));
}

std::string flaw_of(const Polygon& polygon) {
    if (polygon.corners.size() < 3) return "has fewer than three corners";
    for (const Vec2& corner : polygon.corners)
        if (!corner.allFinite()) return "has a corner that is not a finite number";
    return {};
}

std::string flaw_of(const Rectangle& rectangle) {
    if (!rectangle.centre.allFinite() || !std::isfinite(rectangle.rotation_rad))
        return "has a number that is not finite";
    if (!positive(rectangle.size.x()) || !positive(rectangle.size.y()))
        return fmt::format("has a size of {} by {}, which is not positive", mm(rectangle.size.x()),
                           mm(rectangle.size.y()));
    return {};
}

std::string flaw_of(const Disc& disc) {
    if (!disc.centre.allFinite()) return "has a centre that is not a finite number";
    if (!positive(disc.radius_m)) return "has a radius of " + mm(disc.radius_m) + ", which is not positive";
    return {};
}

std::string flaw_of(const Sector& sector) {
    if (!sector.centre.allFinite() || !std::isfinite(sector.start_rad) || !std::isfinite(sector.sweep_rad))
        return "has a number that is not finite";
    if (!(sector.inner_radius_m >= 0) || !positive(sector.outer_radius_m - sector.inner_radius_m))
        return fmt::format("has an inner radius of {} and an outer one of {}", mm(sector.inner_radius_m),
                           mm(sector.outer_radius_m));
    if (std::abs(sector.sweep_rad) < 1e-9) return "has no length";
    return {};
}

}  // namespace

std::string flaw(const Shape& shape) {
    return std::visit([](const auto& kind) { return flaw_of(kind); }, shape);
}

}  // namespace annulet
