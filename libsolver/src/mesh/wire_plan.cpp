#include "mesh/wire_plan.hpp"

#include <annulet/core/constants.hpp>

#include <algorithm>
#include <cmath>
#include <limits>
#include <optional>

#include "mesh/gaps.hpp"
#include "mesh/spacing.hpp"

namespace annulet {

namespace {

constexpr double infinity = std::numeric_limits<double>::infinity();
constexpr double widest_turn_rad = constants::pi / 16;  // 32 cells around a full circle
constexpr double fewest_cells_per_wire = 12;
constexpr double fewest_cells_per_gap = 4;
constexpr double open_end_share = 0.4;  // of a stretch: where cells shrink quadratically

std::size_t at(int i) {
    return static_cast<std::size_t>(i);
}

/// A gap on its wire, in arc length.
struct WireGap {
    int place = -1;
    double from_m = 0, to_m = 0;
};

class Planner {
public:
    Planner(const Model& model, const MeshOptions& options, MeshFaults& faults)
        : model_(model), faults_(faults), places_(places_of(model)) {
        if (options.top_frequency_hz > 0)
            wave_m_ = constants::c0_m_per_s / options.top_frequency_hz / options.cells_per_wavelength;
    }

    WirePlan planned() {
        for (std::size_t w = 0; w < model_.wires.size(); ++w)
            plan_.wires.push_back({static_cast<int>(w), WireCurve(model_.wires[w]), {}});
        for (const PlannedWire& wire : plan_.wires) check_bends(wire);
        gaps_.resize(plan_.wires.size());
        cuts_.resize(plan_.wires.size());
        for (std::size_t k = 0; k < places_.size(); ++k) place_gap(static_cast<int>(k));
        for (std::size_t w = 0; w < plan_.wires.size(); ++w) find_cuts(w);
        if (!faults_.empty()) return {};
        for (std::size_t w = 0; w < plan_.wires.size(); ++w) make_stretches(w);
        mark_open_ends();
        spread();
        return std::move(plan_);
    }

private:
    struct Cut {
        double s_m = 0;
        bool fixed = true;
    };

    const Wire& wire_of(std::size_t w) const { return model_.wires[w]; }
    double tolerance(std::size_t w) const { return 1e-9 + 1e-3 * wire_of(w).radius_m; }

    bool on_ground(const Vec3& p, std::size_t w) const {
        return model_.ground_plane_m && std::abs(p.z() - *model_.ground_plane_m) <= tolerance(w);
    }

    void check_bends(const PlannedWire& planned) {
        const Wire& wire = wire_of(at(planned.wire));
        for (const auto& piece : planned.curve.pieces())
            if (!piece.straight && piece.radius_m < 2 * wire.radius_m)
                faults_.add(wire.where,
                            fmt::format("wire '{}' of radius {} bends with a radius of {}: a bend must be at least "
                                        "twice the radius of the wire",
                                        wire.name, mm(wire.radius_m), mm(piece.radius_m)));
    }

    std::optional<std::size_t> find_wire(const std::string& name) const {
        for (std::size_t w = 0; w < model_.wires.size(); ++w)
            if (wire_of(w).name == name) return w;
        return std::nullopt;
    }

    void fault(const Place& place, std::string text, std::string help = {}) {
        faults_.add(place.where, place.what + " " + std::move(text), std::move(help));
    }

    void place_gap(int k) {
        const Place& place = places_[at(k)];
        const auto* on = std::get_if<OnWire>(&place.placement);
        if (on == nullptr) return;
        const auto w = find_wire(on->wire);
        if (!w) return fault(place, fmt::format("is on wire '{}', which does not exist", on->wire));
        if (!(on->gap_m > 0)) return fault(place, "has a gap of no length");
        const WireCurve& curve = plan_.wires[*w].curve;
        const double length = curve.length_m();
        if (on->gap_m >= length)
            return fault(place, fmt::format("has a gap of {}, longer than wire '{}' of {}", mm(on->gap_m), on->wire,
                                            mm(length)));
        WireGap gap{k, on->at * length - on->gap_m / 2, on->at * length + on->gap_m / 2};
        if (!curve.closed() && !fit(gap, *w, place)) return;
        if (curve.closed() && gap.from_m < 0) gap.from_m += length, gap.to_m += length;
        for (const WireGap& other : gaps_[*w]) {
            for (const double turn : {-length, 0.0, length})
                if (gap.from_m + turn < other.to_m && other.from_m < gap.to_m + turn && (turn == 0 || curve.closed()))
                    return fault(place, "overlaps the gap of " + places_[at(other.place)].what);
        }
        gaps_[*w].push_back(gap);
    }

    // A gap at a grounded end begins at the plane: there it is between the plane and the wire.
    bool fit(WireGap& gap, std::size_t w, const Place& place) {
        const WireCurve& curve = plan_.wires[w].curve;
        const double length = curve.length_m(), tiny = 1e-9 * length;
        const bool before = gap.from_m<-tiny, after = gap.to_m> length + tiny;
        if (before && on_ground(curve.point(0), w))
            gap = {gap.place, 0, gap.to_m - gap.from_m};
        else if (after && on_ground(curve.point(length), w))
            gap = {gap.place, length - (gap.to_m - gap.from_m), length};
        else if (before || after)
            return fault(place, fmt::format("has a gap that reaches beyond the end of wire '{}'", wire_of(w).name),
                         "move its center in by half the gap, or connect that end to the ground plane"),
                   false;
        return true;
    }

    /// Vertices, gap edges and the ends of other wires, in order.
    void find_cuts(std::size_t w) {
        const WireCurve& curve = plan_.wires[w].curve;
        const double length = curve.length_m();
        auto& cuts = cuts_[w];
        // A circle has no vertex: where it starts, a node may follow the others outward.
        const bool smooth = curve.closed() && curve.pieces().size() == 1;
        if (!smooth || gaps_[w].empty())
            for (const auto& piece : curve.pieces()) cuts.push_back({piece.start_m, !smooth});
        if (!curve.closed()) cuts.push_back({length});
        std::vector<double> joints;
        for (std::size_t v = 0; v < plan_.wires.size(); ++v) {
            const WireCurve& other = plan_.wires[v].curve;
            for (const double end : {0.0, other.length_m()}) {
                const Vec3 p = other.point(end);
                const double s = curve.nearest_m(p), near = std::min(tolerance(w), tolerance(v));
                if ((v == w && std::min(s, std::abs(length - s)) < near) || (curve.point(s) - p).norm() > near)
                    continue;
                joints.push_back(s);
            }
        }
        for (const double s : joints) cuts.push_back({s});
        for (const WireGap& gap : gaps_[w]) add_gap_edges(w, gap, joints);
        std::sort(cuts.begin(), cuts.end(), [](const Cut& a, const Cut& b) { return a.s_m < b.s_m; });
        merge(cuts, 1e-6 * wire_of(w).radius_m + 1e-9 * length, curve.closed() ? length : infinity);
    }

    void add_gap_edges(std::size_t w, const WireGap& gap, const std::vector<double>& joints) {
        const WireCurve& curve = plan_.wires[w].curve;
        const double length = curve.length_m();
        for (const double s : joints)
            for (const double turn : {0.0, length})
                if (s + turn > gap.from_m * (1 + 1e-9) && s + turn < gap.to_m * (1 - 1e-9) &&
                    (turn == 0 || curve.closed()))
                    return fault(places_[at(gap.place)],
                                 fmt::format("has a joint of wire '{}' inside its gap", wire_of(w).name),
                                 "move the gap away from the joint");
        for (const double s : {gap.from_m, gap.to_m})
            cuts_[w].push_back({curve.closed() ? std::fmod(s, length) : s, false});
    }

    static void merge(std::vector<Cut>& cuts, double near, double turn) {
        std::vector<Cut> kept;
        for (const Cut& cut : cuts) {
            if (!kept.empty() && cut.s_m - kept.back().s_m <= near)
                kept.back().fixed = kept.back().fixed || cut.fixed;
            else
                kept.push_back(cut);
        }
        if (kept.size() > 1 && kept.back().s_m > kept.front().s_m + turn - near) {
            kept.front().fixed = kept.front().fixed || kept.back().fixed;
            kept.pop_back();
        }
        cuts = std::move(kept);
    }

    int break_at(const Vec3& position, const Cut& cut, std::size_t w) {
        WireBreak next;
        next.position = position;
        next.fixed = cut.fixed;
        next.grounded = on_ground(position, w);
        next.h_m = infinity;
        if (next.grounded) next.position.z() = *model_.ground_plane_m;
        for (std::size_t b = 0; cut.fixed && b < plan_.breaks.size(); ++b)
            if (plan_.breaks[b].fixed && (plan_.breaks[b].position - next.position).norm() <= 2 * tolerance(w))
                return static_cast<int>(b);
        plan_.breaks.push_back(next);
        return static_cast<int>(plan_.breaks.size()) - 1;
    }

    int gap_of(std::size_t w, double middle_m) const {
        const double length = plan_.wires[w].curve.length_m();
        for (const WireGap& gap : gaps_[w])
            for (const double turn : {0.0, length, -length})
                if (middle_m + turn > gap.from_m && middle_m + turn < gap.to_m) return gap.place;
        return -1;
    }

    void make_stretches(std::size_t w) {
        PlannedWire& planned = plan_.wires[w];
        const auto& cuts = cuts_[w];
        std::vector<int> breaks;
        for (const Cut& cut : cuts) breaks.push_back(break_at(planned.curve.point(cut.s_m), cut, w));
        const std::size_t n = cuts.size(), count = planned.curve.closed() ? n : n - 1;
        for (std::size_t i = 0; i < count; ++i) {
            WireStretch stretch;
            stretch.from_m = cuts[i].s_m;
            stretch.to_m = i + 1 < n ? cuts[i + 1].s_m : cuts[0].s_m + planned.curve.length_m();
            stretch.from_break = breaks[i];
            stretch.to_break = breaks[(i + 1) % n];
            stretch.place = gap_of(w, 0.5 * (stretch.from_m + stretch.to_m));
            stretch.h_max_m = largest(planned.curve, stretch);
            planned.stretches.push_back(stretch);
        }
        for (auto& stretch : planned.stretches)
            if (stretch.place >= 0) set_gap_cells(planned, stretch);
    }

    double largest(const WireCurve& curve, const WireStretch& stretch) const {
        const auto& piece = curve.pieces()[curve.piece_at(
            std::fmod(0.5 * (stretch.from_m + stretch.to_m), curve.length_m() * (1 + 1e-12)))];
        double h = std::min(wave_m_, curve.length_m() / fewest_cells_per_wire);
        if (!piece.straight)
            h = std::min(h, std::hypot(piece.radius_m, piece.rise_m / piece.sweep_rad) * widest_turn_rad);
        return h;
    }

    // A vertex may divide a gap: its cells then are shared out by length.
    void set_gap_cells(const PlannedWire& planned, WireStretch& stretch) {
        double whole = 0;
        for (const auto& other : planned.stretches)
            if (other.place == stretch.place) whole += other.length_m();
        const double cells = std::max(fewest_cells_per_gap, std::ceil(whole / stretch.h_max_m));
        stretch.gap_cells = std::max(1.0, std::round(cells * stretch.length_m() / whole));
        const double h = stretch.length_m() / stretch.gap_cells;
        for (const int b : {stretch.from_break, stretch.to_break})
            plan_.breaks[at(b)].h_m = std::min(plan_.breaks[at(b)].h_m, h);
    }

    void mark_open_ends() {
        std::vector<int> sharers(plan_.breaks.size(), 0), wires(plan_.breaks.size(), 0);
        for (const auto& wire : plan_.wires)
            for (const auto& stretch : wire.stretches)
                ++sharers[at(stretch.from_break)], ++sharers[at(stretch.to_break)];
        for (const auto& wire : plan_.wires) {
            std::vector<char> met(plan_.breaks.size(), 0);
            for (const auto& stretch : wire.stretches)
                for (const int b : {stretch.from_break, stretch.to_break})
                    if (met[at(b)] == 0) met[at(b)] = 1, ++wires[at(b)];
        }
        for (std::size_t b = 0; b < plan_.breaks.size(); ++b) {
            plan_.breaks[b].open = sharers[b] == 1 && !plan_.breaks[b].grounded;
            plan_.breaks[b].joint = wires[b] > 1 || sharers[b] > 2;
        }
        for (auto& wire : plan_.wires)
            for (auto& stretch : wire.stretches) {
                stretch.open_from = plan_.breaks[at(stretch.from_break)].open && stretch.place < 0;
                stretch.open_to = plan_.breaks[at(stretch.to_break)].open && stretch.place < 0;
            }
    }

    static bool lower(double& h, double bound) {
        if (h <= bound) return false;
        h = bound;
        return true;
    }

    // Two cells at least on every stretch, and sizes that grow no faster than the field allows.
    void spread() {
        for (bool changed = true; changed;) {
            changed = false;
            for (const auto& wire : plan_.wires)
                for (const auto& stretch : wire.stretches) {
                    if (stretch.place >= 0) continue;
                    double &from = plan_.breaks[at(stretch.from_break)].h_m,
                           &to = plan_.breaks[at(stretch.to_break)].h_m;
                    const double most = std::min(stretch.h_max_m, stretch.length_m() / 2);
                    const double rise = SizeField::growth * stretch.length_m();
                    changed = lower(from, most) || changed;
                    changed = lower(to, most) || changed;
                    changed = lower(from, to + rise) || changed;
                    changed = lower(to, from + rise) || changed;
                }
        }
    }

    const Model& model_;
    MeshFaults& faults_;
    std::vector<Place> places_;
    double wave_m_ = infinity;
    WirePlan plan_;
    std::vector<std::vector<WireGap>> gaps_;
    std::vector<std::vector<Cut>> cuts_;
};

/// A stretch between two sizes, and what open ends take from it.
struct Zones {
    double open_from_m = 0, open_to_m = 0;
    double open_from_cells = 0, open_to_cells = 0;
    std::optional<SizeField> middle;
    double middle_cells = 0;
};

Zones zones(const WireStretch& stretch, const WirePlan& plan) {
    Zones z;
    const double length = stretch.length_m(), most = std::min(stretch.h_max_m, length / 2);
    z.open_from_m = stretch.open_from ? open_end_share * length : 0;
    z.open_to_m = stretch.open_to ? open_end_share * length : 0;
    double h_from = plan.breaks[at(stretch.from_break)].h_m, h_to = plan.breaks[at(stretch.to_break)].h_m;
    const double middle = length - z.open_from_m - z.open_to_m;
    if (stretch.open_from) h_from = std::min(most, stretch.open_to ? most : h_to + SizeField::growth * middle);
    if (stretch.open_to) h_to = std::min(most, stretch.open_from ? most : h_from + SizeField::growth * middle);
    // N(d) = n sqrt(d/D) cells of quadratic grading are 2D/n long where they end.
    z.open_from_cells = stretch.open_from ? whole_cells(2 * z.open_from_m / h_from) : 0;
    z.open_to_cells = stretch.open_to ? whole_cells(2 * z.open_to_m / h_to) : 0;
    z.middle.emplace(middle, h_from, h_to, most);
    z.middle_cells = whole_cells(z.middle->cells());
    return z;
}

}  // namespace

double WirePlan::cells(double refine) const {
    double sum = 0;
    for (const auto& wire : wires)
        for (const auto& stretch : wire.stretches) {
            if (stretch.place >= 0) {
                sum += refined_cells(stretch.gap_cells, refine);
                continue;
            }
            const Zones z = zones(stretch, *this);
            sum += refined_cells(z.middle_cells, refine);
            if (z.open_from_cells > 0) sum += refined_cells(z.open_from_cells, refine);
            if (z.open_to_cells > 0) sum += refined_cells(z.open_to_cells, refine);
        }
    return sum;
}

std::vector<double> stretch_fractions(const WireStretch& stretch, const WirePlan& plan, double refine) {
    std::vector<double> x{0};
    if (stretch.place >= 0) {
        const double n = refined_cells(stretch.gap_cells, refine);
        for (double i = 1; i <= n; ++i) x.push_back(i / n);
        return x;
    }
    const Zones z = zones(stretch, plan);
    const double length = stretch.length_m();
    const double before = z.open_from_cells > 0 ? refined_cells(z.open_from_cells, refine) : 0;
    const double after = z.open_to_cells > 0 ? refined_cells(z.open_to_cells, refine) : 0;
    const double middle = refined_cells(z.middle_cells, refine);
    for (double i = 1; i <= before; ++i) x.push_back(z.open_from_m * std::pow(i / before, 2) / length);
    for (double i = 1; i <= middle; ++i)
        x.push_back((z.open_from_m + z.middle->position_m(z.middle->cells() * i / middle)) / length);
    for (double i = after - 1; i >= 0; --i) x.push_back(1 - z.open_to_m * std::pow(i / after, 2) / length);
    x.back() = 1;
    return x;
}

WirePlan plan_wires(const Model& model, const MeshOptions& options, MeshFaults& faults) {
    return Planner(model, options, faults).planned();
}

}  // namespace annulet
