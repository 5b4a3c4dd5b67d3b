// Two-dimensional electrostatics of a strip on a slab, by another equation than the solver's.
#pragma once

namespace annulet::test {

/// Radius (m) of the round wire with the same capacitance per length as a strip of `width_m` on the face of a slab of
/// `thickness_m` that exceeds it by `margin_m` on both sides: w/4 in air. Total charge on all surfaces by collocation
/// on cosine-graded panels: potential 1 on the strip and (1 + eps)/2 rho - (eps - 1) E_n = 0 on bare faces, n out of
/// the slab (method of Smith, Proc. IEE 116, 1969, from memory; the equation is Gauss's law at a charged surface).
double equivalent_radius_m(double width_m, double thickness_m, double margin_m, double permittivity, int panels);

}  // namespace annulet::test
