#include <algorithm>
#include <annulet/geometry/curve.hpp>
#include <cassert>
#include <cmath>

namespace annulet {

namespace {

Curve::Piece measured(const Vec2& from, const CurvePiece& drawn, double start_m) {
    Curve::Piece piece;
    piece.start_m = start_m;
    piece.is_arc = drawn.is_arc;
    piece.from = from;
    piece.to = drawn.end;
    piece.length_m = (drawn.end - from).norm();
    if (drawn.is_arc) {
        const Vec2 arm = from - drawn.centre;
        piece.centre = drawn.centre;
        piece.radius_m = arm.norm();
        piece.start_rad = std::atan2(arm.y(), arm.x());
        piece.sweep_rad = drawn.sweep_rad;
        piece.length_m = piece.radius_m * std::abs(drawn.sweep_rad);
    }
    return piece;
}

}  // namespace

Curve::Curve(const Vec2& start, std::span<const CurvePiece> pieces) {
    assert(!pieces.empty());
    Vec2 at = start;
    for (const CurvePiece& drawn : pieces) {
        pieces_.push_back(measured(at, drawn, length_m_));
        length_m_ += pieces_.back().length_m;
        at = drawn.end;
    }
}

std::size_t Curve::piece_at(double s_m) const {
    const auto after = std::upper_bound(pieces_.begin(), pieces_.end(), s_m,
                                        [](double s, const Piece& piece) { return s < piece.start_m; });
    return after == pieces_.begin() ? 0 : static_cast<std::size_t>(after - pieces_.begin()) - 1;
}

Vec2 piece_tangent(const Curve::Piece& piece, double u) {
    if (!piece.is_arc) return (piece.to - piece.from).normalized();
    const double phi = piece.start_rad + u * piece.sweep_rad;
    return std::copysign(1.0, piece.sweep_rad) * Vec2(-std::sin(phi), std::cos(phi));
}

Vec2 Curve::point(double s_m) const {
    const Piece& piece = pieces_[piece_at(s_m)];
    const double u = std::clamp((s_m - piece.start_m) / piece.length_m, 0.0, 1.0);
    if (!piece.is_arc) return piece.from + u * (piece.to - piece.from);
    const double phi = piece.start_rad + u * piece.sweep_rad;
    return piece.centre + piece.radius_m * Vec2(std::cos(phi), std::sin(phi));
}

Vec2 Curve::tangent(double s_m) const {
    const Piece& piece = pieces_[piece_at(s_m)];
    return piece_tangent(piece, std::clamp((s_m - piece.start_m) / piece.length_m, 0.0, 1.0));
}

double Curve::curvature(double s_m) const {
    const Piece& piece = pieces_[piece_at(s_m)];
    return piece.is_arc ? std::copysign(1 / piece.radius_m, piece.sweep_rad) : 0.0;
}

}  // namespace annulet
