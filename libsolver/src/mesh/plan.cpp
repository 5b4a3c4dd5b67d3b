#include <algorithm>
#include <annulet/mesh/plan.hpp>
#include <cmath>

#include "mesh/sheet_outline.hpp"

namespace annulet {

std::vector<MetalPlane> metal_planes(const Model& model) {
    std::vector<MetalPlane> planes;
    for (const Metal& metal : model.metals) {
        auto plane = std::find_if(planes.begin(), planes.end(),
                                  [&](const MetalPlane& p) { return std::abs(p.plane_m - metal.plane_m) <= 1e-9; });
        if (plane == planes.end()) {
            if (metal.cut) continue;
            plane = planes.insert(planes.end(), MetalPlane{metal.plane_m, {}, {}});
        }
        const Loops2 region = region_of(metal.shape);
        plane->region = metal.cut ? without(plane->region, region) : united(plane->region, region);
        if (!metal.cut) plane->names.push_back(metal.name);
    }
    std::sort(planes.begin(), planes.end(),
              [](const MetalPlane& a, const MetalPlane& b) { return a.plane_m < b.plane_m; });
    return planes;
}

Loops2 sheet_region(const Model& model, const Laminate& laminate) {
    return sheet_outline(model, laminate).region;
}

Loop placement_outline(const Placement& placement) {
    Vec2 from(0, 0), to(0, 0);
    double width = 0;
    if (const auto* bridge = std::get_if<Bridge>(&placement))
        from = bridge->from.head<2>(), to = bridge->to.head<2>(), width = bridge->width_m;
    else if (const auto* across = std::get_if<Across>(&placement))
        from = across->from.head<2>(), to = across->to.head<2>(), width = across->gap_m;
    else
        return {};
    if ((to - from).norm() < 1e-12) return {};
    const Vec2 side = 0.5 * width * left_of((to - from).normalized());
    return {from - side, to - side, to + side, from + side};
}

}  // namespace annulet
