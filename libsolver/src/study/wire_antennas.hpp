// Textbook wire antennas as models, and their impedance: what `prove` and the tests of wires compute with.
#pragma once

#include <annulet/model/model.hpp>

#include <complex>
#include <string>
#include <vector>

namespace annulet {

/// Straight or bent perfectly conducting wire through the points.
Wire wire_through(const std::string& name, const std::vector<Vec3>& points, double radius_m);

Port port_on(const std::string& name, const std::string& wire, double gap_m, double at = 0.5);

/// Centre-fed straight dipole along z about the origin.
Model dipole(double length_m, double radius_m, double gap_m);

/// Perpendicular to the ground plane z = 0, gap at its base.
Model monopole(double height_m, double radius_m, double gap_m);

/// In the plane z = 0, gap at its +x side.
Model wire_loop(double loop_radius_m, double wire_radius_m, double gap_m);

/// Rectangle x by y in the plane z = 0 fed in the middle of its side of length y at +x.
Model rectangle_loop(double x_m, double y_m, double wire_radius_m, double gap_m);

/// Two parallel wires along z joined at both ends, the first one driven in its middle; with `both` a second port in
/// the middle of the other, pointing the same way.
Model folded_dipole(double length_m, double spacing_m, double driven_radius_m, double other_radius_m, double gap_m,
                    bool both = false);

struct WireSolution {
    Eigen::MatrixXcd impedance_ohm;  ///< ports x ports
    int cells = 0;
};

/// One solution on a mesh made for `frequency_hz`.
WireSolution solve_wires(const Model& model, double frequency_hz, double cells_per_wavelength, double refine = 1);

struct WireResonance {
    double frequency_hz = 0;
    double resistance_ohm = 0;
};

/// Zero of the reactance of the only port between the two frequencies, where it changes its sign.
WireResonance wire_resonance(const Model& model, double from_hz, double to_hz, double cells_per_wavelength);

}  // namespace annulet
