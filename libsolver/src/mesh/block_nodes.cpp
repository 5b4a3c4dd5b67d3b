#include "mesh/block_nodes.hpp"

#include <algorithm>
#include <cmath>
#include <optional>

#include "mesh/layout.hpp"

namespace annulet {

namespace {

struct OnPiece {
    std::size_t piece = 0;
    double shift_m = 0;  ///< s of the block minus s of the piece's own turn
};

// The one arc that holds the whole block, if there is one.
std::optional<OnPiece> single_arc(const Ribbon& ribbon, double from_m, double to_m) {
    const double length = ribbon.length_m(), middle = 0.5 * (from_m + to_m);
    const double shift = ribbon.closed() ? length * std::floor(middle / length) : 0;
    const std::size_t piece = ribbon.centre().piece_at(middle - shift);
    const Curve::Piece& part = ribbon.centre().pieces()[piece];
    if (!part.is_arc) return std::nullopt;
    const double slack = 2 * smooth_joint_margin * ribbon.narrowest_m();
    const bool within = from_m - shift >= part.start_m - slack && to_m - shift <= part.start_m + part.length_m + slack;
    if (!within && ribbon.has_seam()) return std::nullopt;
    return OnPiece{piece, shift};
}

// An end of the block may lie a little beyond the arc, on the piece next to it.
void move_to(Ribbon::Sample& at, const Vec2& p) {
    const Vec2 arm = p - at.centre, radial(std::cos(at.angle_rad), std::sin(at.angle_rad));
    at.angle_rad += std::atan2(cross(radial, arm), radial.dot(arm));
    at.radius_m = arm.norm();
}

}  // namespace

std::vector<double> area_keeping_radii(std::span<const double> angle_rad, std::span<const double> radius_m,
                                       bool closed) {
    const std::size_t n = angle_rad.size() - 1;
    std::vector<double> radii(radius_m.begin(), radius_m.end());
    std::vector<double> step(n), bulge(n);
    for (std::size_t i = 0; i < n; ++i) {
        step[i] = std::abs(angle_rad[i + 1] - angle_rad[i]);
        if (step[i] > 2.5) return radii;  // no polygon of so few corners comes near
        bulge[i] = step[i] / std::sin(step[i]);
    }
    if (closed) {
        for (double& radius : radii) radius *= std::sqrt(bulge[0]);
        return radii;
    }
    // Each triangle of the fan alone wants r_i r_(i+1) larger by its bulge; one factor on these corrections makes
    // the sum exact although the ends stay.
    std::vector<double> rise(n + 1, 0.0);
    for (std::size_t i = 1; i < n; ++i) rise[i] = std::pow(bulge[i - 1] * bulge[i], 0.25) - 1;
    double missing = 0, linear = 0, quadratic = 0;
    for (std::size_t i = 0; i < n; ++i) {
        const double a = radius_m[i], b = radius_m[i + 1], triangle = a * b * std::sin(step[i]);
        missing += step[i] * (a * a + a * b + b * b) / 3 - triangle;
        linear += triangle * (rise[i] + rise[i + 1]);
        quadratic += triangle * rise[i] * rise[i + 1];
    }
    if (linear <= 0) return radii;
    const double factor = 2 * missing / (linear + std::sqrt(linear * linear + 4 * quadratic * std::max(missing, 0.0)));
    for (std::size_t i = 1; i < n; ++i) radii[i] *= 1 + factor * rise[i];
    return radii;
}

std::vector<Vec2> block_nodes(const Ribbon& ribbon, double tau, double from_m, double to_m,
                              std::span<const double> fractions, bool closed) {
    std::vector<Vec2> nodes;
    const auto arc = single_arc(ribbon, from_m, to_m);
    if (!arc) {
        for (const double x : fractions) nodes.push_back(ribbon.point((1 - x) * from_m + x * to_m, tau));
        return nodes;
    }
    const Curve::Piece& part = ribbon.centre().pieces()[arc->piece];
    std::vector<double> angles, radii;
    Vec2 centre(0, 0);
    for (const double x : fractions) {
        const double along = (1 - x) * from_m + x * to_m;
        const double u = (along - arc->shift_m - part.start_m) / part.length_m;
        Ribbon::Sample at = ribbon.sample_on(arc->piece, u, tau);
        if (ribbon.has_seam() && (u < 0 || u > 1)) move_to(at, ribbon.point(along, tau));
        centre = at.centre;
        angles.push_back(at.angle_rad);
        radii.push_back(at.radius_m);
    }
    radii = area_keeping_radii(angles, radii, closed);
    for (std::size_t i = 0; i < angles.size(); ++i)
        nodes.push_back(centre + radii[i] * Vec2(std::cos(angles[i]), std::sin(angles[i])));
    return nodes;
}

std::vector<std::vector<Vec2>> block_lines(const Piece& piece, const AlongBlock& along, std::size_t block,
                                           std::span<const double> taus, double refine) {
    const std::vector<double> fractions = along.fractions(refine);
    const std::size_t n = piece.fronts.size();
    const bool wraps = piece.loop && block + 1 >= n;
    const double length = piece.ribbon->length_m();
    std::vector<std::vector<Vec2>> lines;
    for (const double tau : taus) {
        const double within = std::clamp(tau, -1.0, 1.0);
        const double from = n == 0 ? 0 : piece.fronts[block].s_m(within);
        const double to = n == 0 ? length : piece.fronts[wraps ? 0 : block + 1].s_m(within) + (wraps ? length : 0);
        lines.push_back(block_nodes(*piece.ribbon, tau, from, to, fractions, n == 0));
    }
    return lines;
}

}  // namespace annulet
