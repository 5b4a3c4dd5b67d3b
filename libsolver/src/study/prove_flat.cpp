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

/// Farad: all cells at one potential.
double capacitance_f(const Model& model, double refine) {
    const Eigen::MatrixXd p = Operator(make_mesh(model, cosine_across(4, refine))).static_scalar_potential();
    return constants::eps0_f_per_m * p.ldlt().solve(Eigen::VectorXd::Ones(p.rows())).sum();
}

std::vector<ProveCase> capacitance_cases(const references::Capacitance& c) {
    const bool square = c.inner < 0;
    const Model model =
        flat(square ? Shape(Rectangle{{0, 0}, {1, 1}, 0}) : Shape(Ring{{0, 0}, (1 + c.inner) / 2, 1 - c.inner}));
    const double coarse = capacitance_f(model, 1), fine = capacitance_f(model, 2);
    // Graded cells converge with the square of their size.
    const double value = (fine + (fine - coarse) / 3) / (4 * pi * constants::eps0_f_per_m);
    return {real_case(c.name, "capacitance_over_4pi_eps0", c.value, value, 0.002,
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
    const Operator op(make_mesh(fed_ring(1, r.width, 0.02), cosine_across(6, 1)));
    const double reactance = (1.0 / solve_point(op, f, false).admittance_s(0, 0)).imag();
    return {real_case(r.name, "inductance_over_mu0_m", r.over_mu0, reactance / (2 * pi * f * constants::mu0_h_per_m),
                      0.01, "flux-line integral equation of the flat ring; thin limit ln(32 r/w) - 2")};
}

struct StripRing {
    const char* name;
    double width_m, resonance_hz, resistance_ohm;
};
/// Mean radius 54 mm, gap of 1/60 of the circumference.
constexpr StripRing strip_rings[] = {{"strip ring, 2 mm wide", 0.002, 945.05e6, 143.75},
                                     {"strip ring, 8 mm wide", 0.008, 1000.78e6, 159.26}};

std::vector<ProveCase> strip_ring_cases(const StripRing& ring) {
    MeshOptions options = cosine_across(4, 1);
    options.top_frequency_hz = 1.1e9;
    options.cells_per_wavelength = 40;
    const Operator op(make_mesh(fed_ring(0.054, ring.width_m, 2 * pi * 0.054 / 60), options));
    const auto impedance = [&](double f) { return 1.0 / solve_point(op, f, false).admittance_s(0, 0); };
    const double f = bracketed_root([&](double x) { return impedance(x).imag(); }, 0.85e9, 1.1e9, 1e-6);
    return {real_case(ring.name, "resonance_hz", ring.resonance_hz, f, 0.002, thin_loop),
            real_case(ring.name, "resistance_ohm", ring.resistance_ohm, impedance(f).real(), 0.025, thin_loop)};
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
