// Quadrature tables of the local functions, laid out for vector loops over source cells ("lanes").
#pragma once

#include <array>
#include <vector>

#include "mom/elements.hpp"

namespace annulet {

/// All elements of one role and kind, or their images: every array is [ ... ][lane], lane fastest.
struct LocalTable {
    ElementRole role = ElementRole::metal;
    CellKind kind = CellKind::quadrilateral;
    int lanes = 0;
    int points = 0;  ///< per element
    int slots = 0;
    double sign = 1;               ///< -1 for images
    std::vector<int> element;      ///< of each lane
    std::vector<double> position;  ///< [point][3][lane], m
    std::vector<double> field;     ///< [slot][point][3][lane]: weight times local function
    std::vector<double> charge;    ///< [point][lane]: weight times charge density of a unit charge
    std::vector<double> radius2;   ///< [lane]: square of the wire radius, m^2 (0 for surfaces)
    /// [slot][axis]: some lane has a component that is not zero (rounding apart).
    std::array<std::array<bool, 3>, 5> active{};

    bool carries_charge() const { return role != ElementRole::layer; }

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

/// False for a panel and a layer: bound charge and polarisation current share neither potential.
inline bool interacting(const LocalTable& a, const LocalTable& b) {
    return (a.carries_charge() && b.carries_charge()) || (a.slots > 0 && b.slots > 0);
}

/// `fine`: 9, 6, 4 points on quadrilaterals, triangles, segments; else 4, 3, 2.
/// One table per role and kind present, in the order of ElementRole, then CellKind.
std::vector<LocalTable> local_tables(const std::vector<Element>& elements, bool fine);

/// The mirror image in the plane z = `plane_m`, opposite sign of current and charge.
LocalTable mirror_image(const LocalTable& table, double plane_m);

/// The chosen lanes only, in the order given.
LocalTable gather(const LocalTable& table, const std::vector<int>& lanes);

}  // namespace annulet
