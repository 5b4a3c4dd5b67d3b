// Everything that carries current or charge: cells of the metal, faces and walls of the sheets (bound charge),
// layers of the sheets (polarisation current on their mid-planes).
#pragma once

#include <annulet/mesh/mesh.hpp>

#include <array>
#include <vector>

namespace annulet {

enum class ElementRole {
    metal,  ///< current and charge of a mesh cell
    panel,  ///< bound charge on a face or wall of a sheet
    layer,  ///< polarisation current of one layer of one column, lumped on its mid-plane
};

struct Element {
    ElementRole role = ElementRole::metal;
    CellKind kind = CellKind::quadrilateral;
    std::array<Vec3, 4> corner;
    double radius_m = 0;     ///< of a wire segment
    double thickness_m = 0;  ///< of a layer

    int corners() const { return kind == CellKind::quadrilateral ? 4 : kind == CellKind::triangle ? 3 : 2; }
    bool carries_charge() const { return role != ElementRole::layer; }
    /// Local functions: one per edge or end; a layer has one more, the mean vertical flux; a panel none.
    int slots() const { return role == ElementRole::panel ? 0 : corners() + (role == ElementRole::layer ? 1 : 0); }
};

/// Metal cells first (element index = cell index), then panels, then layers, in the order of Mesh::sheets.
std::vector<Element> make_elements(const Mesh& mesh);

/// Where the parts of one sheet stand among the elements. A face covered by metal has that cell's index.
struct SheetElements {
    std::vector<int> top, bottom;         ///< by column: element that takes the charge of the face
    std::vector<std::vector<int>> wall;   ///< by boundary edge of the sheet, by layer
    std::vector<std::vector<int>> layer;  ///< by column, by layer (from the bottom)
};

/// An edge of a sheet's plan: cells on either side (second -1 on the outline) with their local edge numbers.
struct SheetEdge {
    int column[2] = {-1, -1};
    int slot[2] = {-1, -1};
};
std::vector<SheetEdge> sheet_edges(const SheetMesh& sheet);

/// In the same order as `make_elements` counts them; `wall` is indexed by the position of the edge in `sheet_edges`
/// (empty for inner edges).
std::vector<SheetElements> sheet_elements(const Mesh& mesh);

}  // namespace annulet
