// A centre line in the plane, made of straight and circular pieces and measured by its arc length.
#pragma once

#include <annulet/geometry/shapes.hpp>

#include <cstddef>
#include <span>
#include <vector>

namespace annulet {

/// `v` turned by a quarter, counter-clockwise.
inline Vec2 left_of(const Vec2& v) {
    return {-v.y(), v.x()};
}
/// z component of the cross product.
inline double cross(const Vec2& a, const Vec2& b) {
    return a.x() * b.y() - a.y() * b.x();
}

class Curve {
public:
    /// One piece in arc length; `radius_m`, angles and `centre` are those of an arc.
    struct Piece {
        double start_m = 0;
        double length_m = 0;
        bool is_arc = false;
        Vec2 from{0, 0};
        Vec2 to{0, 0};
        Vec2 centre{0, 0};
        double radius_m = 0;
        double start_rad = 0;
        double sweep_rad = 0;
    };

    /// Pieces follow one another from `start`; at least one, none of zero length.
    Curve(const Vec2& start, std::span<const CurvePiece> pieces);

    double length_m() const { return length_m_; }
    const std::vector<Piece>& pieces() const { return pieces_; }
    /// Index of the piece at arc length `s_m`, the later one at a joint; clamped to the ends.
    std::size_t piece_at(double s_m) const;
    Vec2 point(double s_m) const;
    /// Unit tangent, of the later piece at a joint.
    Vec2 tangent(double s_m) const;
    /// 1/m, positive where the curve bends to the left.
    double curvature(double s_m) const;

private:
    std::vector<Piece> pieces_;
    double length_m_ = 0;
};

/// Unit tangent of a piece at fraction `u` (0 ... 1) of its length.
Vec2 piece_tangent(const Curve::Piece& piece, double u);

}  // namespace annulet
