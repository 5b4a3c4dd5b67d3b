#include "mesh/layout.hpp"

#include <algorithm>
#include <annulet/core/constants.hpp>
#include <cmath>
#include <limits>

namespace annulet {

namespace {

using SAt = std::function<double(double)>;

SAt constant(double s) {
    return [s](double) { return s; };
}

SAt shifted(SAt f, double by) {
    if (by == 0) return f;
    return [f = std::move(f), by](double tau) { return f(tau) + by; };
}

// How the order of two fronts comes out over the width.
enum class Order { before, crossing, after };

Order order(const Front& a, const Front& b, double margin) {
    bool before = true, after = true;
    for (const double tau : probe_taus()) {
        const double gap = b.s_m(tau) - a.s_m(tau);
        before = before && gap > margin;
        after = after && gap <= margin;
    }
    return before ? Order::before : after ? Order::after : Order::crossing;
}

double margin_of(const Ribbon& ribbon) {
    return 1e-6 * ribbon.narrowest_m();
}

// A smooth joint this near to another front is not worth a row of cells.
double joint_margin(const Ribbon& ribbon, const Front& joint) {
    return joint.sharp ? margin_of(ribbon) : smooth_joint_margin * ribbon.narrowest_m();
}

// Stretches taken away from a strip, overlapping ones merged, in order.
struct Removed {
    SAt enter, exit;
    bool from_start, to_end;
};

void merge(std::vector<Removed>& removed) {
    std::sort(removed.begin(), removed.end(),
              [](const Removed& a, const Removed& b) { return a.enter(0) < b.enter(0); });
    std::vector<Removed> merged;
    for (Removed& next : removed) {
        if (merged.empty() || next.enter(0) > merged.back().exit(0)) {
            merged.push_back(std::move(next));
            continue;
        }
        Removed& last = merged.back();
        last.enter = [a = last.enter, b = next.enter](double tau) { return std::min(a(tau), b(tau)); };
        last.exit = [a = last.exit, b = next.exit](double tau) { return std::max(a(tau), b(tau)); };
        last.from_start = last.from_start || next.from_start;
        last.to_end = last.to_end || next.to_end;
    }
    removed = std::move(merged);
}

class Divider {
public:
    Divider(const Model& model, std::size_t metal, std::shared_ptr<const Ribbon> ribbon, MeshFaults& faults)
        : model_(model), metal_(metal), ribbon_(std::move(ribbon)), faults_(faults) {}

    void divide(std::vector<Piece>& pieces) {
        for (std::size_t k = metal_ + 1; k < model_.metals.size(); ++k)
            if (model_.metals[k].cut && !gone_) take_away(model_.metals[k]);
        if (gone_) return;
        merge(removed_);
        if (removed_.empty())
            whole(pieces);
        else if (ribbon_->closed())
            between_cuts_of_loop(pieces);
        else
            between_cuts_of_line(pieces);
    }

private:
    void take_away(const Metal& cut) {
        const Metal& metal = model_.metals[metal_];
        if (std::abs(cut.plane_m - metal.plane_m) > 1e-9 || !flaw(cut.shape).empty()) return;
        const Crossings crossings = find_crossings(ribbon_, std::make_shared<const Region>(cut.shape));
        if (crossings.kind == Crossing::everything) gone_ = true;
        if (crossings.kind == Crossing::partial)
            faults_.add(
                cut.where,
                fmt::format("cut '{}' does not cross metal '{}' from edge to edge: a notch or hole is not yet meshed",
                            cut.name, metal.name),
                "let the cut reach beyond both edges of the strip");
        for (const Track& track : crossings.tracks)
            removed_.push_back({[track](double tau) { return track.enter_s_m(tau); },
                                [track](double tau) { return track.exit_s_m(tau); }, track.from_start(),
                                track.to_end()});
    }

    Piece empty_piece() const {
        Piece piece;
        piece.metal = static_cast<int>(metal_);
        piece.ribbon = ribbon_;
        return piece;
    }

    void whole(std::vector<Piece>& pieces) const {
        Piece piece = empty_piece();
        piece.loop = ribbon_->closed();
        if (!piece.loop)
            piece.fronts = {Front{Front::Kind::free_end, constant(0)},
                            Front{Front::Kind::free_end, constant(ribbon_->length_m())}};
        pieces.push_back(std::move(piece));
    }

    Front cut_end(SAt s, double opening) const {
        Front front{Front::Kind::cut_end, std::move(s)};
        front.opening_m = opening;
        return front;
    }

    void between_cuts_of_loop(std::vector<Piece>& pieces) const {
        for (std::size_t k = 0; k < removed_.size(); ++k) {
            const bool last = k + 1 == removed_.size();
            const Removed &from = removed_[k], &to = removed_[last ? 0 : k + 1];
            add(pieces, cut_end(from.exit, from.exit(0) - from.enter(0)),
                cut_end(shifted(to.enter, last ? ribbon_->length_m() : 0), to.exit(0) - to.enter(0)));
        }
    }

    void between_cuts_of_line(std::vector<Piece>& pieces) const {
        Front from{Front::Kind::free_end, constant(0)};
        for (const Removed& removed : removed_) {
            const double opening = removed.exit(0) - removed.enter(0);
            if (!removed.from_start) add(pieces, from, cut_end(removed.enter, opening));
            from = cut_end(removed.exit, opening);
        }
        if (!removed_.back().to_end) add(pieces, from, Front{Front::Kind::free_end, constant(ribbon_->length_m())});
    }

    void add(std::vector<Piece>& pieces, Front from, Front to) const {
        const Order ordered = order(from, to, margin_of(*ribbon_));
        if (ordered == Order::after) return;
        const Metal& metal = model_.metals[metal_];
        if (ordered == Order::crossing) {
            faults_.add(
                metal.where,
                fmt::format("metal '{}' is left with a wedge between two cuts, which is not yet meshed", metal.name),
                "let the cuts overlap fully or not at all");
            return;
        }
        Piece piece = empty_piece();
        piece.fronts = {std::move(from), std::move(to)};
        pieces.push_back(std::move(piece));
    }

    const Model& model_;
    std::size_t metal_;
    std::shared_ptr<const Ribbon> ribbon_;
    MeshFaults& faults_;
    std::vector<Removed> removed_;
    bool gone_ = false;
};

std::vector<Front> joints_of(const Piece& piece) {
    const Ribbon& ribbon = *piece.ribbon;
    const auto& parts = ribbon.centre().pieces();
    std::vector<Front> joints;
    for (std::size_t k = 0; k < parts.size(); ++k) {
        if (k == 0 && !(ribbon.closed() && ribbon.has_seam())) continue;
        for (const double turn : {0.0, ribbon.length_m()}) {
            if (turn > 0 && (!ribbon.closed() || piece.loop)) continue;
            Front joint{Front::Kind::joint, constant(parts[k].start_m + turn)};
            joint.sharp = ribbon.kinked(k);
            joints.push_back(std::move(joint));
        }
    }
    return joints;
}

// A loop's slit may straddle the start; its fronts then lie beyond the length and so does what joints it crosses.
bool in_slit(const Piece& piece, const Front& joint, bool& crossed) {
    const double margin = margin_of(*piece.ribbon), length = piece.ribbon->length_m();
    for (std::size_t i = 0; i + 1 < piece.fronts.size(); ++i) {
        const Front &a = piece.fronts[i], &b = piece.fronts[i + 1];
        if (a.slit < 0 || a.slit != b.slit) continue;
        for (const double turn : {0.0, length, -length}) {
            if (turn != 0 && !piece.loop) continue;
            const Front moved{Front::Kind::joint, shifted(joint.s_m, turn)};
            if (order(a, moved, margin) != Order::after && order(moved, b, margin) != Order::after)
                return crossed = true;
        }
    }
    return false;
}

bool fits(const Piece& piece, const Front& joint, bool& crossed) {
    const double margin = joint_margin(*piece.ribbon, joint);
    if (in_slit(piece, joint, crossed)) return false;
    for (std::size_t i = 0; i < piece.fronts.size(); ++i) {
        const Front& front = piece.fronts[i];
        const Order forward = order(front, joint, margin), backward = order(joint, front, margin);
        if (forward != Order::before && backward != Order::before) crossed = true;
        const bool end = !piece.loop && (i == 0 || i + 1 == piece.fronts.size());
        if (end && (i == 0 ? forward : backward) != Order::before) return false;
    }
    return !crossed;
}

void sort_fronts(Piece& piece) {
    std::stable_sort(piece.fronts.begin(), piece.fronts.end(),
                     [](const Front& a, const Front& b) { return a.s_m(0) < b.s_m(0); });
}

}  // namespace

ConductorKind classify(const Shape& shape) {
    return ribbon_of(shape) ? ConductorKind::strip_like : ConductorKind::general;
}

std::vector<Piece> lay_out_metal(const Model& model, MeshFaults& faults, const std::vector<bool>& general) {
    std::vector<Piece> pieces;
    for (std::size_t k = 0; k < model.metals.size(); ++k) {
        const Metal& metal = model.metals[k];
        const std::string what = fmt::format("{} '{}'", metal.cut ? "cut" : "metal", metal.name);
        if (std::string text = flaw(metal.shape); !text.empty()) {
            faults.add(metal.where, what + " " + text);
            continue;
        }
        if (metal.cut || (!general.empty() && general[k])) continue;
        if (classify(metal.shape) == ConductorKind::general) {
            faults.add(metal.where, what + " is not a strip: polygons and discs as metal are not yet meshed",
                       "draw it as a ring, a path, a rectangle or a sector with a hole");
            continue;
        }
        Divider(model, k, std::make_shared<const Ribbon>(*ribbon_of(metal.shape)), faults).divide(pieces);
    }
    for (Piece& piece : pieces) set_outline(piece);
    return pieces;
}

namespace {

// The slit of the piece within which the stretch from a to b lies, or -1.
int slit_around(const Piece& piece, const Front& a, const Front& b) {
    const double margin = margin_of(*piece.ribbon), length = piece.ribbon->length_m();
    for (std::size_t i = 0; i < piece.fronts.size(); ++i) {
        if (!piece.fronts[i].enters_slit) continue;
        const bool wraps = i + 1 == piece.fronts.size();
        for (const double turn : {0.0, length, -length}) {
            if (turn != 0 && !piece.loop) continue;
            const Front enter{Front::Kind::slit_side, shifted(piece.fronts[i].s_m, turn)};
            const Front exit{Front::Kind::slit_side,
                             shifted(piece.fronts[wraps ? 0 : i + 1].s_m, turn + (wraps ? length : 0))};
            if (order(enter, a, margin) == Order::before && order(b, exit, margin) == Order::before)
                return piece.fronts[i].slit;
        }
    }
    return -1;
}

}  // namespace

Obstacle insert_slit(Piece& piece, const Track& track, int slit) {
    if (track.from_start() || track.to_end()) return {Obstacle::Kind::end, -1};
    const double margin = margin_of(*piece.ribbon), length = piece.ribbon->length_m();
    Front a{Front::Kind::slit_side, [track](double tau) { return track.enter_s_m(tau); }};
    Front b{Front::Kind::slit_side, [track](double tau) { return track.exit_s_m(tau); }};
    a.slit = b.slit = slit;
    a.enters_slit = true;
    if (!piece.loop && piece.ribbon->closed() && order(piece.fronts.front(), a, margin) != Order::before)
        a.s_m = shifted(a.s_m, length), b.s_m = shifted(b.s_m, length);
    if (const int around = slit_around(piece, a, b); around >= 0) return {Obstacle::Kind::slit, around};
    // On a loop every turn of the other fronts must stay out of the slit.
    const std::vector<double> turns = piece.loop ? std::vector{0.0, length, -length} : std::vector{0.0};
    for (std::size_t i = 0; i < piece.fronts.size(); ++i) {
        const Front& front = piece.fronts[i];
        const bool first = !piece.loop && i == 0, last = !piece.loop && i + 1 == piece.fronts.size();
        for (const double turn : turns) {
            const Front moved{front.kind, shifted(front.s_m, turn)};
            const bool before = order(moved, a, margin) == Order::before,
                       after = order(b, moved, margin) == Order::before;
            if ((before && !last) || (after && !first)) continue;
            return {front.slit >= 0 ? Obstacle::Kind::slit : Obstacle::Kind::end, front.slit};
        }
    }
    piece.fronts.push_back(std::move(a));
    piece.fronts.push_back(std::move(b));
    sort_fronts(piece);
    return {};
}

bool insert_sheet_edge(Piece& piece, std::function<double(double)> s_m) {
    const double near = smooth_joint_margin * piece.ribbon->narrowest_m(), length = piece.ribbon->length_m();
    const auto shares_place = [&](const Front& a, const Front& b) {
        const auto taus = probe_taus();
        return std::all_of(taus.begin(), taus.end(),
                           [&](double tau) { return std::abs(a.s_m(tau) - b.s_m(tau)) < near; });
    };
    for (const double turn : {0.0, length, -length}) {
        if (turn != 0 && !piece.ribbon->closed()) continue;
        Front edge{Front::Kind::sheet_edge, shifted(s_m, turn)};
        bool known = false, inside_slit = false;
        std::size_t before = 0, after = 0;
        for (std::size_t i = 0; i < piece.fronts.size(); ++i) {
            const Front& front = piece.fronts[i];
            known = known || shares_place(front, edge);
            const bool ahead = order(front, edge, near) == Order::before;
            before += ahead ? 1 : 0;
            after += order(edge, front, near) == Order::before ? 1 : 0;
            inside_slit = ahead ? front.enters_slit : inside_slit;
        }
        if (known) return true;
        const bool beyond = !piece.loop && (before == 0 || after == 0) && before + after == piece.fronts.size();
        if (beyond || (piece.loop && turn != 0)) continue;
        if (before + after != piece.fronts.size() || inside_slit) return false;
        piece.fronts.push_back(std::move(edge));
        sort_fronts(piece);
        return true;
    }
    return true;
}

void finish_fronts(Piece& piece, const Model& model, MeshFaults& faults) {
    const Metal& metal = model.metals[static_cast<std::size_t>(piece.metal)];
    std::vector<Front> kept;
    for (Front& joint : joints_of(piece)) {
        bool crossed = false;
        if (fits(piece, joint, crossed)) kept.push_back(joint);
        if (crossed && joint.sharp)
            faults.add(
                metal.where,
                fmt::format("metal '{}' is cut or slit across its corner at {}, which is not yet meshed", metal.name,
                            mm(piece.ribbon->centre().point(std::fmod(joint.s_m(0), piece.ribbon->length_m())))),
                "move the cut or port away from the corner");
    }
    piece.fronts.insert(piece.fronts.end(), std::make_move_iterator(kept.begin()), std::make_move_iterator(kept.end()));
    sort_fronts(piece);
    piece.block_slit.assign(piece.blocks(), -1);
    for (std::size_t k = 0; k < std::min(piece.blocks(), piece.fronts.size()); ++k)
        if (piece.fronts[k].enters_slit) piece.block_slit[k] = piece.fronts[k].slit;
}

}  // namespace annulet
