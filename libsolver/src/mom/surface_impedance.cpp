#include "mom/surface_impedance.hpp"

#include <annulet/core/constants.hpp>
#include <annulet/numerics/special.hpp>

#include <cmath>

namespace annulet {

using Complex = std::complex<double>;

double skin_depth_m(double conductivity_s_per_m, double frequency_hz) {
    return 1 / std::sqrt(constants::pi * frequency_hz * constants::mu0_h_per_m * conductivity_s_per_m);
}

double roughness_factor(double rms_m, double skin_depth) {
    return 1 + 2 / constants::pi * std::atan(1.4 * std::pow(rms_m / skin_depth, 2));
}

namespace {

// K of the frequency continued analytically: 1/delta^2 = gamma^2 / 2j.
Complex complex_roughness_factor(double rms_m, Complex gamma) {
    if (rms_m == 0) return 1;
    return 1.0 + 2 / constants::pi * std::atan(1.4 * rms_m * rms_m * gamma * gamma / Complex(0, 2));
}

}  // namespace

Complex sheet_impedance(const Conductor& conductor, double frequency_hz) {
    return sheet_impedance(conductor, Complex(0, 2 * constants::pi * frequency_hz));
}

Complex sheet_impedance(const Conductor& conductor, Complex s) {
    if (conductor.perfect()) return 0;
    if (s.imag() < 0) return std::conj(sheet_impedance(conductor, std::conj(s)));
    const double sigma = conductor.conductivity_s_per_m, t = conductor.thickness_m;
    const Complex gamma = std::sqrt(s * constants::mu0_h_per_m * sigma);
    // Beyond 40 skin depths the foil is infinitely thick to rounding, and tanh would overflow nowhere near it.
    const Complex tanh = t > 0 && t * std::abs(gamma) < 56 ? std::tanh(0.5 * gamma * t) : Complex(1, 0);
    return complex_roughness_factor(conductor.roughness_rms_m, gamma) * gamma / (2 * sigma) / tanh;
}

Complex wire_impedance_per_m(const Conductor& conductor, double radius_m, double frequency_hz) {
    return wire_impedance_per_m(conductor, radius_m, Complex(0, 2 * constants::pi * frequency_hz));
}

Complex wire_impedance_per_m(const Conductor& conductor, double radius_m, Complex s) {
    if (conductor.perfect()) return 0;
    if (s.imag() < 0) return std::conj(wire_impedance_per_m(conductor, radius_m, std::conj(s)));
    const double sigma = conductor.conductivity_s_per_m;
    const Complex gamma = std::sqrt(s * constants::mu0_h_per_m * sigma);
    const Complex z = gamma / (2 * constants::pi * radius_m * sigma) * bessel_i0_over_i1(gamma * radius_m);
    return complex_roughness_factor(conductor.roughness_rms_m, gamma) * z;
}

Complex part_impedance(const Lumped& part, double frequency_hz) {
    return part_impedance(part, Complex(0, 2 * constants::pi * frequency_hz));
}

Complex part_impedance(const Lumped& part, Complex s) {
    const double w_q = 2 * constants::pi * part.quality_at_hz;
    const double w_0 = 2 * constants::pi * part.self_resonance_hz.value_or(0);
    Complex z = part.resistance_ohm.value_or(0);
    if (part.inductance_h) {
        const double l = *part.inductance_h;
        Complex coil = (part.quality ? w_q * l / *part.quality : 0.0) + s * l;
        if (part.self_resonance_hz) coil = coil / (1.0 + coil * s / (w_0 * w_0 * l));
        z += coil;
    }
    if (part.capacitance_f) {
        const double c = *part.capacitance_f;
        z += (part.quality && !part.inductance_h ? 1 / (w_q * c * *part.quality) : 0.0) + 1.0 / (s * c);
        if (part.self_resonance_hz && !part.inductance_h) z += s / (w_0 * w_0 * c);
    }
    return z;
}

}  // namespace annulet
