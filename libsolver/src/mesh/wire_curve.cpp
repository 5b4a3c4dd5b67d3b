#include "mesh/wire_curve.hpp"

#include <annulet/core/constants.hpp>

#include <algorithm>
#include <cmath>
#include <variant>

namespace annulet {

namespace {

using constants::pi;

/// Unit vector of the +x side in the plane square to `axis`; of the +y side where the axis is along x.
Vec3 first_side(const Vec3& axis) {
    const Vec3 x = Vec3::UnitX() - axis.x() * axis;
    return x.norm() > 1e-6 ? x.normalized() : Vec3(Vec3::UnitY() - axis.y() * axis).normalized();
}

WireCurve::Piece turn(const Vec3& centre, const Vec3& axis, const Vec3& e1, double radius, double sweep, double rise) {
    WireCurve::Piece piece;
    piece.straight = false;
    piece.centre = centre;
    piece.axis = axis;
    piece.e1 = e1;
    piece.e2 = axis.cross(e1);
    piece.radius_m = radius;
    piece.sweep_rad = sweep;
    piece.rise_m = rise;
    piece.length_m = std::hypot(radius * sweep, rise);
    return piece;
}

double nearest_in(const WireCurve::Piece& piece, const Vec3& r) {
    if (piece.straight) {
        const Vec3 d = piece.to - piece.from;
        return piece.start_m + piece.length_m * std::clamp(d.dot(r - piece.from) / d.squaredNorm(), 0.0, 1.0);
    }
    // Best of many samples, then halved steps.
    const int samples = 16 + static_cast<int>(std::abs(piece.sweep_rad) * 8);
    double best = piece.start_m, step = piece.length_m / samples;
    const auto away = [&](double s) { return (piece.point(s) - r).squaredNorm(); };
    for (int i = 1; i <= samples; ++i)
        if (away(piece.start_m + i * step) < away(best)) best = piece.start_m + i * step;
    while (step > 1e-12 * piece.length_m) {
        for (const double s : {best - step, best + step})
            if (s >= piece.start_m && s <= piece.end_m() && away(s) < away(best)) best = s;
        step *= 0.6;
    }
    return best;
}

}  // namespace

Vec3 WireCurve::Piece::point(double s_m, double stretch) const {
    const double u = (s_m - start_m) / length_m;
    if (straight) return from + u * (to - from);
    const double angle = u * sweep_rad;
    return centre + stretch * radius_m * (std::cos(angle) * e1 + std::sin(angle) * e2) + u * rise_m * axis;
}

WireCurve::WireCurve(const Wire& wire) {
    if (const auto* path = std::get_if<WirePath>(&wire.shape)) {
        add_path(*path);
    } else if (const auto* circle = std::get_if<WireCircle>(&wire.shape)) {
        const Vec3 axis = circle->normal.normalized();
        add(turn(circle->centre, axis, first_side(axis), circle->radius_m, 2 * pi, 0));
    } else {
        const auto& helix = std::get<WireHelix>(wire.shape);
        const Vec3 axis = helix.axis.normalized();
        add(turn(helix.centre, axis, first_side(axis), helix.radius_m, 2 * pi * helix.turns,
                 helix.pitch_m * helix.turns));
    }
    if (!pieces_.empty())
        closed_ = (pieces_.front().point(0) - pieces_.back().point(length_m())).norm() <= 1e-9 + 1e-3 * wire.radius_m;
}

void WireCurve::add(Piece piece) {
    piece.start_m = length_m();
    if (piece.length_m > 0) pieces_.push_back(piece);
}

void WireCurve::add_path(const WirePath& path) {
    Vec3 at = Vec3::Zero();
    bool begun = false;
    for (const auto& next : path.pieces) {
        if (const auto* point = std::get_if<Vec3>(&next)) {
            Piece line;
            line.from = at;
            line.to = *point;
            line.length_m = (*point - at).norm();
            if (begun) add(line);
            at = *point;
            begun = true;
            continue;
        }
        const auto& arc = std::get<WireArc>(next);
        const Vec3 axis = arc.normal.normalized(), arm = at - arc.centre;
        add(turn(arc.centre, axis, arm.normalized(), arm.norm(), arc.sweep_rad, 0));
        at = pieces_.back().point(length_m());
    }
}

std::size_t WireCurve::piece_at(double s_m) const {
    std::size_t k = 0;
    while (k + 1 < pieces_.size() && s_m >= pieces_[k + 1].start_m) ++k;
    return k;
}

double WireCurve::nearest_m(const Vec3& r) const {
    double best = 0;
    for (const Piece& piece : pieces_) {
        const double s = nearest_in(piece, r);
        if ((point(s) - r).squaredNorm() < (point(best) - r).squaredNorm()) best = s;
    }
    return best;
}

}  // namespace annulet
