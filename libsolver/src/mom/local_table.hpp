// Quadrature tables of the local functions, laid out for vector loops over source cells ("lanes").
#pragma once

#include <annulet/mesh/mesh.hpp>

#include <vector>

namespace annulet {

/// All cells of one kind, or their images: every array is [ ... ][lane], lane fastest.
struct LocalTable {
    CellKind kind = CellKind::quadrilateral;
    int lanes = 0;
    int points = 0;  ///< per cell
    int slots = 0;
    double sign = 1;               ///< -1 for images
    std::vector<int> cell;         ///< mesh cell of each lane
    std::vector<double> position;  ///< [point][3][lane], m
    std::vector<double> field;     ///< [slot][point][3][lane]: weight times local function
    std::vector<double> charge;    ///< [point][lane]: weight times charge density of a unit charge
    std::vector<double> radius2;   ///< [lane]: square of the wire radius, m^2 (0 for surfaces)
    bool level = true;             ///< no local function has a z component

    std::size_t index(int outer, int lane) const {
        return static_cast<std::size_t>(outer) * static_cast<std::size_t>(lanes) + static_cast<std::size_t>(lane);
    }
    double& position_at(int point, int axis, int lane) { return position[index(point * 3 + axis, lane)]; }
    double position_at(int point, int axis, int lane) const { return position[index(point * 3 + axis, lane)]; }
    double& field_at(int slot, int point, int axis, int lane) {
        return field[index((slot * points + point) * 3 + axis, lane)];
    }
    double field_at(int slot, int point, int axis, int lane) const {
        return field[index((slot * points + point) * 3 + axis, lane)];
    }
    double& charge_at(int point, int lane) { return charge[index(point, lane)]; }
    double charge_at(int point, int lane) const { return charge[index(point, lane)]; }
};

/// `fine`: 9, 6, 4 points on quadrilaterals, triangles, segments; else 4, 3, 2.
/// One table per kind of cell present, in the order of CellKind.
std::vector<LocalTable> local_tables(const Mesh& mesh, bool fine);

/// The mirror image in the plane z = `plane_m`, opposite sign of current and charge.
LocalTable mirror_image(const LocalTable& table, double plane_m);

/// The chosen lanes only, in the order given.
LocalTable gather(const LocalTable& table, const std::vector<int>& lanes);

}  // namespace annulet
