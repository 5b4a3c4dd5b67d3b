// Inside or outside of a planar shape, and how far from its edge at least.
#pragma once

#include <annulet/geometry/ribbon.hpp>
#include <annulet/geometry/shapes.hpp>

#include <span>
#include <vector>

namespace annulet {

using Loop = std::vector<Vec2>;  ///< corners in order, not repeated at the end

/// Bounding box with its sides along the axes.
struct Box {
    Vec2 low{0, 0};
    Vec2 high{0, 0};
};
/// Of at least one loop with at least one corner.
Box box_of(std::span<const Loop> loops);
/// True if more than `margin_m` lies between the boxes.
bool apart(const Box& a, const Box& b, double margin_m);

/// Distance of `p` to the outline (m).
double distance_to(std::span<const Loop> loops, const Vec2& p);
/// Even-odd rule.
bool inside(std::span<const Loop> loops, const Vec2& p);
/// Positive for counter-clockwise loops (m^2).
double signed_area(const Loop& loop);

/// Area (m^2) of the union of the loops by winding number not zero, in steps of `grain_m`.
double union_area(std::span<const Loop> loops, double grain_m);

/// Outline of a strip with chords of at most one degree.
std::vector<Loop> outline(const Ribbon& ribbon);

/// A shape without flaw, ready to be asked.
class Region {
public:
    explicit Region(Shape shape);
    /// Negative inside, positive outside; changes by no more than the distance between two points, so its
    /// magnitude is a lower bound of the distance to the edge.
    double level(const Vec2& p) const;
    /// Outline with chords of at most one degree.
    const std::vector<Loop>& loops() const { return loops_; }

private:
    Shape shape_;
    std::vector<Loop> loops_;
};

}  // namespace annulet
