#include <gtest/gtest.h>
#include <annulet/core/constants.hpp>
#include <annulet/core/diagnostics.hpp>
#include <annulet/sweep/reduced_basis.hpp>

#include <Eigen/LU>

#include <algorithm>
#include <cmath>
#include <utility>

#include "support/test_meshes.hpp"

namespace annulet {
namespace {

using Complex = std::complex<double>;
constexpr double low_hz = 1e8, high_hz = 3e9;

void append(Mesh& mesh, const Mesh& other, const Vec3& shift) {
    const int nodes = static_cast<int>(mesh.nodes.size()), cells = static_cast<int>(mesh.cells.size());
    for (const Vec3& p : other.nodes) mesh.nodes.push_back(p + shift);
    for (Cell cell : other.cells) {
        for (int& n : cell.node)
            if (n >= 0) n += nodes;
        mesh.cells.push_back(cell);
    }
    const auto moved = [cells](Gap gap) {
        for (auto& member : gap.members) member.cell += cells;
        return gap;
    };
    for (const Gap& gap : other.ports) mesh.ports.push_back(moved(gap));
    for (const Gap& gap : other.lumped) mesh.lumped.push_back(moved(gap));
}

Mesh ring(double radius, double width, int around) {
    return test::ring_with_port(radius, width, 2 * constants::pi * radius / 60, 2, around, test::edge_nodes(0.06));
}

/// Loop of 108 mm and, detached from it, a lossless ring of 5.2 mm closed by a capacitor.
Operator loop_and_resonator() {
    Mesh mesh = ring(0.054, 0.006, 32);
    Mesh resonator = test::ring_with_port(0.0026, 0.0008, 0.0004, 1, 14, {0, 1});
    resonator.lumped = std::exchange(resonator.ports, {});
    append(mesh, resonator, Vec3(0.066, 0.01, 0.004));
    Lumped part;
    part.capacitance_f = 1.9e-12;
    return Operator(mesh, {part});
}

double largest_difference(const Operator& op, const ReducedSweep& sweep, int points, double reference_ohm = 50) {
    double largest = 0;
    const Eigen::MatrixXcd one = Eigen::MatrixXcd::Identity(op.ports(), op.ports());
    const auto s = [&](const Eigen::MatrixXcd& y) {
        return ((one - reference_ohm * y) * (one + reference_ohm * y).inverse()).eval();
    };
    for (int i = 0; i < points; ++i) {
        const double f = low_hz + (high_hz - low_hz) * (i + 0.5) / points;
        const auto exact = solve_point(op, f, false).admittance_s;
        const double difference = (s(sweep.admittance_s(f)) - s(exact)).cwiseAbs().maxCoeff();
        EXPECT_LE(difference, sweep.reflection_error(f) + 1e-10) << f;
        largest = std::max(largest, difference);
    }
    return largest;
}

void expect_bounded(const Operator& op, double tolerance, int most_solves, int points) {
    const AffineOperator affine(op, high_hz);
    ReducedOptions options;
    options.tolerance = tolerance;
    const ReducedSweep sweep(affine, low_hz, high_hz, options);
    const double error = largest_difference(op, sweep, points);
    EXPECT_LE(error, sweep.reflection_error());
    EXPECT_LE(sweep.reflection_error(), 2 * tolerance);
    EXPECT_LE(sweep.full_solves(), most_solves);
}

TEST(ReducedSweep, BoundsItsErrorOnARing) {
    const Operator op(ring(0.054, 0.008, 36));
    expect_bounded(op, 1e-4, 10, 21);
    expect_bounded(op, 1e-6, 12, 21);
}

TEST(ReducedSweep, SeveralPorts) {
    Mesh mesh = ring(0.054, 0.006, 28);
    append(mesh, ring(0.04, 0.004, 24), Vec3(0.11, 0.02, 0.005));
    expect_bounded(Operator(mesh), 1e-6, 12, 9);
}

/// Pole of the current through the part from three exact solutions near it: i (f - p) = a + b f.
Complex pole_of_exact_currents(const Operator& op, double near_hz, double half_width_hz) {
    Eigen::Matrix3cd a;
    Eigen::Vector3cd b;
    for (int row = 0; row < 3; ++row) {
        const double x = row - 1;  // (f - near) / half-width
        const auto point = solve_point(op, near_hz + x * half_width_hz);
        const Complex i = op.lumped_vectors().col(0).cast<Complex>().dot(point.currents_a.col(0));
        a.row(row) << i, 1, x;
        b[row] = i * x;
    }
    const Eigen::Vector3cd p = a.fullPivLu().solve(b);
    return near_hz + half_width_hz * p[0];
}

// The resonator is so sharp that no grid would meet it; the poles of the reduced model find it.
TEST(ReducedSweep, FindsAHiddenResonance) {
    const Operator op = loop_and_resonator();
    const AffineOperator affine(op, high_hz);
    const ReducedSweep sweep(affine, low_hz, high_hz);
    const auto poles = sweep.poles();
    // 1.3 GHz from the capacitor and the inductance mu0 r (ln(8 r / (w/4)) - 2) of a ring.
    const auto sharp = std::find_if(poles.begin(), poles.end(), [](auto& p) {
        return p.q() > 1000 && p.frequency_hz() > 1.0e9 && p.frequency_hz() < 1.6e9;
    });
    ASSERT_NE(sharp, poles.end());
    EXPECT_GT(sharp->q(), 5000);
    const double f = sharp->frequency_hz();
    const Complex exact = pole_of_exact_currents(op, f, f / (2 * sharp->q()));
    EXPECT_NEAR(f / exact.real(), 1, 1e-7);
    EXPECT_NEAR(sharp->q() / (exact.real() / (2 * exact.imag())), 1, 1e-3);
    const Complex on = sweep.admittance_s(f)(0, 0), off = sweep.admittance_s(f * (1 + 10 / sharp->q()))(0, 0);
    EXPECT_GT(100 * std::abs((on - off) / ((1.0 + 50.0 * on) * (1.0 + 50.0 * off))), 1e-2);
    for (double x : {-2.0, -0.5, 0.0, 0.5, 2.0}) {
        const double at = f * (1 + x / (2 * sharp->q()));
        const Complex y = sweep.admittance_s(at)(0, 0), truth = solve_point(op, at, false).admittance_s(0, 0);
        EXPECT_LE(100 * std::abs(y - truth) / std::norm(1.0 + 50.0 * truth), sweep.reflection_error());
    }
    expect_bounded(op, 1e-4, 10, 9);
    expect_bounded(op, 1e-6, 12, 9);
}

TEST(ReducedSweep, CurrentsComeFromTheSameBasis) {
    const Operator op(ring(0.054, 0.008, 24));
    const AffineOperator affine(op, high_hz);
    const ReducedSweep sweep(affine, low_hz, high_hz);
    const std::vector<double> f{3.3e8, 1.234e9, 2.9e9};
    const auto points = sweep.evaluate(f, true);
    for (std::size_t i = 0; i < f.size(); ++i) {
        const auto exact = solve_point(op, f[i]);
        EXPECT_LT((points[i].currents_a - exact.currents_a).norm(), 1e-3 * exact.currents_a.norm());
        EXPECT_EQ((points[i].currents_a - sweep.currents_a(f[i])).norm(), 0);
        EXPECT_EQ(points[i].admittance_s(0, 0), sweep.admittance_s(f[i])(0, 0));
    }
}

// The identity behind the estimate: Y - y^T v = r^T Z^-1 r for complex symmetric Z.
TEST(ReducedModel, ErrorIdentity) {
    const Operator op(ring(0.054, 0.008, 16));
    const AffineOperator affine(op, high_hz);
    ReducedModel model(affine);
    model.add(affine, solve_point(op, 6e8).currents_a);
    model.add(affine, solve_point(op, 1.8e9).currents_a);
    EXPECT_LT((model.basis().transpose() * model.basis() - Eigen::MatrixXd::Identity(4, 4)).norm(), 1e-13);
    const std::vector<Complex> s{{0, 2 * constants::pi * 1.1e9}};
    const std::vector<Eigen::MatrixXcd> y{model.solve(affine, s[0])};
    const Eigen::MatrixXcd z = affine.impedance_matrix(s[0]), r = model.residuals(affine, s, y);
    const Eigen::MatrixXcd v = op.port_vectors().cast<Complex>();
    EXPECT_LT((v - z * (model.basis() * y[0]) - r).norm(), 1e-9 * v.norm());
    const Complex exact = (v.transpose() * z.partialPivLu().solve(v)).value();
    const Complex reduced = (v.transpose() * model.basis() * y[0]).value();
    const Complex error = (r.transpose() * z.partialPivLu().solve(r)).value();
    EXPECT_GT(std::abs(error), 1e-6 * std::abs(exact));
    EXPECT_LT(std::abs(exact - reduced - error), 1e-9 * std::abs(exact));
}

TEST(ReducedSweep, TooFewSolvesAreAFailure) {
    const Operator op(ring(0.054, 0.008, 16));
    const AffineOperator affine(op, high_hz);
    ReducedOptions options;
    options.most_solves = 3;
    EXPECT_THROW(ReducedSweep(affine, low_hz, high_hz, options), NumericalError);
}

class StopAtOnce : public Progress {
public:
    void report(const std::string&, std::size_t, std::size_t) override {}
    bool cancelled() const override { return true; }
};

TEST(ReducedSweep, CanBeCancelled) {
    const Operator op(ring(0.054, 0.008, 16));
    const AffineOperator affine(op, high_hz);
    StopAtOnce stop;
    EXPECT_THROW(ReducedSweep(affine, low_hz, high_hz, {}, &stop), Cancelled);
}

}  // namespace
}  // namespace annulet
