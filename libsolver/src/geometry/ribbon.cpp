#include <annulet/core/constants.hpp>
#include <annulet/geometry/ribbon.hpp>
#include <array>
#include <cmath>

namespace annulet {

namespace {

using constants::pi;

Vec2 on_circle(const Vec2& centre, double radius_m, double angle_rad) {
    return centre + radius_m * Vec2(std::cos(angle_rad), std::sin(angle_rad));
}

Curve circle(const Ring& ring) {
    const Vec2 start = ring.centre + Vec2(ring.radius_m, 0);
    const std::array<CurvePiece, 1> piece{CurvePiece{true, start, ring.centre, 2 * pi}};
    return Curve(start, piece);
}

StripPath path_of(const Rectangle& rectangle) {
    const bool along_x = rectangle.size.x() >= rectangle.size.y();
    const double angle = rectangle.rotation_rad + (along_x ? 0 : pi / 2);
    const Vec2 half = 0.5 * rectangle.size.maxCoeff() * Vec2(std::cos(angle), std::sin(angle));
    StripPath path;
    path.start = rectangle.centre - half;
    path.pieces = {CurvePiece{false, rectangle.centre + half, {0, 0}, 0}};
    path.width_start_m = path.width_end_m = rectangle.size.minCoeff();
    return path;
}

Ribbon ribbon_of_sector(const Sector& sector) {
    const double radius = 0.5 * (sector.inner_radius_m + sector.outer_radius_m);
    const double width = sector.outer_radius_m - sector.inner_radius_m;
    if (std::abs(sector.sweep_rad) > 2 * pi * (1 - 1e-9)) return Ribbon(Ring{sector.centre, radius, width});
    StripPath path;
    path.start = on_circle(sector.centre, radius, sector.start_rad);
    path.pieces = {CurvePiece{true, on_circle(sector.centre, radius, sector.start_rad + sector.sweep_rad),
                              sector.centre, sector.sweep_rad}};
    path.width_start_m = path.width_end_m = width;
    return Ribbon(path);
}

}  // namespace

Ribbon::Ribbon(const Ring& ring)
    : centre_(circle(ring)), width_start_m_(ring.width_m), width_end_m_(ring.width_m), closed_(true), has_seam_(false) {
    set_mitres();
}

Ribbon::Ribbon(const StripPath& path)
    : centre_(path.start, path.pieces),
      width_start_m_(path.width_start_m),
      width_end_m_(path.width_end_m),
      closed_(path.closed) {
    set_mitres();
}

void Ribbon::set_mitres() {
    const auto& pieces = centre_.pieces();
    const std::size_t n = pieces.size();
    for (std::size_t joint = 0; joint <= n; ++joint) {
        const bool open_start = joint == 0 && !closed_, open_end = joint == n && !closed_;
        const Vec2 after = open_end ? piece_tangent(pieces[n - 1], 1) : piece_tangent(pieces[joint % n], 0);
        const Vec2 before = open_start ? after : piece_tangent(pieces[(joint + n - 1) % n], 1);
        // The bisector of the corner, long enough to meet both edges.
        mitre_.push_back(left_of(before + after) / (1 + before.dot(after)));
        kinked_.push_back(std::abs(cross(before, after)) > 1e-6);
    }
}

double Ribbon::width_m(double s_m) const {
    const double u = std::clamp(s_m / length_m(), 0.0, 1.0);
    return width_start_m_ + u * (width_end_m_ - width_start_m_);
}

Vec2 Ribbon::joint_point(std::size_t joint, double tau) const {
    const auto& pieces = centre_.pieces();
    const bool last = joint == pieces.size();
    const Curve::Piece& piece = pieces[last ? joint - 1 : joint];
    const double s = last ? length_m() : piece.start_m;
    return (last ? piece.to : piece.from) + 0.5 * tau * width_m(s) * mitre_[joint];
}

Ribbon::Polar Ribbon::arc_end(std::size_t index, bool at_end, double tau) const {
    const Curve::Piece& piece = centre_.pieces()[index];
    const std::size_t joint = index + (at_end ? 1 : 0);
    const double turn = std::copysign(1.0, piece.sweep_rad);
    const double angle = piece.start_rad + (at_end ? piece.sweep_rad : 0);
    const double s = piece.start_m + (at_end ? piece.length_m : 0);
    if (!kinked_[joint]) return {angle, piece.radius_m - turn * 0.5 * tau * width_m(s)};
    const Vec2 arm = joint_point(joint, tau) - piece.centre;
    const Vec2 radial(std::cos(angle), std::sin(angle));
    return {angle + std::atan2(cross(radial, arm), radial.dot(arm)), arm.norm()};
}

Ribbon::Sample Ribbon::sample(double s_m, double tau) const {
    const double s = closed_ ? s_m - length_m() * std::floor(s_m / length_m()) : s_m;
    const std::size_t index = centre_.piece_at(s);
    const Curve::Piece& piece = centre_.pieces()[index];
    return sample_on(index, std::clamp((s - piece.start_m) / piece.length_m, 0.0, 1.0), tau);
}

Ribbon::Sample Ribbon::sample_on(std::size_t index, double u, double tau) const {
    const Curve::Piece& piece = centre_.pieces()[index];
    Sample at;
    at.on_arc = piece.is_arc;
    if (!piece.is_arc) {
        at.point = (1 - u) * joint_point(index, tau) + u * joint_point(index + 1, tau);
        return at;
    }
    const Polar from = arc_end(index, false, tau), to = arc_end(index, true, tau);
    at.centre = piece.centre;
    at.angle_rad = from.angle_rad + u * (to.angle_rad - from.angle_rad);
    at.radius_m = from.radius_m + u * (to.radius_m - from.radius_m);
    at.point = on_circle(at.centre, at.radius_m, at.angle_rad);
    return at;
}

double Ribbon::speed(std::size_t index, double tau) const {
    const Curve::Piece& piece = centre_.pieces()[index];
    if (!piece.is_arc) return (joint_point(index + 1, tau) - joint_point(index, tau)).norm() / piece.length_m;
    const Polar from = arc_end(index, false, tau), to = arc_end(index, true, tau);
    const double around = std::max(from.radius_m, to.radius_m) * std::abs(to.angle_rad - from.angle_rad);
    return (around + std::abs(to.radius_m - from.radius_m)) / piece.length_m;
}

std::optional<Ribbon> ribbon_of(const Shape& shape) {
    if (const auto* ring = std::get_if<Ring>(&shape)) return Ribbon(*ring);
    if (const auto* path = std::get_if<StripPath>(&shape)) return Ribbon(*path);
    if (const auto* rectangle = std::get_if<Rectangle>(&shape)) return Ribbon(path_of(*rectangle));
    if (const auto* sector = std::get_if<Sector>(&shape); sector != nullptr && sector->inner_radius_m > 0)
        return ribbon_of_sector(*sector);
    return std::nullopt;
}

}  // namespace annulet
