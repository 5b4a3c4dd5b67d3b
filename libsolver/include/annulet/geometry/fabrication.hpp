// Places of a layout that a workshop's rules forbid: slots and webs too narrow, inner corners too tight for a bit.
#pragma once

#include <annulet/geometry/boolean.hpp>

#include <vector>

namespace annulet {

/// Findings closer in width to the rule than this are let pass: the width is known no better (m).
inline constexpr double rule_tolerance_m = 2e-6;

struct RuleFinding {
    enum class Kind { slot, web, inner_corner };
    Kind kind = Kind::slot;
    Vec2 at{0, 0};          ///< where it is narrowest, or the corner
    double measured_m = 0;  ///< width, or radius of the corner
    double rule_m = 0;
    Loop place;  ///< outline of the forbidden stretch, for marking
};

/// Stretches of the region itself narrower than `minimum_m`: what an opening by a disc of that diameter takes away,
/// between edges that face each other.
std::vector<RuleFinding> narrow_webs(const Loops2& region, double minimum_m);
/// The same between parts of the region.
std::vector<RuleFinding> narrow_slots(const Loops2& region, double minimum_m);
/// Corners of what is milled away around and in the region that a bit of this radius cannot reach.
std::vector<RuleFinding> tight_corners(const Loops2& region, double tool_radius_m);

}  // namespace annulet
