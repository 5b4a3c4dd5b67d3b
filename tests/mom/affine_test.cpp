#include <gtest/gtest.h>
#include <annulet/core/constants.hpp>
#include <annulet/core/diagnostics.hpp>
#include <annulet/mom/affine.hpp>
#include <annulet/sweep/sweep.hpp>

#include <Eigen/LU>

#include <cmath>

#include "mom/phase_interpolant.hpp"
#include "support/test_meshes.hpp"

namespace annulet {
namespace {

using Complex = std::complex<double>;
constexpr double top_hz = 3e9;

Complex on_axis(double frequency_hz) {
    return {0, 2 * constants::pi * frequency_hz};
}

Mesh lossy_ring() {
    Mesh mesh = test::ring_with_port(0.054, 0.008, 0.00565, 2, 40, test::edge_nodes(0.06));
    Conductor foil;
    foil.conductivity_s_per_m = 5.8e7;
    foil.thickness_m = 35e-6;
    foil.roughness_rms_m = 1e-6;
    mesh.conductors = {foil};
    for (Cell& cell : mesh.cells) cell.conductor = 0;
    mesh.lumped = {mesh.ports[0]};
    return mesh;
}

Operator lossy_operator() {
    Lumped part;
    part.resistance_ohm = 2;
    part.inductance_h = 1e-9;
    part.capacitance_f = 5e-12;
    return Operator(lossy_ring(), {part});
}

/// Largest error of S11 (50 ohm) of the affine matrix against exact fills between the nodes.
double reflection_error(const Operator& op, const AffineOperator& affine) {
    const Eigen::VectorXcd v = op.port_vectors().col(0).cast<Complex>();
    const auto s11 = [&](const Eigen::MatrixXcd& z) {
        const Complex y = v.transpose() * z.partialPivLu().solve(v);
        return (1.0 - 50.0 * y) / (1.0 + 50.0 * y);
    };
    double largest = 0;
    for (double f : {1.0e8, 4.3e8, 9.7e8, 1.61e9, 2.77e9, 3.0e9})
        largest = std::max(largest, std::abs(s11(affine.impedance_matrix(on_axis(f))) - s11(op.impedance_matrix(f))));
    return largest;
}

TEST(Affine, AgreesWithExactFills) {
    const Operator op = lossy_operator();
    const AffineOperator affine(op, top_hz);
    EXPECT_LT(reflection_error(op, affine), 1e-7);
    EXPECT_LE(affine.fills(), 9);
}

TEST(Affine, BothStoragesAgree) {
    const Operator op = lossy_operator();
    AffineOptions options;
    const AffineOperator terms(op, top_hz, options);
    options.storage = AffineStorage::interpolants;
    const AffineOperator interpolants(op, top_hz, options);
    EXPECT_EQ(terms.storage(), AffineStorage::terms);
    EXPECT_EQ(interpolants.storage(), AffineStorage::interpolants);
    for (Complex s : {on_axis(2e8), on_axis(1.9e9), on_axis(1.1e9) * Complex(1, 0.1)}) {
        const Eigen::MatrixXcd a = terms.impedance_matrix(s), b = interpolants.impedance_matrix(s);
        EXPECT_LT((a - b).norm(), 1e-8 * a.norm());
        const Eigen::MatrixXcd da = terms.derivative(s), db = interpolants.derivative(s);
        EXPECT_LT((da - db).norm(), 1e-7 * da.norm());
    }
}

// The small limit makes the choice by itself.
TEST(Affine, LargeModelsKeepInterpolants) {
    const Operator op = lossy_operator();
    AffineOptions options;
    options.memory_limit_bytes = 1e5;
    EXPECT_EQ(AffineOperator(op, top_hz, options).storage(), AffineStorage::interpolants);
}

TEST(Affine, TermsSumToTheMatrix) {
    const Operator op = lossy_operator();
    const AffineOperator affine(op, top_hz);
    const Complex s = on_axis(1.3e9) + 1e8;
    Eigen::MatrixXcd sum = Eigen::MatrixXcd::Zero(op.unknowns(), op.unknowns());
    const Eigen::VectorXcd factor = affine.coefficients(s);
    affine.for_each_term([&](int q, const Eigen::MatrixXd& term) { sum += factor[q] * term.cast<Complex>(); });
    for (const ExactTerm& term : affine.exact_terms()) sum += term.factor(s) * term.matrix.cast<Complex>();
    const Eigen::MatrixXcd z = affine.impedance_matrix(s);
    EXPECT_LT((sum - z).norm(), 1e-13 * z.norm());
    EXPECT_EQ((z - z.transpose()).norm(), 0);
    const Eigen::MatrixXcd x = Eigen::MatrixXcd::Random(op.unknowns(), 2);
    EXPECT_LT((affine.apply(s, x) - z * x).norm(), 1e-13 * (z * x).norm());
}

// Central differences of step h leave h^2: two steps, whose errors must fall by four.
TEST(Affine, DerivativeIsTheLimitOfDifferences) {
    const Operator op = lossy_operator();
    const AffineOperator affine(op, top_hz);
    for (Complex s : {on_axis(3e8), on_axis(2e9) - 1e9}) {
        const Eigen::MatrixXcd exact = affine.derivative(s);
        const auto error = [&](double h) {
            return ((affine.impedance_matrix(s + h) - affine.impedance_matrix(s - h)) / (2 * h) - exact).norm() /
                   exact.norm();
        };
        const double coarse = error(4e-3 * std::abs(s)), fine = error(2e-3 * std::abs(s));
        EXPECT_LT(fine, 1e-4);
        EXPECT_NEAR(coarse / fine, 4, 0.1);
    }
}

// Reality of fields in time: Z(conj s) = conj Z(s).
TEST(Affine, ConjugateSymmetry) {
    const Operator op = lossy_operator();
    const AffineOperator affine(op, top_hz);
    const Complex s = on_axis(1.2e9) - 3e8;
    const Eigen::MatrixXcd z = affine.impedance_matrix(s);
    EXPECT_LT((affine.impedance_matrix(std::conj(s)) - z.conjugate()).norm(), 1e-14 * z.norm());
}

// A current around the closed ring has no charge: its impedance at 100 kHz is inductive and of the right size, though
// it is a 1e-9 part of the charge terms. Exact fills are the measure.
TEST(Affine, ClosedCurrentsStayFreeOfChargeAtLowFrequency) {
    const Operator op(test::annulus(0.05, 0.058, 40, test::edge_nodes(0.06)));
    const AffineOperator affine(op, top_hz);
    const Eigen::MatrixXd d = op.basis().divergence;
    const Eigen::MatrixXd closed = Eigen::FullPivLU<Eigen::MatrixXd>(d).kernel();
    ASSERT_GE(closed.cols(), 1);
    const Eigen::MatrixXd inductance =
        constants::mu0_h_per_m * closed.transpose() * op.static_vector_potential() * closed;
    for (double f : {1e5, 1e7}) {
        const Eigen::MatrixXcd z =
            closed.transpose().cast<Complex>() * affine.impedance_matrix(on_axis(f)) * closed.cast<Complex>();
        const double w = 2 * constants::pi * f;
        EXPECT_LT((z.imag() / w - inductance).norm(), 1e-4 * inductance.norm()) << f;
    }
}

// Images reach farther than the antenna: the number of nodes must follow.
TEST(Affine, GroundPlane) {
    Mesh mesh = lossy_ring();
    mesh.ground_plane_m = -0.05;
    const Operator op(mesh, {Lumped{}});
    const AffineOperator affine(op, top_hz);
    EXPECT_LT(reflection_error(op, affine), 1e-7);
}

// A wire of poor metal: its internal impedance is one of the exact terms.
TEST(Affine, LossyWire) {
    Mesh mesh;
    constexpr int cells = 20;
    for (int i = 0; i <= cells; ++i) mesh.nodes.emplace_back(0, 0, 0.008 * i);
    Conductor metal;
    metal.conductivity_s_per_m = 1e4;
    mesh.conductors = {metal};
    for (int i = 0; i < cells; ++i) {
        Cell cell;
        cell.kind = CellKind::segment;
        cell.node = {i, i + 1, -1, -1};
        cell.conductor = 0;
        cell.radius_m = 5e-4;
        mesh.cells.push_back(cell);
    }
    Gap gap;
    gap.members.push_back({cells / 2, Vec3(0, 0, 1 / 0.008)});
    gap.length_m = 0.008;
    mesh.ports = {gap};
    const Operator op(mesh);
    EXPECT_LT(reflection_error(op, AffineOperator(op, top_hz)), 1e-7);
}

TEST(Affine, TooFewFillsAreRefused) {
    const Operator op = lossy_operator();
    AffineOptions options;
    options.most_fills = 5;
    options.fill_tolerance = 1e-13;
    EXPECT_THROW(AffineOperator(op, top_hz, options), NumericalError);
}

TEST(Affine, MemoryFormula) {
    const Operator op = lossy_operator();
    const AffineOperator affine(op, top_hz);
    const auto memory =
        affine_memory(op.unknowns(), static_cast<int>(op.basis().divergence.rows()), affine.fills(), affine.nodes(), 8);
    EXPECT_DOUBLE_EQ(memory.kept_terms_bytes, static_cast<double>(affine.bytes()));
    EXPECT_LT(affine_memory(1000, 600, 8, 13, 10).peak_bytes, 400e6);
}

// Polynomials are reproduced exactly; the derivative too.
TEST(Affine, LagrangePolynomials) {
    const Eigen::VectorXd node = Eigen::VectorXd::LinSpaced(5, 0, 1);
    const Complex z(0.37, 0.2);
    const Eigen::VectorXcd cube = node.array().cube().cast<Complex>();
    EXPECT_LT(std::abs((lagrange(node, z).transpose() * cube).value() - z * z * z), 1e-14);
    EXPECT_LT(std::abs((lagrange_derivative(node, z).transpose() * cube).value() - 3.0 * z * z), 1e-13);
    EXPECT_LT(std::abs((lagrange_derivative(node, node[2]).transpose() * cube).value() - 3 * node[2] * node[2]), 1e-13);
}

}  // namespace
}  // namespace annulet
