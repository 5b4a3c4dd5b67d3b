// Sheets of dielectric in plan, and where their edges cross the metal on their faces.
#pragma once

#include <annulet/geometry/boolean.hpp>
#include <annulet/model/model.hpp>

#include <optional>
#include <vector>

#include "mesh/gaps.hpp"

namespace annulet {

/// A sheet in plan.
struct SheetOutline {
    std::optional<Shape> shape;  ///< of the outline, where it is one of ours
    Loops2 outer;                ///< the outline
    Loops2 region;               ///< the outline without the openings
};
SheetOutline sheet_outline(const Model& model, const Laminate& laminate);

/// True if a plane of metal is a face of the sheet.
bool on_top(const Laminate& laminate, double plane_m);
bool on_bottom(const Laminate& laminate, double plane_m);

/// Heights of the layer interfaces from the bottom face up: the layer next to metal is half as thick as the next.
std::vector<double> layer_levels(const Laminate& laminate, int layers, bool metal_on_top, bool metal_on_bottom);

/// Fronts where an outline or opening crosses a strip on the sheet's face from edge to edge, and node lines that
/// correspond over the gaps of a strip that a sheet carries. Faults where an edge enters a strip otherwise.
void place_sheet_edges(const Model& model, Layout& layout, MeshFaults& faults);

}  // namespace annulet
