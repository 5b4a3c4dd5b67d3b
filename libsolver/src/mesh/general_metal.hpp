// Metal that is no strip by itself: which it is, and its regions and gaps in plan.
#pragma once

#include <annulet/geometry/boolean.hpp>
#include <annulet/mesh/mesh.hpp>

#include <vector>

#include "mesh/gaps.hpp"

namespace annulet {

/// Per metal of the model, true if it is to be cut into triangles: polygons and discs, strips with notches or holes,
/// metal that overlaps or touches other metal elsewhere than end to end, strips that a bridge lands on from the side,
/// and whatever touches or bridges such metal.
std::vector<bool> general_metals(const Model& model);

/// Metals on the plane that a port or part touches with its ends or crosses.
std::vector<std::size_t> metals_touched(const Model& model, const Placement& placement);

/// Gap of a port or part between or across general metal.
struct GeneralGap {
    int place = -1;
    Loops2 region;
    Vec2 direction{1, 0};  ///< of the impressed field
    double length_m = 0;
};

/// All general metal of one plane.
struct GeneralPlane {
    double plane_m = 0;
    Loops2 metal;  ///< without the gaps
    std::vector<GeneralGap> gaps;
};

/// In order of height. Metals at fault are left out.
std::vector<GeneralPlane> general_planes(const Model& model, const std::vector<bool>& general, MeshFaults& faults);

}  // namespace annulet
