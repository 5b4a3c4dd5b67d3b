// Closed forms for thin dipoles, two-wire lines and low-frequency inductances. Lengths named without unit are in any
// one unit; those of dipoles in wavelengths.
#pragma once

#include <complex>

namespace annulet::test {

/// Mutual impedance (ohm, referred to the current maxima) of two parallel dipoles with sinusoidal currents, by
/// quadrature of the exact field of the first along the second [King1957]. Lengths, axis distance `spacing` and
/// `stagger` of the centres along the axis in wavelengths. A `spacing` of one wire radius with stagger 0 gives the
/// self impedance of the induced-EMF method [Carter1932].
std::complex<double> mutual_dipole_impedance(double length_1, double length_2, double spacing, double stagger);

/// The same for equal half-wave dipoles side by side in closed form [Carter1932].
std::complex<double> mutual_half_wave_side_by_side(double spacing);

/// Characteristic impedance (ohm) of a line of two round wires of radii a1, a2 with axes `spacing` apart:
/// eta/2pi arcosh((d^2 - a1^2 - a2^2) / (2 a1 a2)).
double two_wire_impedance(double a1, double a2, double spacing);

/// Impedance step-up of a folded dipole or T match of unequal wires [Uda1954].
double step_up_ratio(double driven_radius, double other_radius, double spacing);

/// External inductances over mu0, in the unit of the lengths [Grover1946]: circular ring of radius b, rectangle x by y,
/// both of round wire of radius a; straight strip of width w, zero thickness and uniform current.
double ring_inductance_over_mu0(double b, double a);
double rectangle_inductance_over_mu0(double x, double y, double a);
double strip_inductance_over_mu0(double length, double width);

}  // namespace annulet::test
