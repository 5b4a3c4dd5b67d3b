// Cells on the metal: flat quadrilaterals and triangles, straight wire segments.
#pragma once

#include <annulet/core/vec3.hpp>
#include <annulet/model/model.hpp>

#include <array>
#include <cstddef>
#include <optional>
#include <string>
#include <vector>

namespace annulet {

enum class CellKind { quadrilateral, triangle, segment };

/// Quadrilaterals are convex and planar, corners in order around; a segment uses two nodes.
struct Cell {
    CellKind kind = CellKind::quadrilateral;
    std::array<int, 4> node{-1, -1, -1, -1};
    int conductor = -1;   ///< index into Mesh::conductors; -1: perfect (port and part gaps)
    double radius_m = 0;  ///< of a segment
    int corners() const { return kind == CellKind::quadrilateral ? 4 : kind == CellKind::triangle ? 3 : 2; }
};

/// A port or part gap: its cells carry the impressed field `field_per_m` (unit vector along the current
/// divided by the gap length: of a bridge from its first end to its second, of a slit from the right of its line,
/// seen along it from its first point, to the left), so that V_m = V * sum_cells integral f_m . field_per_m  (design:
/// physical gap).
struct Gap {
    std::string name;
    struct Member {
        int cell = -1;
        Vec3 field_per_m{0, 0, 0};
    };
    std::vector<Member> members;
    double length_m = 0;
};

/// A dielectric sheet cut into columns, each column into layers: bricks and prisms. Where metal lies on a face, the
/// columns under it are its own cells, so that the two share their panels.
struct SheetMesh {
    /// Plan of one column: corners counter-clockwise seen from +z, indices into `plan`.
    struct Column {
        CellKind kind = CellKind::quadrilateral;  ///< or triangle
        std::array<int, 4> node{-1, -1, -1, -1};
    };
    int laminate = -1;            ///< index into Mesh::laminates
    std::vector<double> level_m;  ///< heights of the layer interfaces from the bottom face up, layers + 1
    std::vector<Vec2> plan;
    std::vector<Column> columns;
    std::vector<int> metal_on_top;  ///< by column: the cell that covers the face exactly, or -1; empty: none
    std::vector<int> metal_on_bottom;
    int layers() const { return static_cast<int>(level_m.size()) - 1; }
};

struct Mesh {
    std::vector<Vec3> nodes;
    std::vector<Cell> cells;
    std::vector<Conductor> conductors;
    std::vector<Gap> ports;   ///< in the order of Model::ports
    std::vector<Gap> lumped;  ///< in the order of Model::lumped
    std::optional<double> ground_plane_m;
    std::vector<Laminate> laminates;  ///< as in the model
    std::vector<SheetMesh> sheets;    ///< those that enter the solution
};

/// How fine to mesh. Lengths along the current follow the wavelength at `top_frequency_hz`.
struct MeshOptions {
    double top_frequency_hz = 0;
    double cells_per_wavelength = 20;
    int cells_across = 3;              ///< over the width of a strip, graded toward its edges
    double edge_cell_fraction = 0.06;  ///< width of the edge cell for 3 across; 0: cosine spacing; < 0: uniform
    double refine = 1;                 ///< divides every length; >1 is finer (both directions)
    double memory_limit_bytes = 0;     ///< 0: no limit; else meshes whose matrix would not fit are refused
};

/// Throws InputError (ports on no metal, shorted bridges, ...) or NumericalError (too large, with the estimate).
Mesh make_mesh(const Model& model, const MeshOptions& options);

}  // namespace annulet
