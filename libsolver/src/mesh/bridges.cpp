// Bridges: short strips over a gap between two ends of metal.
#include "mesh/bridges.hpp"

#include <algorithm>
#include <cmath>
#include <optional>

namespace annulet {

namespace {

constexpr double snap_fraction = 0.01;  // of the width: a bridge edge this near to the metal's is on it

class BridgePlacer {
public:
    BridgePlacer(const Model& model, const Layout& layout, int place, const Place& drawn, const Bridge& bridge,
                 MeshFaults& faults)
        : model_(model),
          layout_(layout),
          place_(place),
          drawn_(drawn),
          bridge_(bridge),
          faults_(faults),
          a_(bridge.from.head<2>()),
          b_(bridge.to.head<2>()) {}

    bool on_side() const { return on_side_; }

    std::optional<Span> placed() {
        if (!sound()) return std::nullopt;
        const double length = (b_ - a_).norm(), tolerance = 1e-6 + 1e-3 * length;
        const Survey survey(model_, layout_.pieces, bridge_.from.z(), a_, b_, 2 * tolerance);
        if (!ends_on_metal(survey, tolerance)) return std::nullopt;
        const Survey::Stretch* gap = only_gap(survey);
        return gap == nullptr ? std::nullopt : span_over(*gap);
    }

private:
    std::nullopt_t fault(const std::string& text, std::string help = {}) {
        faults_.add(drawn_.where, drawn_.what + " " + text, std::move(help));
        return std::nullopt;
    }

    bool sound() {
        if (!bridge_.from.allFinite() || !bridge_.to.allFinite() || !std::isfinite(bridge_.width_m))
            return fault("has a bridge with a number that is not finite"), false;
        if (std::abs(bridge_.from.z() - bridge_.to.z()) > 1e-9)
            return fault("bridges two planes, which is not yet meshed"), false;
        if ((b_ - a_).norm() < 1e-9) return fault("has no length: both ends of its bridge are at " + mm(a_)), false;
        if (bridge_.width_m <= 0)
            return fault("has a bridge of width " + mm(bridge_.width_m) + ", which is not positive"), false;
        return true;
    }

    bool ends_on_metal(const Survey& survey, double tolerance) {
        if (!survey.any_metal())
            return fault("touches no metal: there is none on its plane at height " + mm(bridge_.from.z())), false;
        for (const bool start : {true, false}) {
            const Vec2& end = start ? a_ : b_;
            const double distance = survey.distance_to_edge(end);
            if (distance <= tolerance || survey.piece_at(end) >= 0) continue;
            fault(fmt::format("touches no metal: its bridge {} at {}, {} from the nearest edge",
                              start ? "starts" : "ends", mm(end), mm(distance)),
                  "let both ends of the bridge lie on the edges of the gap, or somewhat inside the metal");
            return false;
        }
        return true;
    }

    const Survey::Stretch* only_gap(const Survey& survey) {
        const auto& stretches = survey.stretches();
        const Survey::Stretch* gap = nullptr;
        for (const Survey::Stretch& stretch : stretches) {
            if (stretch.piece >= 0) continue;
            if (&stretch == &stretches.front() || &stretch == &stretches.back()) {
                const bool start = &stretch == &stretches.front();
                fault(fmt::format("{} on an edge with no metal beyond, at {}: its bridge crosses no gap there",
                                  start ? "starts" : "ends", mm(start ? a_ : b_)));
                return nullptr;
            }
            if (gap != nullptr) {
                fault("spans more than one gap of the metal");
                return nullptr;
            }
            gap = &stretch;
        }
        if (gap == nullptr)
            fault("lies on unbroken metal: its bridge is shorted",
                  "break the metal there with a cut, or draw it with across and gap");
        return gap;
    }

    std::optional<Span> span_over(const Survey::Stretch& gap) {
        const auto is_end = [](Piece::Side side) { return side == Piece::Side::start || side == Piece::Side::end; };
        if (gap.before->piece == gap.after->piece && gap.before->side == gap.after->side)
            return fault("has both ends of its bridge on the same edge of the metal");
        on_side_ = !is_end(gap.before->side) || !is_end(gap.after->side);
        if (on_side_)
            return fault("lands on the side of a strip, which is not yet meshed", "let it bridge two ends of strip");
        Span span;
        span.place = place_;
        span.direction = (b_ - a_).normalized();
        span.length_m = gap.to_m - gap.from_m;
        span.width_m = bridge_.width_m;
        const auto from = landing(*gap.before);
        if (!from) return std::nullopt;
        const auto to = landing(*gap.after);
        if (!to) return std::nullopt;
        span.from = *from;
        span.to = *to;
        const auto full = [](const Landing& end) { return std::abs(end.tau_a) == 1 && std::abs(end.tau_b) == 1; };
        span.full_width = full(span.from) && full(span.to);
        return span;
    }

    // Where the two edges of the bridge meet the end of the metal.
    std::optional<Landing> landing(const Survey::Crossing& crossing) {
        Landing end;
        end.piece = crossing.piece;
        end.at_end = crossing.side == Piece::Side::end;
        const Piece& piece = layout_.pieces[static_cast<std::size_t>(end.piece)];
        const Vec2 across = left_of((b_ - a_).normalized());
        const auto offset = [&](double tau) { return (piece.front_point(end.at_end, tau) - a_).dot(across); };
        const double right = std::min(offset(-1), offset(1)), left = std::max(offset(-1), offset(1));
        const double half = 0.5 * bridge_.width_m, snap = snap_fraction * piece.ribbon->narrowest_m();
        const double beyond = std::max(right + half, half - left);
        if (left - right < snap) return fault("runs along the end of a strip instead of away from it");
        // Drawn as wide as the metal, at the middle of its centre line: on a bent strip the chord sits a little off.
        const bool whole = std::abs(left - right - bridge_.width_m) < 2 * snap && std::abs(left + right) < 10 * snap;
        if (beyond > snap && !whole)
            return fault(fmt::format(
                "is wider than the metal: its bridge of {} reaches {} beyond the edge of metal '{}'",
                mm(bridge_.width_m), mm(beyond), model_.metals[static_cast<std::size_t>(piece.metal)].name));
        const double turn = offset(1) > offset(-1) ? 1 : -1;
        end.tau_a = whole || -half < right + snap ? -turn : solve(offset, -half, turn);
        end.tau_b = whole || half > left - snap ? turn : solve(offset, half, turn);
        return end;
    }

    template <class Function>
    static double solve(const Function& offset, double wanted, double turn) {
        double low = -1, high = 1;
        for (int halving = 0; halving < 60 && high - low > 1e-16; ++halving) {
            const double mid = 0.5 * (low + high);
            (turn * (offset(mid) - wanted) < 0 ? low : high) = mid;
        }
        return 0.5 * (low + high);
    }

    const Model& model_;
    const Layout& layout_;
    int place_;
    const Place& drawn_;
    const Bridge& bridge_;
    MeshFaults& faults_;
    Vec2 a_, b_;
    bool on_side_ = false;
};

}  // namespace

bool lands_on_side(const Model& model, const Layout& layout, const Place& drawn, const Bridge& bridge) {
    MeshFaults unused;
    BridgePlacer placer(model, layout, 0, drawn, bridge, unused);
    placer.placed();
    return placer.on_side();
}

std::optional<Span> place_bridge(const Model& model, const Layout& layout, int place, const Place& drawn,
                                 const Bridge& bridge, MeshFaults& faults) {
    return BridgePlacer(model, layout, place, drawn, bridge, faults).placed();
}

}  // namespace annulet
