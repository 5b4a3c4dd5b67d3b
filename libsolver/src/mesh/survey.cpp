#include <algorithm>
#include <cmath>
#include <limits>

#include "mesh/gaps.hpp"

namespace annulet {

Survey::Survey(const Model& model, const std::vector<Piece>& pieces, double plane_m, const Vec2& from, const Vec2& to,
               double beyond_m)
    : pieces_(pieces) {
    const double length = (to - from).norm();
    const Vec2 unit = (to - from) / length;
    for (std::size_t k = 0; k < pieces.size(); ++k) {
        if (std::abs(model.metals[static_cast<std::size_t>(pieces[k].metal)].plane_m - plane_m) > 1e-9) continue;
        on_plane_.push_back(static_cast<int>(k));
        cross_piece(static_cast<int>(k), from, unit, -beyond_m, length + beyond_m);
    }
    std::sort(crossings_.begin(), crossings_.end(), [](const Crossing& a, const Crossing& b) { return a.x_m < b.x_m; });
    double at = -beyond_m;
    const Crossing* before = nullptr;
    for (std::size_t k = 0; k <= crossings_.size(); ++k) {
        const Crossing* after = k < crossings_.size() ? &crossings_[k] : nullptr;
        const double next = after != nullptr ? after->x_m : length + beyond_m;
        // Crossings closer than a nanometre are one line drawn twice.
        if (next - at > 1e-9) {
            const int piece = piece_at(from + 0.5 * (at + next) * unit);
            if (!stretches_.empty() && stretches_.back().piece == piece)
                stretches_.back().to_m = next, stretches_.back().after = after;
            else
                stretches_.push_back({at, next, piece, before, after});
        }
        at = next;
        before = after;
    }
}

void Survey::cross_piece(int piece, const Vec2& from, const Vec2& unit, double start_m, double stop_m) {
    const Piece& metal = pieces_[static_cast<std::size_t>(piece)];
    for (const Loop& loop : metal.outline)
        for (std::size_t i = 0; i < loop.size(); ++i) {
            const Vec2 a = loop[i] - from, b = loop[(i + 1) % loop.size()] - from;
            const double side_a = cross(unit, a), side_b = cross(unit, b);
            if ((side_a > 0) == (side_b > 0)) continue;
            const double u = side_a / (side_a - side_b);
            const double x = unit.dot((1 - u) * a + u * b);
            if (x < start_m || x > stop_m) continue;
            crossings_.push_back({x, piece, metal.loop ? Piece::Side::right : metal.outline_side[i]});
        }
}

int Survey::piece_at(const Vec2& p) const {
    for (const int piece : on_plane_)
        if (inside(pieces_[static_cast<std::size_t>(piece)].outline, p)) return piece;
    return -1;
}

double Survey::distance_to_edge(const Vec2& p) const {
    double nearest = std::numeric_limits<double>::infinity();
    for (const int piece : on_plane_)
        nearest = std::min(nearest, distance_to(pieces_[static_cast<std::size_t>(piece)].outline, p));
    return nearest;
}

}  // namespace annulet
