// The layout as regions in plan: what is drawn, checked and manufactured.
#pragma once

#include <annulet/geometry/boolean.hpp>
#include <annulet/model/model.hpp>

#include <string>
#include <vector>

namespace annulet {

/// Metal of one plane after all unions and cuts in list order.
struct MetalPlane {
    double plane_m = 0;
    Loops2 region;
    std::vector<std::string> names;  ///< of the metals on it, cuts left out
};

/// In order of height. Shapes must be without flaw.
std::vector<MetalPlane> metal_planes(const Model& model);

/// A sheet without its openings.
Loops2 sheet_region(const Model& model, const Laminate& laminate);

/// Gap of a port or part in plan: the rectangle that its bridge or slit covers; empty for one on a wire.
Loop placement_outline(const Placement& placement);

}  // namespace annulet
