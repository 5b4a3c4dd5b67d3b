#include "mom/gram.hpp"

#include <annulet/numerics/quadrature.hpp>

#include <array>

#include "mom/element.hpp"

namespace annulet {

namespace {

std::size_t at(int i) {
    return static_cast<std::size_t>(i);
}

using LocalGram = Eigen::Matrix4d;

/// Hat functions on a segment: L/3 and, with opposite tangents outward, -L/6.
LocalGram segment_gram(double length) {
    LocalGram g = LocalGram::Zero();
    g(0, 0) = g(1, 1) = length / 3;
    g(0, 1) = g(1, 0) = -length / 6;
    return g;
}

/// Integral of every local function over the cell, m (segments) or dimensionless times m (surfaces).
std::array<Vec3, 4> local_integrals(const Mesh& mesh, const Cell& cell) {
    std::array<Vec3, 4> out;
    out.fill(Vec3::Zero());
    if (cell.kind == CellKind::segment) {
        const Vec3 half = (mesh.nodes[at(cell.node[1])] - mesh.nodes[at(cell.node[0])]) / 2;
        out[0] = -half;
        out[1] = half;
        return out;
    }
    const PlanarElement e = planar_element(mesh, cell);
    for (int k = 0; k < e.slots; ++k) {
        const Vec3 centre = (e.edge_start(k) + e.edge_end(k) + e.apex) / 3;
        for (int slot = 0; slot < e.slots; ++slot) out[at(slot)] += e.triangle_area(k) * e.value(k, slot, centre);
    }
    return out;
}

}  // namespace

/// Mid-edge rule on each triangle of the fan: exact for products of affine functions [Strang1973].
Eigen::Matrix4d planar_gram(const PlanarElement& e) {
    Eigen::Matrix4d g = Eigen::Matrix4d::Zero();
    for (int k = 0; k < e.slots; ++k) {
        const double w = e.triangle_area(k) / 3;
        for (const Vec3& r : {Vec3((e.edge_start(k) + e.edge_end(k)) / 2), Vec3((e.edge_end(k) + e.apex) / 2),
                              Vec3((e.apex + e.edge_start(k)) / 2)})
            for (int a = 0; a < e.slots; ++a)
                for (int b = 0; b < e.slots; ++b) g(a, b) += w * e.value(k, a, r).dot(e.value(k, b, r));
    }
    return g;
}

Eigen::Matrix4d rooftop_gram(const PlanarElement& e) {
    if (e.slots == 3) return planar_gram(e);
    const auto& p = e.corner;
    const SquareRule rule = gauss_square(3, 3);
    Eigen::Matrix4d g = Eigen::Matrix4d::Zero();
    for (Eigen::Index i = 0; i < rule.weights.size(); ++i) {
        const double u = rule.points(i, 0), v = rule.points(i, 1);
        const Vec3 r_u = (1 - v) * (p[1] - p[0]) + v * (p[2] - p[3]);
        const Vec3 r_v = (1 - u) * (p[3] - p[0]) + u * (p[2] - p[1]);
        Eigen::Matrix<double, 3, 4> f;  // times J
        f << -(1 - v) * r_v, u * r_u, v * r_v, -(1 - u) * r_u;
        g += rule.weights[i] / r_u.cross(r_v).norm() * f.transpose() * f;
    }
    return g;
}

std::vector<Eigen::SparseMatrix<double>> gram_matrices(const Mesh& mesh, const Basis& basis) {
    using Triplet = Eigen::Triplet<double>;
    const int rows = static_cast<int>(basis.slots.rows());
    std::vector<std::vector<Triplet>> local(mesh.conductors.size());
    for (std::size_t c = 0; c < mesh.cells.size(); ++c) {
        const Cell& cell = mesh.cells[c];
        if (cell.conductor < 0) continue;
        const LocalGram g = cell.kind == CellKind::segment
                                ? segment_gram((mesh.nodes[at(cell.node[1])] - mesh.nodes[at(cell.node[0])]).norm())
                                : planar_gram(planar_element(mesh, cell));
        for (int a = 0; a < cell.corners(); ++a)
            for (int b = 0; b < cell.corners(); ++b)
                local[at(cell.conductor)].emplace_back(basis.first_slot[c] + a, basis.first_slot[c] + b, g(a, b));
    }
    std::vector<Eigen::SparseMatrix<double>> out;
    for (const auto& triplets : local) {
        Eigen::SparseMatrix<double> by_slot(rows, rows);
        by_slot.setFromTriplets(triplets.begin(), triplets.end());
        const Eigen::SparseMatrix<double> s = basis.slots;
        out.emplace_back(s.transpose() * by_slot * s);
    }
    return out;
}

Eigen::MatrixXd gap_vectors(const Mesh& mesh, const Basis& basis, const std::vector<Gap>& gaps) {
    Eigen::MatrixXd out = Eigen::MatrixXd::Zero(basis.unknowns, static_cast<int>(gaps.size()));
    for (std::size_t g = 0; g < gaps.size(); ++g)
        for (const Gap::Member& member : gaps[g].members) {
            const Cell& cell = mesh.cells[at(member.cell)];
            const auto integrals = local_integrals(mesh, cell);
            for (int slot = 0; slot < cell.corners(); ++slot) {
                const int row = basis.first_slot[at(member.cell)] + slot;
                for (Eigen::SparseMatrix<double, Eigen::RowMajor>::InnerIterator i(basis.slots, row); i; ++i)
                    out(i.col(), static_cast<int>(g)) += i.value() * integrals[at(slot)].dot(member.field_per_m);
            }
        }
    return out;
}

}  // namespace annulet
