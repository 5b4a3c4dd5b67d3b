// Boards made by hand: a centre-fed strip dipole on the top face of a rectangular sheet.
#pragma once

#include <annulet/mesh/mesh.hpp>

namespace annulet::test {

struct StripBoard {
    double length_m = 0;
    double width_m = 0;
    double margin_m = 0;     ///< of the sheet beyond the strip, on all sides
    double thickness_m = 0;  ///< 0: no sheet
    double permittivity = 1;
    double loss_tangent = 0;
    double gap_m = 3e-3;
    int along = 8;           ///< the longest cell is this fraction of an arm
    double end_cell = 0.06;  ///< length of the cell at an open end over the width
    int across = 3;          ///< cells over the width: 3 has 6 % edge cells, else cosine spacing
    int margin_cells = 3;    ///< graded away from the metal and toward the rim
    int layers = 2;          ///< the upper half as thick as the lower for 2; halving toward the metal
};

Mesh strip_board(const StripBoard& board);

}  // namespace annulet::test
