// Planned wires become nodes and cells.
#include <algorithm>
#include <cmath>
#include <map>
#include <tuple>

#include "mesh/wire_plan.hpp"

namespace annulet {

namespace {

std::size_t at(int i) {
    return static_cast<std::size_t>(i);
}

struct LineNode {
    double s_m = 0;
    int at_break = -1;
    int place = -1;  ///< of the stretch that begins here
};

/// All nodes of a wire in order; of a closed one the first is not repeated.
std::vector<LineNode> line_nodes(const PlannedWire& wire, const WirePlan& plan, double refine) {
    std::vector<LineNode> nodes;
    for (const WireStretch& stretch : wire.stretches) {
        const auto x = stretch_fractions(stretch, plan, refine);
        for (std::size_t i = 0; i + 1 < x.size(); ++i)
            nodes.push_back(
                {stretch.from_m + x[i] * stretch.length_m(), i == 0 ? stretch.from_break : -1, stretch.place});
    }
    if (!wire.curve.closed()) nodes.push_back({wire.stretches.back().to_m, wire.stretches.back().to_break, -1});
    return nodes;
}

/// By what to stretch the radius of the free nodes of an arc so that the chords keep its area:
/// sum r_i r_{i+1} sin(dphi_i) = R^2 sweep.
double area_stretch(const std::vector<double>& angle_rad, const std::vector<char>& fixed) {
    double both = 0, one = 0, none = 0, sweep = 0;
    for (std::size_t i = 0; i + 1 < angle_rad.size(); ++i) {
        const double step = angle_rad[i + 1] - angle_rad[i], s = std::sin(step);
        sweep += step;
        (fixed[i] && fixed[i + 1] ? none : fixed[i] || fixed[i + 1] ? one : both) += s;
    }
    if (both == 0) return one == 0 ? 1 : (sweep - none) / one;
    return (-one + std::sqrt(one * one + 4 * both * (sweep - none))) / (2 * both);
}

class Builder {
public:
    Builder(const Model& model, const WirePlan& plan, double refine, Mesh& mesh)
        : model_(model), plan_(plan), refine_(refine), mesh_(mesh), node_of_break_(plan.breaks.size(), -1) {}

    void build() {
        for (const PlannedWire& wire : plan_.wires) add_wire(wire);
        set_fields();
    }

private:
    Gap& gap_of(int place) {
        const auto index = at(place);
        return index < mesh_.ports.size() ? mesh_.ports[index] : mesh_.lumped[index - mesh_.ports.size()];
    }

    /// Wires of one material and radius are one conductor, apart from foil of the same material.
    int conductor(const Wire& wire) {
        const auto& c = wire.conductor;
        const auto key = std::tuple(c.name, c.conductivity_s_per_m, c.roughness_rms_m, wire.radius_m);
        const auto [found, fresh] = conductors_.try_emplace(key, static_cast<int>(mesh_.conductors.size()));
        if (fresh) mesh_.conductors.push_back(c);
        return found->second;
    }

    /// Stretch of each curved piece of the wire.
    std::vector<double> stretches(const PlannedWire& wire, const std::vector<LineNode>& nodes) const {
        std::vector<double> out;
        for (const auto& piece : wire.curve.pieces()) {
            std::vector<double> angles;
            std::vector<char> fixed;
            const double slack = 1e-9 * wire.curve.length_m(), turn = std::abs(piece.sweep_rad) / piece.length_m;
            for (const LineNode& node : nodes)
                if (node.s_m > piece.start_m - slack && node.s_m < piece.end_m() + slack)
                    push(node, turn, angles, fixed);
            const bool whole = wire.curve.closed() && wire.curve.pieces().size() == 1;
            if (whole) wrap(nodes, turn, angles, fixed, wire.curve.length_m());
            out.push_back(piece.straight ? 1 : area_stretch(angles, fixed));
        }
        return out;
    }

    void push(const LineNode& node, double turn, std::vector<double>& angles, std::vector<char>& fixed) const {
        angles.push_back(node.s_m * turn);
        fixed.push_back(node.at_break >= 0 && plan_.breaks[at(node.at_break)].fixed);
    }

    void wrap(const std::vector<LineNode>& nodes, double turn, std::vector<double>& angles, std::vector<char>& fixed,
              double length) const {
        angles.clear();
        fixed.clear();
        for (const LineNode& node : nodes) push(node, turn, angles, fixed);
        LineNode again = nodes.front();
        again.s_m += length;
        push(again, turn, angles, fixed);
    }

    int add_node(const PlannedWire& wire, const std::vector<double>& stretch, const LineNode& node) {
        if (node.at_break >= 0 && node_of_break_[at(node.at_break)] >= 0) return node_of_break_[at(node.at_break)];
        const double length = wire.curve.length_m();
        const double s = wire.curve.closed() && node.s_m >= length ? node.s_m - length : node.s_m;
        const std::size_t piece = wire.curve.piece_at(s);
        const bool fixed = node.at_break >= 0 && plan_.breaks[at(node.at_break)].fixed;
        mesh_.nodes.push_back(fixed ? plan_.breaks[at(node.at_break)].position
                                    : wire.curve.pieces()[piece].point(s, stretch[piece]));
        const int index = static_cast<int>(mesh_.nodes.size()) - 1;
        if (node.at_break >= 0) node_of_break_[at(node.at_break)] = index;
        return index;
    }

    void add_wire(const PlannedWire& planned) {
        const Wire& wire = model_.wires[at(planned.wire)];
        const auto line = line_nodes(planned, plan_, refine_);
        const auto stretch = stretches(planned, line);
        const int metal = conductor(wire);
        std::vector<int> nodes;
        for (const LineNode& node : line) nodes.push_back(add_node(planned, stretch, node));
        if (planned.curve.closed()) nodes.push_back(nodes.front());
        for (std::size_t i = 0; i + 1 < nodes.size(); ++i) {
            Cell cell;
            cell.kind = CellKind::segment;
            cell.node = {nodes[i], nodes[i + 1], -1, -1};
            cell.radius_m = wire.radius_m;
            cell.conductor = line[i].place >= 0 ? -1 : metal;
            mesh_.cells.push_back(cell);
            if (line[i].place < 0) continue;
            gap_of(line[i].place).members.push_back({static_cast<int>(mesh_.cells.size()) - 1, Vec3::Zero()});
            mine_[line[i].place] = true;
        }
    }

    /// The voltage of a gap drops evenly over its chords.
    void set_fields() {
        for (const auto& [place, unused] : mine_) {
            Gap& gap = gap_of(place);
            gap.length_m = 0;
            for (auto& member : gap.members) {
                const Cell& cell = mesh_.cells[at(member.cell)];
                const Vec3 along = mesh_.nodes[at(cell.node[1])] - mesh_.nodes[at(cell.node[0])];
                gap.length_m += along.norm();
                member.field_per_m = along.normalized();
            }
            for (auto& member : gap.members) member.field_per_m /= gap.length_m;
        }
    }

    const Model& model_;
    const WirePlan& plan_;
    double refine_;
    Mesh& mesh_;
    std::vector<int> node_of_break_;
    std::map<std::tuple<std::string, double, double, double>, int> conductors_;
    std::map<int, bool> mine_;
};

}  // namespace

void add_wires(const Model& model, const WirePlan& plan, double refine, Mesh& mesh) {
    Builder(model, plan, refine, mesh).build();
}

}  // namespace annulet
