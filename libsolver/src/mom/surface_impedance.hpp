// Sheet impedance of foil and internal impedance of round wires.
#pragma once

#include <annulet/model/model.hpp>

#include <complex>

namespace annulet {

/// Ohm per square of a foil with current on both faces: (gamma / 2 sigma) coth(gamma t / 2), gamma = (1 + j)/delta
/// (plane wave in a slab, [Ramo1994] ch. 3), real and reactive part of the skin effect times the roughness factor
/// K = 1 + (2/pi) atan(1.4 (rms/delta)^2) [Hammerstad1980]. Thickness 0: infinitely thick. Zero if perfect.
std::complex<double> sheet_impedance(const Conductor& conductor, double frequency_hz);
/// The same at s = sigma + jw, analytic in each half-plane Im s > 0 and Im s < 0, conjugate in one to the other;
/// real on the positive real axis if the foil is smooth (the roughness factor is a function of |w|).
std::complex<double> sheet_impedance(const Conductor& conductor, std::complex<double> s);

/// Internal impedance per length (ohm/m) of a round wire: gamma / (2 pi a sigma) I0(gamma a) / I1(gamma a),
/// gamma = (1 + j)/delta ([Ramo1994] ch. 4), times the roughness factor. Zero if perfect.
std::complex<double> wire_impedance_per_m(const Conductor& conductor, double radius_m, double frequency_hz);
/// The same at s = sigma + jw, continued as that of the foil.
std::complex<double> wire_impedance_per_m(const Conductor& conductor, double radius_m, std::complex<double> s);

/// Skin depth, m; conductivity finite.
double skin_depth_m(double conductivity_s_per_m, double frequency_hz);

double roughness_factor(double rms_m, double skin_depth_m);

/// Impedance of a lumped part: series R + jwL + 1/(jwC); with `quality` the reactive element of lowest
/// frequency-independent loss resistance |X|/Q at `quality_at_hz`; with `self_resonance_hz` the parasitic
/// reactance that resonates it there (parallel to an inductor, in series with a capacitor).
std::complex<double> part_impedance(const Lumped& part, double frequency_hz);
/// The same at s = sigma + jw: a rational function with real coefficients.
std::complex<double> part_impedance(const Lumped& part, std::complex<double> s);

}  // namespace annulet
