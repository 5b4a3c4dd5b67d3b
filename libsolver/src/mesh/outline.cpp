// Outlines of pieces of strip, fine enough to judge what touches what.
#include <algorithm>
#include <annulet/core/constants.hpp>
#include <cmath>

#include "mesh/layout.hpp"

namespace annulet {

namespace {

constexpr double chord_rad = constants::pi / 720;

// Points of one edge from s = a to b, both included; arcs in fine chords.
Loop edge(const Ribbon& ribbon, double a, double b, double tau) {
    std::vector<double> stops{a};
    const double length = ribbon.length_m();
    for (const double turn : {-length, 0.0, length})
        for (const Curve::Piece& part : ribbon.centre().pieces()) {
            if (turn != 0 && !ribbon.closed()) continue;
            const int steps = part.is_arc ? static_cast<int>(std::ceil(std::abs(part.sweep_rad) / chord_rad)) : 1;
            for (int i = 0; i < steps; ++i) {
                const double s = turn + part.start_m + part.length_m * i / steps;
                if (s > a + 1e-9 * length && s < b - 1e-9 * length) stops.push_back(s);
            }
        }
    stops.push_back(b);
    Loop points;
    for (const double s : stops) points.push_back(ribbon.point(s, tau));
    return points;
}

void append(Piece& piece, const Loop& points, Piece::Side side) {
    // The last point of a side is the first of the next.
    for (std::size_t i = 0; i + 1 < points.size(); ++i) {
        piece.outline[0].push_back(points[i]);
        piece.outline_side.push_back(side);
    }
}

}  // namespace

void set_outline(Piece& piece) {
    const Ribbon& ribbon = *piece.ribbon;
    if (piece.loop) {
        Loop right = edge(ribbon, 0, ribbon.length_m(), -1), left = edge(ribbon, 0, ribbon.length_m(), 1);
        right.pop_back();
        left.pop_back();
        std::reverse(left.begin(), left.end());
        piece.outline = {right, left};
        if (signed_area(left) > 0 && signed_area(right) < 0) std::swap(piece.outline[0], piece.outline[1]);
        return;
    }
    piece.outline.assign(1, {});
    piece.outline_side.clear();
    const std::vector<double> taus = probe_taus();
    Loop start, end;
    for (const double tau : taus) {
        start.push_back(piece.front_point(false, -tau));
        end.push_back(piece.front_point(true, tau));
    }
    const auto side = [&](double tau) {
        return edge(ribbon, piece.fronts.front().s_m(tau), piece.fronts.back().s_m(tau), tau);
    };
    Loop left = side(1);
    std::reverse(left.begin(), left.end());
    append(piece, start, Piece::Side::start);
    append(piece, side(-1), Piece::Side::right);
    append(piece, end, Piece::Side::end);
    append(piece, left, Piece::Side::left);
}

}  // namespace annulet
