#include <gtest/gtest.h>
#include <omp.h>
#include <annulet/analysis/far_field.hpp>
#include <annulet/core/constants.hpp>
#include <annulet/numerics/blas_threads.hpp>
#include <annulet/sweep/sweep.hpp>

#include <Eigen/LU>

#include "support/test_meshes.hpp"

namespace annulet {
namespace {

using test::cosine_nodes;
using test::edge_nodes;

Mesh feed_ring(double width, int around, const std::vector<double>& across) {
    return test::ring_with_port(0.054, width, 2 * constants::pi * 0.054 / 60, 2, around, across);
}

/// Two rings side by side, each with its port: shifted copies in one mesh.
Mesh two_rings() {
    Mesh a = feed_ring(0.006, 28, edge_nodes(0.06));
    const Mesh b = test::ring_with_port(0.04, 0.004, 0.005, 2, 25, edge_nodes(0.06));
    const int nodes = static_cast<int>(a.nodes.size()), cells = static_cast<int>(a.cells.size());
    for (const Vec3& p : b.nodes) a.nodes.push_back(p + Vec3(0.11, 0.02, 0.005));
    for (Cell cell : b.cells) {
        for (int& n : cell.node)
            if (n >= 0) n += nodes;
        a.cells.push_back(cell);
    }
    Gap gap = b.ports[0];
    for (auto& member : gap.members) member.cell += cells;
    a.ports.push_back(gap);
    return a;
}

// Galerkin testing makes Z symmetric; what is left before symmetrising is the error of the quadrature.
TEST(Operator, SymmetricBeforeSymmetrising) {
    for (const Mesh& mesh : {feed_ring(0.008, 30, edge_nodes(0.06)), feed_ring(0.002, 40, cosine_nodes(4)),
                             test::plate(0.1, 0.07, cosine_nodes(6), cosine_nodes(5)), two_rings()}) {
        const Operator op(mesh);
        for (double f : {1e8, 2.5e9}) {
            const Eigen::MatrixXcd z = op.impedance_matrix(f, false);
            const Eigen::ArrayXXd scale =
                (z.diagonal().cwiseAbs() * z.diagonal().cwiseAbs().transpose()).cwiseSqrt().array();
            EXPECT_LT(((z - z.transpose()).cwiseAbs().array() / scale).maxCoeff(), 1e-4);
            const Eigen::MatrixXcd s = op.impedance_matrix(f);
            EXPECT_EQ((s - s.transpose()).norm(), 0);
        }
    }
}

// Reciprocity of the ports (Lorentz) on the unsymmetrised matrix, solved by LU with partial pivoting.
TEST(Operator, ReciprocalPortsWithoutSymmetrising) {
    const Operator op(two_rings());
    const Eigen::MatrixXcd v = op.port_vectors().cast<std::complex<double>>();
    for (double f : {3e8, 8.683e8, 1.7e9}) {
        const Eigen::MatrixXcd y = v.transpose() * op.impedance_matrix(f, false).partialPivLu().solve(v);
        EXPECT_LT(std::abs(y(0, 1) - y(1, 0)), 1e-4 * std::abs(y(0, 1)));
    }
}

// Poynting: the power into a lossless antenna leaves through the far sphere.
TEST(Operator, LosslessPowerBalance) {
    for (const Mesh& mesh : {feed_ring(0.008, 30, edge_nodes(0.06)), two_rings()}) {
        const Operator op(mesh);
        for (double f : {1e6, 1e8, 8.683e8, 3e9}) {
            const SweepPoint p = solve_point(op, f);
            EXPECT_NEAR(radiated_power_w(op, p.currents_a.col(0), f) / (0.5 * p.admittance_s(0, 0).real()), 1, 1e-4)
                << f;
        }
    }
}

// Loss: input power = radiated + 1/2 I^H Re(Zs) I, and the resistor's share.
TEST(Operator, LossyPowerBalance) {
    Mesh mesh = feed_ring(0.008, 30, edge_nodes(0.06));
    Conductor foil;
    foil.conductivity_s_per_m = 1e5;  // a poor conductor, so that the loss counts
    foil.thickness_m = 35e-6;
    mesh.conductors = {foil};
    for (Cell& cell : mesh.cells) cell.conductor = 0;
    const Operator op(mesh);
    const SweepPoint p = solve_point(op, 8.683e8);
    const Eigen::VectorXcd i = p.currents_a.col(0);
    const double in = 0.5 * p.admittance_s(0, 0).real();
    const double lost = 0.5 * (i.adjoint() * (op.surface_impedance_matrix(8.683e8) * i)).value().real();
    EXPECT_GT(lost, 0.02 * in);
    EXPECT_NEAR((radiated_power_w(op, i, 8.683e8) + lost) / in, 1, 1e-4);
}

// A series resistor in the gap of the port adds to its impedance exactly.
TEST(Operator, LumpedPartInPortGapAddsToImpedance) {
    Mesh mesh = feed_ring(0.008, 30, edge_nodes(0.06));
    const auto bare = 1.0 / solve_point(Operator(mesh), 7e8).admittance_s(0, 0);
    mesh.lumped = {mesh.ports[0]};
    Lumped part;
    part.resistance_ohm = 12;
    part.capacitance_f = 3e-12;
    const auto loaded = 1.0 / solve_point(Operator(mesh, {part}), 7e8).admittance_s(0, 0);
    const std::complex<double> z(12, -1 / (2 * constants::pi * 7e8 * 3e-12));
    EXPECT_LT(std::abs(loaded - bare - z), 1e-9 * std::abs(loaded));
}

// A ring over a ground plane against two rings with opposite charge and current: images, far from it and so near that
// the cells are near neighbours of their images.
void expect_explicit_image(double height) {
    Mesh half = feed_ring(0.008, 24, edge_nodes(0.06));
    for (Vec3& p : half.nodes) p.z() += height;
    Mesh both = half;
    const int nodes = static_cast<int>(half.nodes.size()), cells = static_cast<int>(half.cells.size());
    for (const Vec3& p : half.nodes) both.nodes.emplace_back(p.x(), p.y(), -p.z());
    for (Cell cell : half.cells) {
        for (int& n : cell.node) n += nodes;
        both.cells.push_back(cell);
    }
    for (const auto& member : half.ports[0].members)
        both.ports[0].members.push_back({member.cell + cells, -member.field_per_m});
    half.ground_plane_m = 0;
    for (double f : {2e8, 9e8}) {
        const auto ground = solve_point(Operator(half), f).admittance_s(0, 0);
        const auto pair = solve_point(Operator(both), f).admittance_s(0, 0);  // both gaps driven: twice the current
        EXPECT_LT(std::abs(2.0 * ground - pair), 1e-9 * std::abs(pair)) << f;
    }
}

TEST(Operator, GroundPlaneEqualsExplicitImage) {
    for (double height : {0.02, 0.003}) expect_explicit_image(height);
}

// Threads change the order of sums only: bound 100 eps cond(Z); 1e-12 with single-threaded BLAS.
TEST(Operator, SameForAnyNumberOfThreads) {
    const Mesh mesh = two_rings();
    const auto solve = [&](int threads) {
        const BlasThreads scope(threads);
        return solve_point(Operator(mesh), 9e8);
    };
    const SweepPoint one = solve(1), two = solve(2), again = solve(2);
    const double scale = one.admittance_s.norm(), bound = 100 * 2.2e-16 / one.quality.reciprocal_condition;
    EXPECT_LT((one.admittance_s - two.admittance_s).norm(), bound * scale);
    EXPECT_LT((again.admittance_s - two.admittance_s).norm(), bound * scale);
    const Eigen::MatrixXcd z1 = Operator(mesh).impedance_matrix(9e8);
    omp_set_num_threads(2);
    const Eigen::MatrixXcd z2 = Operator(mesh).impedance_matrix(9e8);
    EXPECT_LT((z1 - z2).norm(), 1e-12 * z1.norm());
    const BlasThreads single(1);
    const Eigen::MatrixXcd v = one.currents_a;
    const auto y = [&](const Eigen::MatrixXcd& z) {
        return (Operator(mesh).port_vectors().transpose() * z.partialPivLu().solve(v)).eval();
    };
    EXPECT_LT((y(z1) - y(z2)).norm(), 1e-12 * y(z1).norm());
}

}  // namespace
}  // namespace annulet
