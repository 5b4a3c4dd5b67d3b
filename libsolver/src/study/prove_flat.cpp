// Flat metal: capacitances of plates, inductances of flat rings, strip rings at their resonance.
#include <annulet/core/constants.hpp>
#include <annulet/mesh/mesh.hpp>
#include <annulet/mom/operator.hpp>
#include <annulet/numerics/roots.hpp>
#include <annulet/sweep/sweep.hpp>

#include <Eigen/Cholesky>

#include <cmath>

#include "study/prove_cases.hpp"
#include "study/prove_references.hpp"

namespace annulet {

namespace {

using constants::pi;

const char* const thin_loop =
    "Fourier series of the thin loop (Storer, Trans. AIEE 75, 1956; Wu, J. Math. Phys. 3, 1962) for the wire of a "
    "quarter of the strip's width, same gap";

Model flat(Shape shape) {
    Metal metal;
    metal.name = "metal";
    metal.shape = std::move(shape);
    Model model;
    model.metals = {metal};
    return model;
}

MeshOptions cosine_across(int cells, double refine) {
    MeshOptions options;
    options.cells_across = cells;
    options.edge_cell_fraction = 0;
    options.refine = refine;
    return options;
}

/// Unit square, cells cosine-graded toward all edges.
Mesh square_plate(int n) {
    Mesh mesh;
    const auto node = [n](int i) { return 0.5 - 0.5 * std::cos(pi * i / n); };
    for (int i = 0; i <= n; ++i)
        for (int j = 0; j <= n; ++j) mesh.nodes.emplace_back(node(i), node(j), 0);
    for (int i = 0; i < n; ++i)
        for (int j = 0; j < n; ++j) {
            Cell cell;
            const int corner = i * (n + 1) + j;
            cell.node = {corner, corner + n + 1, corner + n + 2, corner + 1};
            mesh.cells.push_back(cell);
        }
    return mesh;
}

/// Graded cells converge with the square of their size.
double extrapolated(double coarse, double fine) {
    return fine + (fine - coarse) / 3;
}

/// All cells at one potential; over 4 pi eps0, m.
double capacitance(Mesh mesh) {
    const Eigen::MatrixXd p = Operator(std::move(mesh)).static_scalar_potential();
    return p.ldlt().solve(Eigen::VectorXd::Ones(p.rows())).sum() / (4 * pi);
}

std::vector<ProveCase> capacitance_cases(const references::Capacitance& c) {
    const bool square = c.inner < 0;
    const auto mesh = [&](int refine) {
        return square ? square_plate(6 * refine)
                      : make_mesh(flat(Ring{{0, 0}, (1 + c.inner) / 2, 1 - c.inner}), cosine_across(4, refine));
    };
    return {real_case(c.name, "capacitance_over_4pi_eps0", c.value,
                      extrapolated(capacitance(mesh(1)), capacitance(mesh(2))), 0.002,
                      square ? "Read, J. Comp. Appl. Math. 1997 (0.36679, from memory)"
                             : "ring integral equation: Smythe 1951, Cooke 1958")};
}

Model fed_ring(double radius, double width, double gap) {
    Model model = flat(Ring{{0, 0}, radius, width});
    Port port;
    port.name = "feed";
    port.placement = Across{{radius - width, 0, 0}, {radius + width, 0, 0}, gap};
    model.ports = {port};
    return model;
}

std::vector<ProveCase> flat_ring_cases(const references::FlatRing& r) {
    const double f = 0.01 * constants::c0_m_per_s / (2 * pi);
    const auto inductance = [&](double refine) {
        const Operator op(make_mesh(fed_ring(1, r.width, 0.02), cosine_across(3, refine)));
        const double reactance = (1.0 / solve_point(op, f, false).admittance_s(0, 0)).imag();
        return reactance / (2 * pi * f * constants::mu0_h_per_m);
    };
    return {real_case(r.name, "inductance_over_mu0_m", r.over_mu0, extrapolated(inductance(1), inductance(2)), 0.005,
                      "flux-line integral equation of the flat ring; thin limit ln(32 r/w) - 2")};
}

struct StripRing {
    const char* name;
    double width_m, resonance_hz, resistance_ohm;
};
/// Mean radius 54 mm, gap of 1/60 of the circumference.
constexpr StripRing strip_rings[] = {{"strip ring, 2 mm wide", 0.002, 945.05e6, 143.75},
                                     {"strip ring, 8 mm wide", 0.008, 1000.78e6, 159.26}};

struct Crossing {
    double frequency_hz, resistance_ohm;
};

Crossing series_resonance(const StripRing& ring, double refine) {
    MeshOptions options = cosine_across(3, refine);
    options.top_frequency_hz = 1.1e9;
    const Operator op(make_mesh(fed_ring(0.054, ring.width_m, 2 * pi * 0.054 / 60), options));
    const auto impedance = [&](double f) { return 1.0 / solve_point(op, f, false).admittance_s(0, 0); };
    const double f = bracketed_root([&](double x) { return impedance(x).imag(); }, 0.85e9, 1.1e9, 1e-6);
    return {f, impedance(f).real()};
}

std::vector<ProveCase> strip_ring_cases(const StripRing& ring) {
    const Crossing coarse = series_resonance(ring, 1), fine = series_resonance(ring, 2);
    return {real_case(ring.name, "resonance_hz", ring.resonance_hz,
                      extrapolated(coarse.frequency_hz, fine.frequency_hz), 0.002, thin_loop),
            real_case(ring.name, "resistance_ohm", ring.resistance_ohm,
                      extrapolated(coarse.resistance_ohm, fine.resistance_ohm), 0.025, thin_loop)};
}

}  // namespace

std::vector<ProveTask> flat_metal_tasks() {
    std::vector<ProveTask> tasks;
    for (const auto& c : references::capacitances()) tasks.emplace_back([&c] { return capacitance_cases(c); });
    for (const auto& r : references::flat_rings()) tasks.emplace_back([&r] { return flat_ring_cases(r); });
    for (const auto& r : strip_rings) tasks.emplace_back([&r] { return strip_ring_cases(r); });
    return tasks;
}

}  // namespace annulet
