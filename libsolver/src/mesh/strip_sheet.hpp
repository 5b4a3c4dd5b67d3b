// Plans of sheets that carry one strip: its grid of node lines continued over the bare margins and gaps.
#pragma once

#include <annulet/mesh/mesh.hpp>

#include <optional>
#include <vector>

#include "mesh/along_grid.hpp"
#include "mesh/cross_grid.hpp"
#include "mesh/sheet_outline.hpp"

namespace annulet {

/// Columns of a sheet in plan.
struct SheetPlan {
    std::vector<Vec2> points;
    std::vector<SheetMesh::Column> columns;
};

/// What the mesh of the metal is made from.
struct StripGrids {
    const Model& model;
    const Layout& layout;
    const std::vector<CrossGrid>& across;
    const AlongGrid& along;
    const MeshOptions& options;
};

/// Growth of columns per distance from the edge of metal: bare sheet matters less the farther it is.
inline constexpr double sheet_growth = 1.0;

/// Largest column by wavelength (m).
double wave_cell_m(const MeshOptions& options);

/// Nothing where the sheet carries other metal than one ring or one straight strip, is no ring or rectangle about it,
/// or has openings that the node lines do not follow.
std::optional<SheetPlan> strip_sheet(const StripGrids& grids, const Laminate& laminate, const SheetOutline& outline);

}  // namespace annulet
