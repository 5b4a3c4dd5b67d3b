// What must not touch: pieces of metal elsewhere than at joined ends, ports and parts among themselves.
#include <algorithm>
#include <cmath>
#include <set>
#include <utility>

#include "mesh/gaps.hpp"

namespace annulet {

namespace {

constexpr double grain_m = 1e-9;

double perimeter(const std::vector<Loop>& loops) {
    double sum = 0;
    for (const Loop& loop : loops)
        for (std::size_t i = 0; i < loop.size(); ++i) sum += (loop[(i + 1) % loop.size()] - loop[i]).norm();
    return sum;
}

double area(const std::vector<Loop>& loops) {
    double sum = 0;
    for (const Loop& loop : loops) sum += signed_area(loop);
    return sum;
}

// Area counted more than once, above the rounding of the union and of edges shared by neighbours.
bool overlaps(const std::vector<Loop>& loops, double narrowest_m) {
    const double excess = area(loops) - union_area(loops, grain_m);
    return excess > 8 * grain_m * perimeter(loops) + 1e-6 * narrowest_m * narrowest_m;
}

bool touches(const std::vector<Loop>& a, const std::vector<Loop>& b, const Box& box_b, double within) {
    for (const Loop& loop : a)
        for (const Vec2& p : loop) {
            if (apart({p, p}, box_b, within)) continue;
            if (inside(b, p) || distance_to(b, p) <= within) return true;
        }
    return false;
}

class ContactCheck {
public:
    ContactCheck(const Model& model, const Layout& layout, MeshFaults& faults)
        : model_(model), layout_(layout), faults_(faults), places_(places_of(model)) {
        for (const Piece& piece : layout.pieces) boxes_.push_back(box_of(piece.outline));
        for (const Join& join : layout.joins) joined_.insert(std::minmax(join.from.piece, join.to.piece));
    }

    void pieces() {
        for (std::size_t i = 0; i < layout_.pieces.size(); ++i) {
            const Piece& piece = layout_.pieces[i];
            if (overlaps(piece.outline, piece.ribbon->narrowest_m()))
                faults_.add(metal(i).where, fmt::format("metal '{}' curls over itself", metal(i).name));
            for (std::size_t j = i + 1; j < layout_.pieces.size(); ++j) pair(i, j);
        }
    }

    void spans() {
        for (std::size_t i = 0; i < layout_.spans.size(); ++i) {
            for (std::size_t j = 0; j < i; ++j) span_pair(layout_.spans[j], layout_.spans[i]);
            span_over_metal(layout_.spans[i]);
        }
    }

    void neighbours_in_piece() {
        for (std::size_t k = 0; k < layout_.pieces.size(); ++k) {
            const Piece& piece = layout_.pieces[k];
            for (std::size_t i = 0; i + 1 < piece.fronts.size(); ++i) {
                const Front &a = piece.fronts[i], &b = piece.fronts[i + 1];
                const bool end = i + 2 == piece.fronts.size() && !piece.loop;
                if (a.slit >= 0 && b.slit >= 0 && a.slit != b.slit && touching(piece, a, b))
                    clash(slit_place(a.slit), slit_place(b.slit));
                if (i == 0 && !piece.loop && b.slit >= 0 && touching(piece, a, b)) slit_at_end(k, false, b.slit);
                if (end && a.slit >= 0 && touching(piece, a, b)) slit_at_end(k, true, a.slit);
            }
        }
    }

private:
    const Metal& metal(std::size_t piece) const {
        return model_.metals[static_cast<std::size_t>(layout_.pieces[piece].metal)];
    }
    int slit_place(int slit) const { return layout_.slits[static_cast<std::size_t>(slit)].place; }

    static bool touching(const Piece& piece, const Front& a, const Front& b) {
        return b.s_m(0) - a.s_m(0) < 1e-3 * piece.ribbon->narrowest_m();
    }

    void pair(std::size_t i, std::size_t j) {
        const Piece &a = layout_.pieces[i], &b = layout_.pieces[j];
        const double narrowest = std::min(a.ribbon->narrowest_m(), b.ribbon->narrowest_m());
        const bool same_plane = std::abs(metal(i).plane_m - metal(j).plane_m) <= 1e-9;
        if (!same_plane || apart(boxes_[i], boxes_[j], 1e-6 * narrowest)) return;
        const auto where = std::max(metal(i).where, metal(j).where);
        std::vector<Loop> both = a.outline;
        both.insert(both.end(), b.outline.begin(), b.outline.end());
        const std::string names = fmt::format("metal '{}' and metal '{}'", metal(i).name, metal(j).name);
        if (overlaps(both, narrowest))
            faults_.add(where, names + " overlap, which is not yet meshed",
                        "let strips meet end to end with the same width, or keep them apart");
        else if (!joined_.contains(std::minmax(static_cast<int>(i), static_cast<int>(j))) &&
                 (touches(a.outline, b.outline, boxes_[j], 1e-6 * narrowest) ||
                  touches(b.outline, a.outline, boxes_[i], 1e-6 * narrowest)))
            faults_.add(where, names + " touch elsewhere than at ends of the same width, which is not yet meshed",
                        "let strips meet end to end with the same width, or keep them apart");
    }

    void clash(int first, int second) {
        const Place &a = places_[static_cast<std::size_t>(first)], &b = places_[static_cast<std::size_t>(second)];
        faults_.add(b.where, fmt::format("{} touches or overlaps {}", b.what, a.what), "move them apart");
    }

    static bool overlap_on_end(const Landing& a, const Landing& b) {
        if (a.piece != b.piece || a.at_end != b.at_end) return false;
        const auto [a_low, a_high] = std::minmax(a.tau_a, a.tau_b);
        const auto [b_low, b_high] = std::minmax(b.tau_a, b.tau_b);
        return a_low <= b_high + 1e-3 && b_low <= a_high + 1e-3;
    }

    double plane(const Span& span) const { return metal(static_cast<std::size_t>(span.from.piece)).plane_m; }

    void span_pair(const Span& a, const Span& b) {
        bool clashing = false;
        for (const Landing& of_a : {a.from, a.to})
            for (const Landing& of_b : {b.from, b.to}) clashing = clashing || overlap_on_end(of_a, of_b);
        const std::vector<Loop> both{corners(layout_, a), corners(layout_, b)};
        const bool near = std::abs(plane(a) - plane(b)) <= 1e-9 &&
                          !apart(box_of(std::span(both).first(1)), box_of(std::span(both).last(1)), 0);
        clashing = clashing || (near && overlaps(both, std::min(a.width_m, b.width_m)));
        if (clashing) clash(a.place, b.place);
    }

    void span_over_metal(const Span& span) {
        const Place& place = places_[static_cast<std::size_t>(span.place)];
        const Loop quad = corners(layout_, span);
        if (signed_area(quad) <= 0) {
            faults_.add(place.where, place.what + " has a bridge whose edges cross");
            return;
        }
        const Box box = box_of(std::span(&quad, 1));
        for (std::size_t k = 0; k < layout_.pieces.size(); ++k) {
            if (std::abs(metal(k).plane_m - plane(span)) > 1e-9 || apart(box, boxes_[k], 0)) continue;
            std::vector<Loop> both = layout_.pieces[k].outline;
            both.push_back(quad);
            const double tolerance = std::min(span.width_m, span.length_m);
            // A straight bridge against the bent end of a strip overlaps it by the bulge of that end.
            if (area(both) - union_area(both, grain_m) > 0.02 * tolerance * tolerance + 8 * grain_m * perimeter(both))
                faults_.add(place.where,
                            fmt::format("{} overlaps metal '{}' beside its gap", place.what, metal(k).name));
        }
    }

    void slit_at_end(std::size_t piece, bool at_end, int slit) {
        for (const Span& span : layout_.spans)
            for (const Landing& end : {span.from, span.to})
                if (end.piece == static_cast<int>(piece) && end.at_end == at_end)
                    return clash(span.place, slit_place(slit));
        const Place& place = places_[static_cast<std::size_t>(slit_place(slit))];
        faults_.add(place.where, fmt::format("{} touches the end of metal '{}'", place.what, metal(piece).name));
    }

    const Model& model_;
    const Layout& layout_;
    MeshFaults& faults_;
    std::vector<Place> places_;
    std::vector<Box> boxes_;
    std::set<std::pair<int, int>> joined_;
};

}  // namespace

Loop corners(const Layout& layout, const Span& span) {
    const auto point = [&](const Landing& end, double tau) {
        return layout.pieces[static_cast<std::size_t>(end.piece)].front_point(end.at_end, tau);
    };
    return {point(span.from, span.from.tau_a), point(span.to, span.to.tau_a), point(span.to, span.to.tau_b),
            point(span.from, span.from.tau_b)};
}

void check_contacts(const Model& model, const Layout& layout, MeshFaults& faults) {
    ContactCheck check(model, layout, faults);
    check.pieces();
    check.spans();
    check.neighbours_in_piece();
}

}  // namespace annulet
