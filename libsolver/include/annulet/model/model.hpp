// What the user drew, as numbers: SI units throughout. `evaluate` in drawing.hpp makes it from a `Drawing`.
#pragma once

#include <annulet/core/diagnostics.hpp>
#include <annulet/core/vec3.hpp>
#include <annulet/geometry/shapes.hpp>

#include <limits>
#include <map>
#include <optional>
#include <string>
#include <utility>
#include <variant>
#include <vector>

namespace annulet {

/// Conductivity in S/m; infinite means a perfect conductor.
struct Conductor {
    std::string name = "copper";
    double conductivity_s_per_m = std::numeric_limits<double>::infinity();
    double thickness_m = 0;  ///< foil thickness; 0 for wires
    double roughness_rms_m = 0;
    bool perfect() const { return conductivity_s_per_m == std::numeric_limits<double>::infinity(); }
};

struct Band {
    double from_hz = 0;
    double to_hz = 0;
};

struct PermittivityPoint {
    double frequency_hz = 0;
    double permittivity = 1;
};

/// `around`: the outline follows the named metal at a margin.
struct AroundMetal {
    std::string metal;
    double margin_m = 0;
};

struct Laminate {
    std::string name;
    double top_m = 0;  ///< height of the upper face
    double thickness_m = 0;
    std::vector<PermittivityPoint> permittivity;  ///< one entry: the causal model through it
    double loss_tangent = 0;
    std::optional<double> permittivity_z;  ///< anisotropic: normal component; `permittivity` is in-plane
    std::variant<Shape, AroundMetal> outline;
    std::vector<Shape> openings;
    Position where;
    double bottom_m() const { return top_m - thickness_m; }
};

struct Metal {
    std::string name;
    double plane_m = 0;
    bool cut = false;  ///< takes away the metal listed before it on its plane
    Shape shape;
    Conductor conductor;
    Position where;
};

struct Via {
    std::string name;
    Vec2 at{0, 0};
    double diameter_m = 0;
    double from_m = 0;
    double to_m = 0;
    Position where;
};

/// Centre line of a wire in space: straight pieces; arcs, circles and helices keep their kind for the mesher.
struct WireArc {
    Vec3 centre{0, 0, 0};
    Vec3 normal{0, 0, 1};
    double sweep_rad = 0;
};
struct WirePath {
    std::vector<std::variant<Vec3, WireArc>> pieces;  ///< begins with a point
};
struct WireCircle {
    Vec3 centre{0, 0, 0};
    double radius_m = 0;
    Vec3 normal{0, 0, 1};
};
struct WireHelix {
    Vec3 centre{0, 0, 0};
    double radius_m = 0;
    double pitch_m = 0;
    double turns = 0;
    Vec3 axis{0, 0, 1};
};
struct Wire {
    std::string name;
    double radius_m = 0;
    std::variant<WirePath, WireCircle, WireHelix> shape;
    Conductor conductor;
    Position where;
};

/// A short strip across a real gap in the metal; ends in space (they may lie on two faces of a sheet).
struct Bridge {
    Vec3 from{0, 0, 0};
    Vec3 to{0, 0, 0};
    double width_m = 0;
};
/// A slit through continuous metal, of length `gap_m` along the current, drawn from edge to edge.
struct Across {
    Vec3 from{0, 0, 0};
    Vec3 to{0, 0, 0};
    double gap_m = 0;
};
/// Part of a wire: centred at the fraction `at` of its length.
struct OnWire {
    std::string wire;
    double at = 0.5;
    double gap_m = 0;
};
using Placement = std::variant<Bridge, Across, OnWire>;

struct FeedLine {
    double impedance_ohm = 50;
    double length_m = 0;
    double velocity_factor = 1;
};

struct Port {
    std::string name;
    Placement placement;
    double reference_ohm = 50;
    std::optional<FeedLine> line;
    Position where;
};

/// Series R, L, C; absent ones do not count. With all absent it is a short.
struct Lumped {
    std::string name;
    Placement placement;
    std::optional<double> resistance_ohm;
    std::optional<double> inductance_h;
    std::optional<double> capacitance_f;
    std::optional<double> quality;
    double quality_at_hz = 0;
    std::optional<double> self_resonance_hz;
    Position where;
};

struct RejectBand {
    std::string name;
    Band band;
};

struct Goal {
    std::optional<Band> band;
    double vswr = 2.0;
    std::vector<RejectBand> reject;
    Position where;
};

struct Transmit {
    double power_w = 0;
    double duty = 1;
};

/// What "without it" means: parameters set anew and items left out.
struct Feature {
    std::string name;
    std::map<std::string, std::string> set;  ///< parameter name to the text of its value
    std::vector<std::string> omit;
    Position where;
};

struct SweepRange {
    double from_hz = 0;
    double to_hz = 0;
    int points = 0;
    std::vector<double> at_hz;  ///< when not empty, these single frequencies instead
};

struct Fabrication {
    std::optional<double> minimum_slot_m;
    std::optional<double> minimum_web_m;
    std::optional<double> tool_radius_m;
    std::optional<double> etch_m;  ///< tolerances
    std::optional<double> rout_m;
    std::optional<double> thickness_fraction;
    std::optional<double> permittivity_fraction;
};

enum class LaminateMethod { full, fixed_static };

struct Accuracy {
    std::optional<double> resonance_fraction;
    LaminateMethod laminate = LaminateMethod::full;
    int layers = 2;  ///< cells through a sheet
    std::optional<double> cells_per_wavelength;
    std::optional<int> cells_across;
};

struct Model {
    std::string title;
    std::string file;                             ///< as named by the user, for messages
    std::map<std::string, double> parameters_si;  ///< evaluated, SI
    std::vector<Laminate> laminates;
    std::vector<Metal> metals;  ///< in list order: cuts act on what stands before
    std::vector<Via> vias;
    std::vector<Wire> wires;
    std::vector<Port> ports;
    std::vector<Lumped> lumped;
    std::vector<Feature> features;
    std::optional<double> ground_plane_m;
    Goal goal;
    std::optional<Transmit> transmit;
    SweepRange sweep;
    Fabrication fabrication;
    Accuracy accuracy;
};

}  // namespace annulet
