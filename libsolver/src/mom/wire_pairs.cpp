#include "mom/wire_pairs.hpp"

#include <annulet/core/constants.hpp>
#include <annulet/numerics/quadrature.hpp>
#include <annulet/numerics/special.hpp>

#include <algorithm>
#include <cmath>
#include <utility>
#include <vector>

#include "mom/outer_rule.hpp"
#include "mom/static_potential.hpp"

namespace annulet {

namespace {

using constants::pi;

/// [hat of the test segment][hat of the source segment], hats 1 - u and u; m after the scale of the lengths.
struct HatMoments {
    double value[2][2] = {{0, 0}, {0, 0}};

    void add(double x, double y, double weight) {
        value[0][0] += weight * (1 - x) * (1 - y);
        value[0][1] += weight * (1 - x) * y;
        value[1][0] += weight * x * (1 - y);
        value[1][1] += weight * x * y;
    }
};

PairMoments local_moments(const HatMoments& hats, const WireElement& test, const WireElement& source) {
    const double lengths = test.length_m() * source.length_m(), scale = 1 / (4 * pi);
    const double along = test.tangent().dot(source.tangent());
    PairMoments pair;
    for (std::size_t a = 0; a < 2; ++a)
        for (std::size_t b = 0; b < 2; ++b) {
            pair.vector[a][b] = scale * (a == b ? 1 : -1) * along * lengths * hats.value[a][b];
            pair.scalar += scale * hats.value[a][b];
        }
    return pair;
}

struct Node {
    double x, weight;
};

/// Double-exponential rule on [0, 1] [Takahasi1974] for integrands with a logarithm at 0.
std::vector<Node> double_exponential_rule() {
    constexpr double step = 0.18, reach = 3.3;
    std::vector<Node> rule;
    for (double t = -reach; t < reach + step / 2; t += step) {
        const double q = pi / 2 * std::sinh(t);
        rule.push_back({1 / (1 + std::exp(-2 * q)), step * pi / 4 * std::cosh(t) / std::pow(std::cosh(q), 2)});
    }
    return rule;
}

/// Rule on [0, 1] for a kernel with a logarithm at 0 that turns into 1/x beyond x = `scale`.
std::vector<Node> radial_rule(double scale) {
    static const std::vector<Node> singular = double_exponential_rule();
    static const LineRule gauss = gauss_legendre(10, 0, 1);
    const double inner = std::min(scale, 1.0);
    std::vector<Node> rule;
    for (const Node& n : singular) rule.push_back({inner * n.x, inner * n.weight});
    for (double from = inner; from < 1; from *= 4) {
        const double width = std::min(4 * from, 1.0) - from;
        for (Eigen::Index i = 0; i < gauss.nodes.size(); ++i)
            rule.push_back({from + width * gauss.nodes[i], width * gauss.weights[i]});
    }
    return rule;
}

/// Both integrals over one segment: in u = |x - y| the kernel is one-dimensional, the product of the hats a
/// polynomial of degree 2 in the other variable.
HatMoments coincident(const WireElement& w) {
    const double length = w.length_m(), a = w.radius_m;
    const LineRule two = gauss_legendre(2, 0, 1);
    HatMoments hats;
    for (const Node& n : radial_rule(2 * a / length)) {
        const double kernel = tube_kernel(std::pow(n.x * length, 2), a, a);
        for (Eigen::Index i = 0; i < 2; ++i) {
            const double y = (1 - n.x) * two.nodes[i], weight = n.weight * (1 - n.x) * two.weights[i] * kernel;
            hats.add(y + n.x, y, weight);
            hats.add(y, y + n.x, weight);
        }
    }
    return hats;
}

/// Segments that share the end x = 0 = y of the distances x, y from it (in lengths): x = r, y = r e and the other
/// way round, so that the logarithm stands at r = 0 only [Duffy1982].
HatMoments from_shared_end(const Vec3& along_test, const Vec3& along_source, double a, double b) {
    static const LineRule gauss = gauss_legendre(16, 0, 1);
    HatMoments hats;
    for (Eigen::Index i = 0; i < gauss.nodes.size(); ++i)
        for (const bool swapped : {false, true}) {
            const double e = gauss.nodes[i];
            const double d2 =
                (swapped ? Vec3(e * along_test - along_source) : Vec3(along_test - e * along_source)).squaredNorm();
            for (const Node& n : radial_rule((a + b) / std::sqrt(d2))) {
                const double weight = gauss.weights[i] * n.weight * n.x * tube_kernel(n.x * n.x * d2, a, b);
                hats.add(swapped ? e * n.x : n.x, swapped ? n.x : e * n.x, weight);
            }
        }
    return hats;
}

struct Interval {
    double from = 0, to = 1;
    double centre() const { return (from + to) / 2; }
    double width() const { return to - from; }
};

void add_product(const WireElement& test, const WireElement& source, const Interval& i, const Interval& j, int points,
                 HatMoments& hats) {
    const LineRule x = gauss_legendre(points, i.from, i.to), y = gauss_legendre(points, j.from, j.to);
    for (int p = 0; p < points; ++p)
        for (int q = 0; q < points; ++q) {
            const double d2 = (test.point(x.nodes[p]) - source.point(y.nodes[q])).squaredNorm();
            hats.add(x.nodes[p], y.nodes[q],
                     x.weights[p] * y.weights[q] * tube_kernel(d2, test.radius_m, source.radius_m));
        }
}

/// Halves the longer part until both are small against their distance.
void add_apart(const WireElement& test, const WireElement& source, const Interval& i, const Interval& j, int depth,
               HatMoments& hats) {
    const double size_i = i.width() * test.length_m(), size_j = j.width() * source.length_m();
    const double apart = (test.point(i.centre()) - source.point(j.centre())).norm();
    const double ratio = apart / (0.5 * (size_i + size_j));
    if (ratio >= 1.5 || depth == 0) return add_product(test, source, i, j, ratio > 3 ? 6 : 8, hats);
    const Interval& cut = size_i >= size_j ? i : j;
    for (const Interval& half : {Interval{cut.from, cut.centre()}, Interval{cut.centre(), cut.to}})
        size_i >= size_j ? add_apart(test, source, half, j, depth - 1, hats)
                         : add_apart(test, source, i, half, depth - 1, hats);
}

/// Hats counted from the other end.
HatMoments turned(HatMoments hats, bool test, bool source) {
    if (test) std::swap(hats.value[0], hats.value[1]);
    if (source)
        for (auto& row : hats.value) std::swap(row[0], row[1]);
    return hats;
}

HatMoments hat_moments(const WireElement& test, const WireElement& source) {
    const double near = 1e-7 * std::min(test.length_m(), source.length_m());
    const auto meet = [&](bool test_end, bool source_end) {
        return ((test_end ? test.to : test.from) - (source_end ? source.to : source.from)).norm() <= near;
    };
    if (meet(false, false) && meet(true, true)) return coincident(test);
    if (meet(false, true) && meet(true, false)) return turned(coincident(test), false, true);
    for (const bool test_end : {false, true})
        for (const bool source_end : {false, true}) {
            if (!meet(test_end, source_end)) continue;
            const double sign_t = test_end ? -1 : 1, sign_s = source_end ? -1 : 1;
            return turned(from_shared_end(sign_t * (test.to - test.from), sign_s * (source.to - source.from),
                                          test.radius_m, source.radius_m),
                          test_end, source_end);
        }
    HatMoments hats;
    add_apart(test, source, {}, {}, 24, hats);
    return hats;
}

constexpr int ring_points = 8;

/// One Gauss point of the wire, the potential averaged around it.
void add_ring(const WireElement& wire, const PlanarElement& surface, double u, double weight, PairMoments& pair) {
    const Vec3 tangent = wire.tangent(), side = tangent.unitOrthogonal(), other = tangent.cross(side);
    const double w = weight * wire.length_m() / ring_points;
    for (int i = 0; i < ring_points; ++i) {
        const double psi = 2 * pi * (i + 0.5) / ring_points;
        const Vec3 r = wire.point(u) + wire.radius_m * (std::cos(psi) * side + std::sin(psi) * other);
        const CellPotential v = static_potential(surface, r);
        const double potential = v.scalar[0] + v.scalar[1] + v.scalar[2] + v.scalar[3];
        const double upward = w * tangent.z() * potential / surface.area_m2;
        pair.scalar += w * potential;
        pair.vector[0][static_cast<std::size_t>(surface.slots)] -= (1 - u) * upward;
        pair.vector[1][static_cast<std::size_t>(surface.slots)] += u * upward;
        for (std::size_t b = 0; b < static_cast<std::size_t>(surface.slots); ++b) {
            Vec3 field = surface.slope_per_m2 * v.vector;
            for (std::size_t k = 0; k < 4 && (surface.slots == 4 || k == 0); ++k)
                field += v.scalar[k] * surface.constant[k][b];
            pair.vector[0][b] -= w * (1 - u) * tangent.dot(field);
            pair.vector[1][b] += w * u * tangent.dot(field);
        }
    }
}

void add_interval(const WireElement& wire, const PlanarElement& surface, const Interval& i, int depth,
                  PairMoments& pair) {
    const double half = 0.5 * i.width() * wire.length_m();
    const double apart = std::max(distance(surface, wire.point(i.centre())), wire.radius_m);
    if (half <= 0.7 * apart || depth == 0) {
        const LineRule rule = gauss_legendre(6, i.from, i.to);
        for (Eigen::Index p = 0; p < rule.nodes.size(); ++p)
            add_ring(wire, surface, rule.nodes[p], rule.weights[p], pair);
        return;
    }
    add_interval(wire, surface, {i.from, i.centre()}, depth - 1, pair);
    add_interval(wire, surface, {i.centre(), i.to}, depth - 1, pair);
}

}  // namespace

WireElement WireElement::mirrored(double plane_z_m) const {
    WireElement image = *this;
    image.from.z() = 2 * plane_z_m - from.z();
    image.to.z() = 2 * plane_z_m - to.z();
    return image;
}

WireElement wire_element(const Element& segment) {
    return {segment.corner[0], segment.corner[1], segment.radius_m};
}

double tube_kernel(double squared_distance_m2, double a_m, double b_m) {
    const double far = squared_distance_m2 + std::pow(a_m + b_m, 2);
    const double near = squared_distance_m2 + std::pow(a_m - b_m, 2);
    return 2 / pi * elliptic_k_of_complement(near / far) / std::sqrt(far);
}

PairMoments static_wire_pair(const WireElement& test, const WireElement& source) {
    return local_moments(hat_moments(test, source), test, source);
}

PairMoments static_wire_and_surface(const WireElement& wire, const PlanarElement& surface) {
    PairMoments pair;
    add_interval(wire, surface, {}, 12, pair);
    const double scale = 1 / (4 * pi);
    for (auto& row : pair.vector)
        for (double& x : row) x *= scale;
    pair.scalar *= scale / (wire.length_m() * surface.area_m2);
    return pair;
}

PairMoments transposed(const PairMoments& pair) {
    PairMoments out;
    out.scalar = pair.scalar;
    for (std::size_t a = 0; a < pair.vector.size(); ++a)
        for (std::size_t b = 0; b < pair.vector.size(); ++b) out.vector[a][b] = pair.vector[b][a];
    return out;
}

}  // namespace annulet
