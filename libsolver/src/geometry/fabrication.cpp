#include <algorithm>
#include <annulet/geometry/fabrication.hpp>
#include <cmath>
#include <limits>
#include <optional>

namespace annulet {

namespace {

constexpr double arc_error_m = 2e-7;
constexpr double infinity = std::numeric_limits<double>::infinity();
constexpr double facing_cosine = -0.94;  // of the normals of edges that face each other
constexpr double grown_share = 0.02;     // of the rule: how far around a residue its edges are looked for
constexpr double least_share = 1e-3;     // of the rule squared: area of a residue worth a look
constexpr double detour = 4;             // along the outline, over straight across, of points that face each other
constexpr int most_samples = 400;

Loops2 opened(const Loops2& region, double radius_m) {
    return offset_by(offset_by(region, -radius_m, arc_error_m), radius_m, arc_error_m);
}

// The outline as edges with the arc length at which each starts.
struct Edge {
    Vec2 a, b;
    std::size_t loop;
    double start_m;
};

std::vector<Edge> edges_of(const Loops2& region) {
    std::vector<Edge> edges;
    for (std::size_t l = 0; l < region.size(); ++l) {
        double at = 0;
        for (std::size_t i = 0; i < region[l].size(); ++i) {
            const Vec2 &a = region[l][i], &b = region[l][(i + 1) % region[l].size()];
            edges.push_back({a, b, l, at});
            at += (b - a).norm();
        }
    }
    return edges;
}

struct Narrowest {
    Vec2 at{0, 0};
    double width_m = infinity;
};

class Prober {
public:
    explicit Prober(const Loops2& region) : edges_(edges_of(region)) {
        for (const Loop& loop : region) {
            double around = 0;
            for (std::size_t i = 0; i < loop.size(); ++i) around += (loop[(i + 1) % loop.size()] - loop[i]).norm();
            lengths_.push_back(around);
        }
    }

    // Shortest way across the region from an edge within `place`, at most `limit_m`.
    Narrowest across(const Loops2& place, double limit_m) const {
        Narrowest best;
        const Box box = box_of(place);
        for (const Edge& edge : edges_) {
            const Loop both{edge.a, edge.b};
            if (apart(box_of(std::span(&both, 1)), box, 0)) continue;
            const double length = (edge.b - edge.a).norm();
            const int steps = std::clamp(static_cast<int>(std::ceil(length / (0.05 * limit_m))), 1, most_samples);
            for (int k = 0; k <= steps; ++k) {
                const double u = (k + (k == 0 ? 1e-6 : k == steps ? -1e-6 : 0.0)) / steps;
                const Vec2 p = edge.a + u * (edge.b - edge.a);
                if (inside(place, p)) probe(edge, p, edge.start_m + u * length, limit_m, best);
            }
        }
        return best;
    }

private:
    void probe(const Edge& from, const Vec2& p, double s, double limit_m, Narrowest& best) const {
        const Vec2 along = (from.b - from.a).normalized(), inward = left_of(along);
        for (const Edge& to : edges_) {
            if (&to == &from) continue;
            const Vec2 edge = to.b - to.a;
            const double u = std::clamp((p - to.a).dot(edge) / edge.squaredNorm(), 0.0, 1.0);
            const Vec2 way = to.a + u * edge - p;
            const double distance = way.norm();
            if (distance >= std::min(best.width_m, limit_m) || distance < 1e-9 || way.dot(inward) < 0.5 * distance)
                continue;
            const bool facing = along.dot(edge.normalized()) < facing_cosine;
            if (!facing && !far_along(from.loop, s, to, u, distance)) continue;
            best = {p + 0.5 * way, distance};
        }
    }

    bool far_along(std::size_t loop, double s, const Edge& to, double u, double distance) const {
        if (to.loop != loop) return true;
        const double apart_m = std::abs(to.start_m + u * (to.b - to.a).norm() - s);
        return std::min(apart_m, lengths_[loop] - apart_m) > detour * distance;
    }

    std::vector<Edge> edges_;
    std::vector<double> lengths_;
};

// The two sides of a neck may leave a residue each.
std::vector<RuleFinding> one_per_place(std::vector<RuleFinding> findings, double within_m) {
    std::sort(findings.begin(), findings.end(),
              [](const RuleFinding& a, const RuleFinding& b) { return a.measured_m < b.measured_m; });
    std::vector<RuleFinding> kept;
    for (RuleFinding& finding : findings)
        if (std::none_of(kept.begin(), kept.end(),
                         [&](const RuleFinding& other) { return (other.at - finding.at).norm() < within_m; }))
            kept.push_back(std::move(finding));
    return kept;
}

std::vector<RuleFinding> narrow(const Loops2& region, double minimum_m, RuleFinding::Kind kind) {
    std::vector<RuleFinding> findings;
    const Prober prober(region);
    for (const Loops2& part : separate(without(region, opened(region, 0.5 * minimum_m)))) {
        if (area_of(part) < least_share * minimum_m * minimum_m) continue;
        const Loops2 around = offset_by(part, grown_share * minimum_m, arc_error_m);
        const Narrowest found = prober.across(around, minimum_m - rule_tolerance_m);
        if (std::isinf(found.width_m)) continue;
        findings.push_back({kind, found.at, found.width_m, minimum_m, part[0]});
    }
    return one_per_place(std::move(findings), minimum_m);
}

// What surrounds and fills the region, far enough out.
Loops2 complement(const Loops2& region, double beyond_m) {
    const Box box = box_of(region);
    const Vec2 low = box.low - Vec2(beyond_m, beyond_m), high = box.high + Vec2(beyond_m, beyond_m);
    const Loops2 frame{{low, {high.x(), low.y()}, high, {low.x(), high.y()}}};
    return without(frame, region);
}

}  // namespace

std::vector<RuleFinding> narrow_webs(const Loops2& region, double minimum_m) {
    return narrow(region, minimum_m, RuleFinding::Kind::web);
}

std::vector<RuleFinding> narrow_slots(const Loops2& region, double minimum_m) {
    if (region.empty()) return {};
    return narrow(complement(region, 3 * minimum_m), minimum_m, RuleFinding::Kind::slot);
}

std::vector<RuleFinding> tight_corners(const Loops2& region, double tool_radius_m) {
    std::vector<RuleFinding> findings;
    if (region.empty() || tool_radius_m <= 0) return findings;
    const Loops2 milled = complement(region, 4 * tool_radius_m);
    const Box frame = box_of(milled);
    const auto at_frame = [&](const Vec2& p) {
        return (p - frame.low).minCoeff() < tool_radius_m || (frame.high - p).minCoeff() < tool_radius_m;
    };
    for (const Loops2& part : separate(without(milled, opened(milled, tool_radius_m)))) {
        if (area_of(part) < least_share * tool_radius_m * tool_radius_m) continue;
        Vec2 middle(0, 0);
        for (const Vec2& p : part[0]) middle += p / static_cast<double>(part[0].size());
        if (at_frame(middle)) continue;
        // The largest bit that does reach it.
        double low = 0, high = tool_radius_m;
        for (int halving = 0; halving < 10; ++halving) {
            const double radius = 0.5 * (low + high);
            const Loops2 left = common(part, without(milled, opened(milled, radius)));
            (area_of(left) < least_share * radius * radius ? low : high) = radius;
        }
        findings.push_back({RuleFinding::Kind::inner_corner, middle, low, tool_radius_m, part[0]});
    }
    return findings;
}

}  // namespace annulet
