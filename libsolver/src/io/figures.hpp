// Figures that several results show.
#pragma once

#include <annulet/analysis/network.hpp>
#include <annulet/mesh/mesh.hpp>

namespace annulet {

struct CellCounts {
    int quadrilaterals = 0, triangles = 0, segments = 0;
    int laminate = 0;  ///< bricks and prisms of the sheets
};

CellCounts count_cells(const Mesh& mesh);

const char* kind_name(ResonanceKind kind);

}  // namespace annulet
