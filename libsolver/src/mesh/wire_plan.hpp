// The wires of a model cut at their vertices, joints and gaps, with the size of the cells in between.
#pragma once

#include <annulet/mesh/mesh.hpp>

#include <vector>

#include "mesh/faults.hpp"
#include "mesh/wire_curve.hpp"

namespace annulet {

/// From one break of a wire to the next.
struct WireStretch {
    double from_m = 0, to_m = 0;  ///< arc length; may exceed the length of a closed wire by one turn
    int from_break = -1, to_break = -1;
    int place = -1;  ///< port (or part, counted on) whose gap this is
    double h_max_m = 0;
    double gap_cells = 0;
    bool open_from = false, open_to = false;

    double length_m() const { return to_m - from_m; }
};

/// A point where a node must lie: end, corner, joint or edge of a gap. Breaks at one place are one break.
struct WireBreak {
    Vec3 position{0, 0, 0};
    bool fixed = true;   ///< false: edge of a gap, which on an arc moves with it
    bool open = false;   ///< end of one wire, joined to nothing
    bool joint = false;  ///< of several wires, or of one with itself
    bool grounded = false;
    double h_m = 0;  ///< size of the cells beside it
};

struct PlannedWire {
    int wire = -1;  ///< index into Model::wires
    WireCurve curve;
    std::vector<WireStretch> stretches;
};

struct WirePlan {
    std::vector<PlannedWire> wires;
    std::vector<WireBreak> breaks;

    /// Number of cells; unknowns are about as many.
    double cells(double refine) const;
};

/// Lengths from 0 to 1 of the nodes of a stretch, ends included: equal steps in a gap; graded geometrically away from
/// a gap, a corner or a joint, and quadratically toward an open end, where the current goes as the root of the
/// distance.
std::vector<double> stretch_fractions(const WireStretch& stretch, const WirePlan& plan, double refine);

/// Faults: gaps that do not fit, ends and arcs too tight for the wire.
WirePlan plan_wires(const Model& model, const MeshOptions& options, MeshFaults& faults);

/// Nodes, cells and members of the gaps. Arcs become chords that keep the area inside them: a loop keeps its
/// inductance to second order better than by keeping its length.
void add_wires(const Model& model, const WirePlan& plan, double refine, Mesh& mesh);

}  // namespace annulet
