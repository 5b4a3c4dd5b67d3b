// Dipoles and loops of round wire. All lengths are in wavelengths: the wavelength is one metre.
#include <annulet/core/constants.hpp>

#include <cmath>

#include "study/prove_cases.hpp"
#include "study/prove_references.hpp"
#include "study/wire_antennas.hpp"

namespace annulet {

namespace {

constexpr double frequency_hz = constants::c0_m_per_s;
constexpr double cells_per_wavelength = 24, refine = 2;

const char* const hallen =
    "integral equation of the hollow tube with the exact kernel: Hallen 1938; King, The Theory of Linear Antennas, "
    "1956; gap of two radii, Z = V / mean gap current";
const char* const storer_wu =
    "Fourier series of the thin loop: Storer, Trans. AIEE 75, 1956; Wu, J. Math. Phys. 3, 1962; King in Collin & "
    "Zucker, Antenna Theory 1, 1969; same gap";
const char* const grover = "Grover, Inductance Calculations, 1946; at kb 0.01, the current on the surface";
const char* const sensitive = "close to an antiresonance the feed decides";

std::vector<ProveCase> impedance_cases(const std::string& name, std::complex<double> reference,
                                       std::complex<double> computed, double tolerance, const char* source,
                                       const std::string& why_not) {
    std::vector<ProveCase> cases{complex_case(name, "impedance_ohm", reference, computed, tolerance, source),
                                 real_case(name, "resistance_ohm", reference.real(), computed.real(), 0.02, source)};
    if (!why_not.empty())
        for (auto& c : cases) c = shown_only(c, why_not);
    return cases;
}

std::vector<ProveCase> dipole_cases(const references::Dipole& d) {
    const auto z = solve_wires(dipole(d.length, d.radius, 2 * d.radius), frequency_hz, cells_per_wavelength, refine);
    return impedance_cases(d.name, d.impedance, z.impedance_ohm(0, 0), 0.01, hallen, d.sensitive ? sensitive : "");
}

std::vector<ProveCase> dipole_resonance_cases(const references::DipoleResonance& d) {
    const double radius = 0.5 / d.half_length_over_radius;
    const double gap = d.gap_over_length > 0 ? d.gap_over_length : 2 * radius;
    const auto r = wire_resonance(dipole(1, radius, gap), 0.44 * frequency_hz, 0.5 * frequency_hz, 60);
    return {real_case(d.name, "resonance_wavelengths", d.length, r.frequency_hz / frequency_hz, 0.003, hallen),
            real_case(d.name, "resistance_ohm", d.resistance, r.resistance_ohm, 0.015, hallen)};
}

std::vector<ProveCase> loop_cases(const references::Loop& l) {
    const auto z =
        solve_wires(wire_loop(l.radius, l.wire_radius, 2 * l.wire_radius), frequency_hz, cells_per_wavelength, refine);
    return impedance_cases(l.name, l.impedance, z.impedance_ohm(0, 0), 0.015, storer_wu,
                           l.sensitive    ? sensitive
                           : l.omega < 11 ? "the series is for thin wire, and this is thick"
                                          : "");
}

std::vector<ProveCase> loop_resonance_cases(const references::LoopResonance& l) {
    const double radius = 1 / (2 * constants::pi), wire = radius / l.radius_over_wire;
    const auto r = wire_resonance(wire_loop(radius, wire, 2 * wire), 0.95 * frequency_hz, 1.25 * frequency_hz, 60);
    return {real_case(l.name, "resonance_kb", l.kb, r.frequency_hz / frequency_hz, 0.003, storer_wu),
            real_case(l.name, "resistance_ohm", l.resistance, r.resistance_ohm, 0.02, storer_wu)};
}

std::vector<ProveCase> inductance_cases(const references::Inductance& l) {
    const double largest = l.y > 0 ? (l.x + l.y) / constants::pi : l.x;  // radius of the loop of the same girth
    const double f = 0.01 * constants::c0_m_per_s / (2 * constants::pi * largest);
    const Model model =
        l.y > 0 ? rectangle_loop(l.x, l.y, l.wire_radius, 0.01 * l.y) : wire_loop(l.x, l.wire_radius, 0.01 * l.x);
    const double reactance = solve_wires(model, f, cells_per_wavelength).impedance_ohm(0, 0).imag();
    const double over_mu0 = reactance / (2 * constants::pi * f * constants::mu0_h_per_m);
    return {real_case(l.name, "inductance_over_mu0_m", l.over_mu0, over_mu0, 0.005, grover)};
}

template <typename Table, typename Cases>
void append(std::vector<ProveTask>& tasks, Table table, Cases cases) {
    for (const auto& entry : table) tasks.emplace_back([&entry, cases] { return cases(entry); });
}

}  // namespace

std::vector<ProveTask> dipole_tasks() {
    std::vector<ProveTask> tasks;
    append(tasks, references::dipoles(), dipole_cases);
    append(tasks, references::dipole_resonances(), dipole_resonance_cases);
    return tasks;
}

std::vector<ProveTask> loop_tasks() {
    std::vector<ProveTask> tasks;
    append(tasks, references::loops(), loop_cases);
    append(tasks, references::loop_resonances(), loop_resonance_cases);
    append(tasks, references::inductances(), inductance_cases);
    return tasks;
}

}  // namespace annulet
