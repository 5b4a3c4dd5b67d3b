// Sheets of dielectric cut into columns that share the cells of the metal on their faces.
#pragma once

#include "mesh/strip_sheet.hpp"

namespace annulet {

/// Adds Mesh::laminates and Mesh::sheets. Faults where the plan cannot be divided so that metal cells are columns.
void add_sheets(Mesh& mesh, const StripGrids& grids, MeshFaults& faults);

}  // namespace annulet
