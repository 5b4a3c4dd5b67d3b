// Static Galerkin integrals of thin tubes: wire segment with wire segment, wire segment with flat cell.
#pragma once

#include "mom/element.hpp"
#include "mom/elements.hpp"
#include "mom/static_moments.hpp"

namespace annulet {

/// Axis of a segment; local function 0 is -(1 - u) tangent, function 1 is u tangent, u = 0 ... 1 from `from`.
struct WireElement {
    Vec3 from{0, 0, 0};
    Vec3 to{0, 0, 0};
    double radius_m = 0;

    double length_m() const { return (to - from).norm(); }
    Vec3 tangent() const { return (to - from).normalized(); }
    Vec3 point(double u) const { return from + u * (to - from); }
    WireElement mirrored(double plane_z_m) const;
};

WireElement wire_element(const Element& segment);

/// Mean of 1/sqrt(d^2 + a^2 + b^2 - 2 a b cos(phi)) over phi, 1/m: exact for the currents of one tube (a = b) or of
/// coaxial ones of radii a and b, whose points lie d apart along the axis ([King1956] ch. I); for others it is off by
/// the order (a^2 + b^2)/d^2. (2/pi) K(m) / sqrt(d^2 + (a + b)^2), m = 4ab/(d^2 + (a + b)^2). Infinite at d = 0, a = b.
double tube_kernel(double squared_distance_m2, double a_m, double b_m);

/// Tube kernel over both segments, to about 1e-8 of the largest moment; they may coincide, share an end or stand
/// apart by any distance.
PairMoments static_wire_pair(const WireElement& test, const WireElement& source);

/// Mean over the circumference of the wire of the potential of the flat cell. The first index of the moments is
/// the wire's. After the slots of the flat cell: a unit charge on it that moves along z with unit speed.
PairMoments static_wire_and_surface(const WireElement& wire, const PlanarElement& surface);

PairMoments transposed(const PairMoments& pair);

}  // namespace annulet
