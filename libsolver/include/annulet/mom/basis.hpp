// Div-conforming current functions on the mesh. On each cell the local functions are unit fluxes out through
// one edge (quadrilateral 4, triangle 3) or end (segment 2); a global function joins two local ones.
#pragma once

#include <annulet/mesh/mesh.hpp>

#include <Eigen/SparseCore>

#include <array>
#include <vector>

namespace annulet {

/// Rows of `slots` are local functions, rows of `divergence` elements that carry charge: the cells of the metal and,
/// after them, the faces and walls of the sheets. Columns are the unknowns: metal currents first, then the
/// polarisation fluxes of the sheets, all in ampere.
struct Basis {
    using Matrix = Eigen::SparseMatrix<double, Eigen::RowMajor>;
    int unknowns = 0;
    int metal_unknowns = 0;
    /// Of the metal: entries +-1: current leaves the first cell (+1) and enters the second (-1). Slots of element c
    /// are first_slot[c] ...; slot i of a quadrilateral or triangle is the edge node[i] -> node[i+1], of a segment
    /// the end node[i]. A layer of a sheet has one slot more, the mean upward flux.
    Matrix slots;
    std::vector<int> first_slot;
    /// Net outward current of each element that carries charge; its charge is -1/(jw) of it.
    Matrix divergence;
    /// <h_m, h_n> of the polarisation current over each sheet (1/m): the mass term is this over s eps0 (eps_r - 1).
    std::vector<Eigen::SparseMatrix<double>> polarisation_mass;
};

/// Joins cells at shared edges and wire ends at shared nodes: n cells at one edge give n-1 functions. Wire ends on the
/// ground plane are connected to it: one function each, of a single slot. In the sheets: lateral flux through every
/// edge of every layer and one vertical flux per column, solenoidal in every brick.
Basis make_basis(const Mesh& mesh);

/// Value of local function `slot` (0 ... corners-1) of a cell at point r inside it: A/m per ampere for surfaces
/// (a unit tangent times the current fraction for segments).
Vec3 local_function(const Mesh& mesh, int cell, int slot, const Vec3& r);

}  // namespace annulet
