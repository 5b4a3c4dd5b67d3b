// Planar shapes as numbers, in metres and radians.
#pragma once

#include <annulet/core/vec3.hpp>

#include <variant>
#include <vector>

namespace annulet {

/// Annular strip; `radius_m` is that of the centre line.
struct Ring {
    Vec2 centre{0, 0};
    double radius_m = 0;
    double width_m = 0;
};

/// A piece of a centre line: straight to `end`, or an arc about `centre` by `sweep_rad` (counter-clockwise
/// positive), ending at `end`.
struct CurvePiece {
    bool is_arc = false;
    Vec2 end{0, 0};
    Vec2 centre{0, 0};
    double sweep_rad = 0;
};

/// Strip along lines and arcs; its width changes linearly with arc length from start to end.
/// Closed when the last piece ends at `start`.
struct StripPath {
    Vec2 start{0, 0};
    std::vector<CurvePiece> pieces;
    double width_start_m = 0;
    double width_end_m = 0;
    bool closed = false;
};

struct Polygon {
    std::vector<Vec2> corners;  ///< either sense of rotation, not repeated at the end
};

struct Rectangle {
    Vec2 centre{0, 0};
    Vec2 size{0, 0};
    double rotation_rad = 0;
};

struct Disc {
    Vec2 centre{0, 0};
    double radius_m = 0;
};

/// Part of an annulus (inner radius 0: of a disc) from `start_rad` over `sweep_rad`.
struct Sector {
    Vec2 centre{0, 0};
    double inner_radius_m = 0;
    double outer_radius_m = 0;
    double start_rad = 0;
    double sweep_rad = 0;
};

using Shape = std::variant<Ring, StripPath, Polygon, Rectangle, Disc, Sector>;

}  // namespace annulet
