#include "mom/static_moments.hpp"

#include <annulet/core/constants.hpp>

#include "mom/outer_rule.hpp"
#include "mom/static_potential.hpp"

namespace annulet {

namespace {

/// Moments of the potentials over one triangle of the test fan.
struct FanMoments {
    std::array<double, 4> scalar{};  ///< of phi_k
    std::array<Vec3, 4> first;       ///< of r phi_k
    Vec3 vector{0, 0, 0};            ///< of V
    double dot = 0;                  ///< of r . V
};

std::array<FanMoments, 4> accumulate(const std::vector<OuterPoint>& points, const PlanarElement& source) {
    std::array<FanMoments, 4> moments;
    for (auto& m : moments) m.first.fill(Vec3::Zero());
    for (const OuterPoint& p : points) {
        const CellPotential v = static_potential(source, p.position);
        FanMoments& m = moments[static_cast<std::size_t>(p.triangle)];
        for (std::size_t k = 0; k < 4; ++k) {
            m.scalar[k] += p.weight_m2 * v.scalar[k];
            m.first[k] += p.weight_m2 * v.scalar[k] * p.position;
        }
        m.vector += p.weight_m2 * v.vector;
        m.dot += p.weight_m2 * p.position.dot(v.vector);
    }
    return moments;
}

std::vector<OuterPoint> outer_points(const PlanarElement& test, const PlanarElement& source, bool touching) {
    constexpr int touching_points = 8, bisections = 8;
    return touching ? graded_rule(test, touching_points) : adaptive_rule(test, source, bisections);
}

constexpr double inverse_4pi = 1 / (4 * constants::pi);

}  // namespace

double static_scalar(const PlanarElement& test, const PlanarElement& source, bool touching) {
    double sum = 0;
    for (const OuterPoint& p : outer_points(test, source, touching))
        sum += p.weight_m2 * static_charge_potential(source, p.position);
    return inverse_4pi * sum / (test.area_m2 * source.area_m2);
}

PairMoments static_pair(const PlanarElement& test, const PlanarElement& source, bool touching) {
    const auto points = outer_points(test, source, touching);
    const auto moments = accumulate(points, source);
    const double d = test.slope_per_m2, e = source.slope_per_m2;
    PairMoments pair;
    double charge = 0;
    for (std::size_t l = 0; l < static_cast<std::size_t>(test.slots); ++l) {
        const FanMoments& m = moments[l];
        for (std::size_t k = 0; k < 4; ++k) charge += m.scalar[k];
        for (std::size_t b = 0; b < static_cast<std::size_t>(source.slots); ++b) {
            Vec3 field = e * m.vector;  // integral of the potential of slot b over fan triangle l
            double dot = e * m.dot;     // ... of r times it
            for (std::size_t k = 0; k < 4; ++k) {
                if (source.slots == 3 && k > 0) break;
                field += m.scalar[k] * source.constant[k][b];
                dot += m.first[k].dot(source.constant[k][b]);
            }
            for (std::size_t a = 0; a < static_cast<std::size_t>(test.slots); ++a)
                pair.vector[a][b] += test.constant[l][a].dot(field) + d * dot;
        }
    }
    for (auto& row : pair.vector)
        for (auto& x : row) x *= inverse_4pi;
    pair.scalar = inverse_4pi * charge / (test.area_m2 * source.area_m2);
    return pair;
}

}  // namespace annulet
