#include "mesh/shared_outlines.hpp"

#include <algorithm>
#include <annulet/core/constants.hpp>
#include <cmath>
#include <map>
#include <set>

namespace annulet {

namespace {

constexpr double same_place_m = 4e-9;  // the grid of the booleans, with rounding
constexpr double sharp_turn_rad = 0.3;
constexpr double widest_turn_rad = constants::pi / 12;
constexpr double finest_step = 0.25;  // of the wanted size, when integrating it

double turn_between(const Vec2& in, const Vec2& out) {
    return std::atan2(cross(in, out), in.dot(out));
}

class OutlineDivider {
public:
    OutlineDivider(const Loops2& loops, const std::function<double(const Vec2&)>& size_m, double refine)
        : size_m_(size_m), refine_(refine) {
        for (const Loop& loop : loops) loops_.push_back(numbered(loop));
    }

    std::vector<DividedLoop> divided() {
        for (auto& loop : loops_) insert_points_of_others(loop);
        for (const auto& loop : loops_)
            for (std::size_t i = 0; i < loop.size(); ++i) edges_.insert({loop[i], loop[(i + 1) % loop.size()]});
        std::vector<DividedLoop> result;
        for (const auto& loop : loops_) result.push_back(divide(loop));
        return result;
    }

private:
    using Line = std::vector<int>;
    using Cell = std::pair<long long, long long>;
    static constexpr double bin_m = 4 * same_place_m;

    static Cell bin(const Vec2& p) {
        return {static_cast<long long>(std::floor(p.x() / bin_m)), static_cast<long long>(std::floor(p.y() / bin_m))};
    }

    int number(const Vec2& p) {
        const auto [x, y] = bin(p);
        for (long long i = x - 1; i <= x + 1; ++i)
            for (long long j = y - 1; j <= y + 1; ++j)
                if (const auto found = bins_.find({i, j});
                    found != bins_.end() && (at(found->second) - p).norm() <= same_place_m)
                    return found->second;
        points_.push_back(p);
        bins_[{x, y}] = static_cast<int>(points_.size()) - 1;
        return static_cast<int>(points_.size()) - 1;
    }

    const Vec2& at(int i) const { return points_[static_cast<std::size_t>(i)]; }

    Line numbered(const Loop& loop) {
        Line line;
        for (const Vec2& p : loop) {
            const int n = number(p);
            if (line.empty() || line.back() != n) line.push_back(n);
        }
        while (line.size() > 1 && line.front() == line.back()) line.pop_back();
        return line;
    }

    void insert_points_of_others(Line& line) const {
        if (loops_.size() < 2) return;
        Line full;
        for (std::size_t i = 0; i < line.size(); ++i) {
            const Vec2 &a = at(line[i]), &b = at(line[(i + 1) % line.size()]);
            const double length = (b - a).norm();
            const Vec2 along = (b - a) / length;
            std::vector<std::pair<double, int>> on;
            for (std::size_t k = 0; k < points_.size(); ++k) {
                const double x = along.dot(points_[k] - a);
                if (x > same_place_m && x < length - same_place_m &&
                    std::abs(cross(along, points_[k] - a)) <= same_place_m)
                    on.emplace_back(x, static_cast<int>(k));
            }
            std::sort(on.begin(), on.end());
            full.push_back(line[i]);
            for (const auto& [x, k] : on) full.push_back(k);
        }
        line = std::move(full);
    }

    bool is_shared(int a, int b) const { return edges_.contains({b, a}); }

    DividedLoop divide(const Line& line) {
        const std::size_t n = line.size();
        const auto kept = [&](std::size_t i) {
            const int before = line[(i + n - 1) % n], here = line[i % n], after = line[(i + 1) % n];
            return std::abs(turn_between(at(here) - at(before), at(after) - at(here))) > sharp_turn_rad ||
                   is_shared(before, here) != is_shared(here, after);
        };
        std::size_t start = 0;
        while (start < n && !kept(start)) ++start;
        const bool smooth = start == n;
        start %= n;
        DividedLoop result;
        for (std::size_t i = 0; i < n;) {
            Line run{line[(start + i) % n]};
            do run.push_back(line[(start + ++i) % n]);
            while (i < n && !kept(start + i));
            const bool shared = is_shared(run[0], run[1]);
            for (const Vec2& p : points_of(run, smooth)) {
                result.points.push_back(p);
                result.shared.push_back(shared);
            }
        }
        return result;
    }

    // All points of the run but the last, the same from either side.
    Loop points_of(const Line& run, bool closed) {
        const bool backward = run.front() > run.back() || (closed && run[1] > run[run.size() - 2]);
        Line forward = run;
        if (backward) std::reverse(forward.begin(), forward.end());
        auto [known, added] =
            divisions_.try_emplace(std::make_pair(forward[0], std::make_pair(forward[1], forward.back())));
        if (added) known->second = divided_run(forward, closed);
        Loop points = known->second;
        if (backward) std::reverse(points.begin(), points.end());
        points.pop_back();
        return points;
    }

    std::vector<double> turns_of(const Line& run, bool closed) const {
        const std::size_t edges = run.size() - 1;
        std::vector<double> turns(edges, 0.0);
        for (std::size_t i = closed ? 0 : 1; i < edges; ++i) {
            const std::size_t before = (i + edges - 1) % edges;
            const double turn = turn_between(at(run[before + 1]) - at(run[before]), at(run[i + 1]) - at(run[i]));
            turns[before] += 0.5 * turn;
            turns[i] += 0.5 * turn;
        }
        // The ends of a run lie within an edge of the curve as well.
        if (!closed && edges > 2) {
            turns.front() *= 2;
            turns.back() *= 2;
        }
        return turns;
    }

    Loop divided_run(const Line& run, bool closed) const {
        const std::vector<double> turns = turns_of(run, closed);
        std::vector<double> used{0}, curvature{0};
        Loop fine{at(run[0])};
        Loop normal{Vec2(0, 0)};
        for (std::size_t i = 0; i + 1 < run.size(); ++i) {
            const Vec2 &a = at(run[i]), edge = at(run[i + 1]) - a;
            const double length = edge.norm();
            const double size = std::min(size_m_(a), size_m_(at(run[i + 1])));
            const int steps = std::clamp(static_cast<int>(length / (finest_step * size)), 4, 4000);
            for (int k = 1; k <= steps; ++k) {
                const Vec2 p = k == steps ? at(run[i + 1]) : Vec2(a + edge * k / steps);
                const double by_length = length / steps / size_m_(p) * refine_;
                used.push_back(used.back() +
                               std::max(by_length, std::abs(turns[i]) / steps / widest_turn_rad * refine_));
                fine.push_back(p);
                curvature.push_back(turns[i] / length);
                normal.push_back(left_of(edge / length));
            }
        }
        const double count = std::max(closed ? 3.0 : 1.0, std::round(used.back()));
        Loop points{fine[0]};
        std::vector<std::size_t> place{1};
        for (double c = 1; c < count; ++c) {
            const double wanted = used.back() * c / count;
            const auto above =
                static_cast<std::size_t>(std::lower_bound(used.begin(), used.end(), wanted) - used.begin());
            const double u = (wanted - used[above - 1]) / (used[above] - used[above - 1]);
            points.push_back((1 - u) * fine[above - 1] + u * fine[above]);
            place.push_back(above);
        }
        points.push_back(fine.back());
        return bulged(points, place, curvature, normal, closed);
    }

    // A chord of length L on a curve of curvature k leaves out L^3 k / 12 of area: points move out by L^2 k / 12, and
    // more where the ends of the run stay.
    static Loop bulged(const Loop& points, const std::vector<std::size_t>& place, const std::vector<double>& curvature,
                       const Loop& normal, bool closed) {
        Loop moved = points;
        double wanted = 0, given = 0;
        const std::size_t last = points.size() - 1;
        for (std::size_t i = 0; i < last; ++i) {
            const double before = (points[i] - points[(i + last - 1) % last]).norm(),
                         after = (points[i + 1] - points[i]).norm();
            const double k = curvature[place[i]];
            wanted += std::pow(after, 3) * std::abs(k) / 12;
            if (i == 0 && !closed) continue;
            const double length = 0.5 * (before + after), out = length * length * k / 12;
            given += std::abs(out) * length;
            moved[i] -= out * normal[place[i]];
        }
        const double factor = given > 0 && !closed ? std::min(wanted / given, 2.0) : 1.0;
        for (std::size_t i = 0; i < last; ++i) moved[i] = points[i] + factor * (moved[i] - points[i]);
        moved[last] = closed ? moved[0] : points[last];
        return moved;
    }

    const std::function<double(const Vec2&)>& size_m_;
    double refine_;
    std::vector<Line> loops_;
    Loop points_;
    std::map<Cell, int> bins_;
    std::set<std::pair<int, int>> edges_;
    std::map<std::pair<int, std::pair<int, int>>, Loop> divisions_;
};

}  // namespace

std::vector<DividedLoop> divide_outlines(const Loops2& loops, const std::function<double(const Vec2&)>& size_m,
                                         double refine) {
    return OutlineDivider(loops, size_m, refine).divided();
}

}  // namespace annulet
