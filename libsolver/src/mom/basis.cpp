#include <annulet/mom/basis.hpp>

#include <Eigen/Geometry>

#include <algorithm>
#include <cmath>
#include <map>
#include <utility>

#include "mom/element.hpp"
#include "mom/sheet_basis.hpp"

namespace annulet {

namespace {

std::size_t at(int i) {
    return static_cast<std::size_t>(i);
}

using Key = std::pair<int, int>;

/// Edges of planar cells by their node pair; ends of segments by (node, -1).
Key key_of(const Cell& cell, int slot) {
    const int a = cell.node[at(slot)];
    if (cell.kind == CellKind::segment) return {a, -1};
    const int b = cell.node[at((slot + 1) % cell.corners())];
    return {std::min(a, b), std::max(a, b)};
}

constexpr double on_plane_m = 1e-9;

bool grounded(const Mesh& mesh, const Key& key) {
    return mesh.ground_plane_m && key.second < 0 &&
           std::abs(mesh.nodes[at(key.first)].z() - *mesh.ground_plane_m) <= on_plane_m;
}

constexpr std::pair<int, int> ground{-1, -1};

}  // namespace

Basis make_basis(const Mesh& mesh) {
    Basis basis;
    std::map<Key, std::vector<std::pair<int, int>>> sharers;  // key -> (cell, slot row)
    int rows = 0;
    for (std::size_t c = 0; c < mesh.cells.size(); ++c) {
        basis.first_slot.push_back(rows);
        for (int slot = 0; slot < mesh.cells[c].corners(); ++slot)
            sharers[key_of(mesh.cells[c], slot)].emplace_back(static_cast<int>(c), rows++);
    }
    // In the order in which the second sharer appears: neighbours in the mesh stay neighbours in the matrix.
    std::vector<std::pair<std::pair<int, int>, std::pair<int, int>>> functions;
    for (const auto& [key, cells] : sharers) {
        // Into the ground plane every wire end carries its current by itself: it flows on in the image.
        const bool into_ground = grounded(mesh, key);
        for (std::size_t i = into_ground ? 0 : 1; i < cells.size(); ++i)
            functions.emplace_back(cells[i], into_ground ? ground : cells[0]);
    }
    std::sort(functions.begin(), functions.end());
    BasisTriplets triplets;
    for (const auto& [into, from] : functions) {
        const int n = basis.unknowns++;
        if (from == ground) {
            triplets.slots.emplace_back(into.second, n, 1.0);
            triplets.divergence.emplace_back(into.first, n, 1.0);
            continue;
        }
        triplets.slots.emplace_back(from.second, n, 1.0);
        triplets.slots.emplace_back(into.second, n, -1.0);
        triplets.divergence.emplace_back(from.first, n, 1.0);
        triplets.divergence.emplace_back(into.first, n, -1.0);
    }
    basis.metal_unknowns = basis.unknowns;
    const int charges = append_sheets(mesh, rows, basis, triplets);
    basis.slots.resize(rows, basis.unknowns);
    basis.slots.setFromTriplets(triplets.slots.begin(), triplets.slots.end());
    basis.divergence.resize(charges, basis.unknowns);
    basis.divergence.setFromTriplets(triplets.divergence.begin(), triplets.divergence.end());
    basis.polarisation_mass = polarisation_mass(mesh, basis);
    return basis;
}

Vec3 local_function(const Mesh& mesh, int cell, int slot, const Vec3& r) {
    const Cell& c = mesh.cells[at(cell)];
    if (c.kind == CellKind::segment) {
        const Vec3 a = mesh.nodes[at(c.node[0])], b = mesh.nodes[at(c.node[1])];
        const double u = (r - a).dot(b - a) / (b - a).squaredNorm();
        const Vec3 tangent = (b - a).normalized();
        return slot == 0 ? Vec3(-(1 - u) * tangent) : Vec3(u * tangent);
    }
    const PlanarElement e = planar_element(mesh, c);
    int k = 0;
    double best = -1e300;
    for (int i = 0; i < e.slots; ++i) {  // the fan triangle whose two spokes r lies between
        const Vec3 to = r - e.apex;
        const double inside = std::min((e.edge_start(i) - e.apex).cross(to).dot(e.normal),
                                       to.cross(e.edge_end(i) - e.apex).dot(e.normal));
        if (inside > best) best = inside, k = i;
    }
    return e.value(k, slot, r);
}

}  // namespace annulet
