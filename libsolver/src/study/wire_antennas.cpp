#include "study/wire_antennas.hpp"

#include <annulet/core/constants.hpp>
#include <annulet/mesh/mesh.hpp>
#include <annulet/mom/operator.hpp>
#include <annulet/numerics/roots.hpp>
#include <annulet/sweep/sweep.hpp>

#include <Eigen/LU>

namespace annulet {

namespace {

Mesh mesh_for(const Model& model, double top_frequency_hz, double cells_per_wavelength, double refine) {
    MeshOptions options;
    options.top_frequency_hz = top_frequency_hz;
    options.cells_per_wavelength = cells_per_wavelength;
    options.refine = refine;
    return make_mesh(model, options);
}

Model one_wire(Wire wire, double gap_m, double at) {
    Model model;
    model.ports = {port_on("feed", wire.name, gap_m, at)};
    model.wires = {std::move(wire)};
    return model;
}

}  // namespace

Wire wire_through(const std::string& name, const std::vector<Vec3>& points, double radius_m) {
    Wire wire;
    wire.name = name;
    wire.radius_m = radius_m;
    wire.shape = WirePath{{points.begin(), points.end()}};
    return wire;
}

Port port_on(const std::string& name, const std::string& wire, double gap_m, double at) {
    Port port;
    port.name = name;
    port.placement = OnWire{wire, at, gap_m};
    return port;
}

Model dipole(double length_m, double radius_m, double gap_m) {
    return one_wire(wire_through("dipole", {{0, 0, -length_m / 2}, {0, 0, length_m / 2}}, radius_m), gap_m, 0.5);
}

Model monopole(double height_m, double radius_m, double gap_m) {
    Model model = one_wire(wire_through("monopole", {{0, 0, 0}, {0, 0, height_m}}, radius_m), gap_m, 0);
    model.ground_plane_m = 0;
    return model;
}

Model wire_loop(double loop_radius_m, double wire_radius_m, double gap_m) {
    Wire wire;
    wire.name = "loop";
    wire.radius_m = wire_radius_m;
    wire.shape = WireCircle{{0, 0, 0}, loop_radius_m, {0, 0, 1}};
    return one_wire(std::move(wire), gap_m, 0);
}

Model rectangle_loop(double x_m, double y_m, double wire_radius_m, double gap_m) {
    const double x = x_m / 2, y = y_m / 2;
    return one_wire(
        wire_through("loop", {{x, 0, 0}, {x, y, 0}, {-x, y, 0}, {-x, -y, 0}, {x, -y, 0}, {x, 0, 0}}, wire_radius_m),
        gap_m, 0);
}

Model folded_dipole(double length_m, double spacing_m, double driven_radius_m, double other_radius_m, double gap_m,
                    bool both) {
    const double h = length_m / 2;
    Model model;
    model.wires = {wire_through("driven", {{0, 0, -h}, {0, 0, h}}, driven_radius_m),
                   wire_through("other", {{spacing_m, 0, -h}, {spacing_m, 0, h}}, other_radius_m),
                   wire_through("lower link", {{0, 0, -h}, {spacing_m, 0, -h}}, driven_radius_m),
                   wire_through("upper link", {{0, 0, h}, {spacing_m, 0, h}}, driven_radius_m)};
    model.ports = {port_on("feed", "driven", gap_m)};
    if (both) model.ports.push_back(port_on("other feed", "other", gap_m));
    return model;
}

WireSolution solve_wires(const Model& model, double frequency_hz, double cells_per_wavelength, double refine) {
    const Operator op(mesh_for(model, frequency_hz, cells_per_wavelength, refine), model.lumped);
    const SweepPoint point = solve_point(op, frequency_hz, false);
    return {point.admittance_s.inverse(), static_cast<int>(op.mesh().cells.size())};
}

WireResonance wire_resonance(const Model& model, double from_hz, double to_hz, double cells_per_wavelength) {
    const Operator op(mesh_for(model, to_hz, cells_per_wavelength, 1), model.lumped);
    const auto impedance = [&](double f) { return 1.0 / solve_point(op, f, false).admittance_s(0, 0); };
    const double f = bracketed_root([&](double x) { return impedance(x).imag(); }, from_hz, to_hz, 1e-6);
    return {f, impedance(f).real()};
}

}  // namespace annulet
