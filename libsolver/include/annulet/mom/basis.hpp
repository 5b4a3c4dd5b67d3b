// Div-conforming current functions on the mesh. On each cell the local functions are unit fluxes out through
// one edge (quadrilateral 4, triangle 3) or end (segment 2); a global function joins two local ones.
#pragma once

#include <annulet/mesh/mesh.hpp>

#include <Eigen/SparseCore>

#include <array>
#include <vector>

namespace annulet {

struct Basis {
    int unknowns = 0;
    /// One row per local function ("slot"), one column per unknown, entries +-1: current leaves the first cell
    /// (+1) and enters the second (-1). Slots of cell c are first_slot[c] ... first_slot[c] + corners - 1;
    /// slot i of a quadrilateral or triangle is the edge node[i] -> node[i+1], of a segment the end node[i].
    Eigen::SparseMatrix<double, Eigen::RowMajor> slots;
    std::vector<int> first_slot;
    /// Charge per unknown: cells x unknowns, entries +-1: (1/jw) D I is the charge of each cell times -1.
    /// Net outward flux of each cell per unit of each unknown.
    Eigen::SparseMatrix<double, Eigen::RowMajor> divergence;
};

/// Joins cells at shared edges and wire ends at shared nodes: n cells at one edge give n-1 functions. Wire ends on the
/// ground plane are connected to it: one function each, of a single slot.
Basis make_basis(const Mesh& mesh);

/// Value of local function `slot` (0 ... corners-1) of a cell at point r inside it: A/m per ampere for surfaces
/// (a unit tangent times the current fraction for segments).
Vec3 local_function(const Mesh& mesh, int cell, int slot, const Vec3& r);

}  // namespace annulet
