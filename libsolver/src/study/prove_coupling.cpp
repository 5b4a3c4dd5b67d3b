// Coupled wires, wires over ground, folded dipoles. All lengths are in wavelengths of one metre.
#include <annulet/core/constants.hpp>

#include <Eigen/LU>

#include <cmath>
#include <string>

#include "study/prove_cases.hpp"
#include "study/prove_references.hpp"
#include "study/wire_antennas.hpp"

namespace annulet {

namespace {

constexpr double frequency_hz = constants::c0_m_per_s;
constexpr double cells_per_wavelength = 40;

/// The closed forms assume a sinusoidal current, which the wire approaches as 1/Omega only: Omega is 40 here.
constexpr double thinnest_radius = 1e-9;

const char* const carter_king = "Carter, Proc. IRE 20, 1932; King, Proc. IRE 45, 1957: sinusoidal current";
const char* const image_theory = "theory of images; both sides computed";
const char* const uda = "Uda & Mushiake, Yagi-Uda Antenna, 1954; Balanis, Antenna Theory, section 9.7";

std::vector<ProveCase> mutual_cases(const references::Mutual& m) {
    const double gap = 2e-3;
    Model model = dipole(0.5, thinnest_radius, gap);
    model.wires.push_back(wire_through("second", {{m.x, 0, m.z - 0.25}, {m.x, 0, m.z + 0.25}}, thinnest_radius));
    model.ports.push_back(port_on("second", "second", gap));
    const auto z = solve_wires(model, frequency_hz, cells_per_wavelength);
    ProveCase c = complex_case(m.name, "mutual_impedance_ohm", m.impedance, z.impedance_ohm(0, 1), 0.05, carter_king);
    c.scale = m.largest;
    return {c};
}

std::complex<double> input(const Model& model) {
    return solve_wires(model, frequency_hz, cells_per_wavelength, 2).impedance_ohm(0, 0);
}

std::vector<ProveCase> monopole_cases(const references::Monopole& m) {
    const double gap = (m.frill_over_radius - 1) * m.radius;
    const auto z = input(monopole(m.height, m.radius, gap));
    const auto half = input(dipole(2 * m.height, m.radius, 2 * gap)) / 2.0;
    return {complex_case(std::string(m.name) + ", half its dipole", "impedance_ohm", half, z, 0.001, image_theory),
            shown_only(complex_case(m.name, "impedance_ohm", m.impedance, z, 0.05,
                                    "integral equation of the hollow tube: Hallen 1938, King 1956; coaxial frill"),
                       "a gap as wide as the frill is another feed")};
}

/// Horizontal half-wave dipole at a height over the plane, against free space and the image's mutual impedance.
std::vector<ProveCase> image_cases(double height) {
    const double gap = 2e-3, radius = 1e-4;
    const auto horizontal = [&](const std::string& name, double z) {
        return wire_through(name, {{-0.25, 0, z}, {0.25, 0, z}}, radius);
    };
    Model ground = dipole(0.5, radius, gap);
    ground.wires = {horizontal("dipole", height)};
    Model pair = ground;
    ground.ground_plane_m = 0;
    pair.wires.push_back(horizontal("image", -height));
    pair.ports.push_back(port_on("image", "image", gap));
    const auto z = solve_wires(pair, frequency_hz, cells_per_wavelength).impedance_ohm;
    const auto over_ground = solve_wires(ground, frequency_hz, cells_per_wavelength).impedance_ohm(0, 0);
    return {complex_case("horizontal dipole over ground, " + std::to_string(height).substr(0, 4) + " wavelengths",
                         "impedance_ohm", z(0, 0) - z(0, 1), over_ground, 0.001, image_theory)};
}

/// With both wires at one voltage the currents share as the wires' potentials demand, and an antenna current fed into
/// one of them only sees (1 + I2/I1)^2 times the impedance.
std::vector<ProveCase> step_up_cases(const references::StepUp& s) {
    const double unit = 2e-4;
    const auto z = solve_wires(
        folded_dipole(0.48, unit * s.spacing, unit * s.driven_radius, unit * s.other_radius, unit * s.spacing, true),
        frequency_hz, cells_per_wavelength);
    const Eigen::MatrixXcd y = z.impedance_ohm.inverse();
    const auto ratio = (y(1, 0) + y(1, 1)) / (y(0, 0) + y(0, 1));
    return {real_case(s.name, "step_up", s.ratio, std::norm(1.0 + ratio), 0.02, uda)};
}

std::vector<ProveCase> folded_cases(const references::Folded& f) {
    const auto z = solve_wires(folded_dipole(f.length, f.spacing, f.radius, f.radius, f.length / 60), frequency_hz,
                               cells_per_wavelength);
    return {shown_only(complex_case(f.name, "impedance_ohm", f.impedance, z.impedance_ohm(0, 0), 0.05,
                                    "own numerical solution, not published"),
                       "the reference is no outside result")};
}

}  // namespace

std::vector<ProveTask> coupling_tasks() {
    std::vector<ProveTask> tasks;
    for (const auto& m : references::mutuals()) tasks.emplace_back([&m] { return mutual_cases(m); });
    for (const auto& m : references::monopoles()) tasks.emplace_back([&m] { return monopole_cases(m); });
    for (const double height : {0.1, 0.25, 0.35, 0.75}) tasks.emplace_back([height] { return image_cases(height); });
    for (const auto& s : references::step_ups()) tasks.emplace_back([&s] { return step_up_cases(s); });
    for (const auto& f : references::folded_dipoles()) tasks.emplace_back([&f] { return folded_cases(f); });
    return tasks;
}

}  // namespace annulet
