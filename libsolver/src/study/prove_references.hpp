// Outside values that `prove` compares with; the tables are written by scripts/prove_references.py from
// tests/reference/values.json. Lengths in wavelengths where not said otherwise, impedances in ohm.
#pragma once

#include <complex>
#include <span>

namespace annulet::references {

using Complex = std::complex<double>;

/// Hollow tube fed by a uniform field over a gap of twice its radius.
struct Dipole {
    const char* name;
    double length, radius;
    Complex impedance;
    bool sensitive;  ///< to the model of the feed: reported only
};
struct DipoleResonance {
    const char* name;
    double half_length_over_radius;
    double gap_over_length;  ///< 0: a gap of two radii
    double length, resistance;
};
struct Loop {
    const char* name;
    double omega, kb, radius, wire_radius;
    Complex impedance;
    bool sensitive;
};
struct LoopResonance {
    const char* name;
    double radius_over_wire, kb, resistance;
};
/// Centre of the second half-wave dipole relative to the first, parallel to z.
struct Mutual {
    const char* name;
    double x, z;
    Complex impedance;
    double largest;  ///< magnitude of its kind
};
struct Monopole {
    const char* name;
    double height, radius, frill_over_radius;
    Complex impedance;
};
/// Ring: x is its radius and y = 0; else a rectangle x by y. Lengths in any unit; inductance over mu0 in that unit.
struct Inductance {
    const char* name;
    double x, y, wire_radius, over_mu0;
};
struct StepUp {
    const char* name;
    double driven_radius, other_radius, spacing, ratio;
};
struct Folded {
    const char* name;
    double length, spacing, radius;
    Complex impedance;
};
/// Over 4 pi eps0 times the outer radius, or the side; inner = -1: a square plate.
struct Capacitance {
    const char* name;
    double inner, value;
};
/// Flat ring of mean radius 1 and `width`; over mu0 times the mean radius.
struct FlatRing {
    const char* name;
    double width, over_mu0;
};

std::span<const Dipole> dipoles();
std::span<const DipoleResonance> dipole_resonances();
std::span<const Loop> loops();
std::span<const LoopResonance> loop_resonances();
std::span<const Mutual> mutuals();
std::span<const Monopole> monopoles();
std::span<const Inductance> inductances();
std::span<const StepUp> step_ups();
std::span<const Folded> folded_dipoles();
std::span<const Capacitance> capacitances();
std::span<const FlatRing> flat_rings();

}  // namespace annulet::references
