#include "mesh/track.hpp"

#include <algorithm>
#include <cmath>
#include <optional>

namespace annulet {

namespace {

constexpr double edge_tau = 1 - 1e-7;  // probes at the very edge would sit on outlines drawn along it
constexpr int probes = 17;
constexpr int evaluation_limit = 20000;

struct Interval {
    double enter, exit;
};

// The sign of the region's level along one line of constant tau, searched without missing a stretch wider than
// `finest`: the level is a bound of the distance to the outline, so most of the line is skipped in few steps.
class LineSearch {
public:
    LineSearch(const Ribbon& ribbon, const Region& region, double tau)
        : ribbon_(ribbon), region_(region), tau_(tau), slack_m_(1e-9 * ribbon.widest_m()) {}

    double exact_level(double s) const { return region_.level(ribbon_.point(s, tau_)); }
    // Outlines drawn along the line itself count as outside whatever the rounding.
    double level(double s) const { return exact_level(s) + slack_m_; }

    double root(double a, double b) const {
        const bool inside_a = exact_level(a) < 0;
        for (int halving = 0; halving < 80; ++halving) {
            const double mid = 0.5 * (a + b);
            if (mid <= a || mid >= b) break;
            ((exact_level(mid) < 0) == inside_a ? a : b) = mid;
        }
        return 0.5 * (a + b);
    }

    std::vector<double> roots() {
        const auto& pieces = ribbon_.centre().pieces();
        for (std::size_t k = 0; k < pieces.size(); ++k) {
            speed_ = ribbon_.speed(k, tau_);
            const double from = pieces[k].start_m;
            const double to = k + 1 < pieces.size() ? pieces[k + 1].start_m : ribbon_.length_m();
            // The end of a closed strip is asked from within, where it does not wrap to the start.
            scan(from, to, level(from) < 0, level(std::nextafter(to, from)) < 0);
        }
        return std::move(roots_);
    }

private:
    void scan(double a, double b, bool inside_a, bool inside_b) {
        const double mid = 0.5 * (a + b);
        const double at_mid = level(mid);
        if (std::abs(at_mid) > 0.5 * speed_ * (b - a) + slack_m_) return;
        const bool finest = (b - a) * speed_ < 1e-5 * ribbon_.narrowest_m() || ++evaluations_ > evaluation_limit;
        if (finest) {
            if (inside_a != inside_b) roots_.push_back(root(a, b));
            return;
        }
        scan(a, mid, inside_a, at_mid < 0);
        scan(mid, b, at_mid < 0, inside_b);
    }

    const Ribbon& ribbon_;
    const Region& region_;
    double tau_, slack_m_, speed_ = 1;
    int evaluations_ = 0;
    std::vector<double> roots_;
};

std::vector<Interval> intervals_at(const Ribbon& ribbon, const Region& region, double tau) {
    LineSearch line(ribbon, region, tau);
    const double length = ribbon.length_m();
    const bool starts_inside = line.level(0) < 0;
    std::vector<double> ends = line.roots();
    if (starts_inside) ends.insert(ends.begin(), 0.0);
    if (ends.size() % 2 == 1) ends.push_back(length);
    std::vector<Interval> intervals;
    for (std::size_t i = 0; i + 1 < ends.size(); i += 2) intervals.push_back({ends[i], ends[i + 1]});
    const bool wraps = ribbon.closed() && intervals.size() > 1 && starts_inside && intervals.back().exit == length;
    if (wraps) {
        intervals.back().exit += intervals.front().exit;
        intervals.erase(intervals.begin());
    }
    return intervals;
}

double clamped(double tau) {
    return std::clamp(tau, -edge_tau, edge_tau);
}

// The interval of `found` that continues `previous` on the neighbouring line, shifted by whole turns.
std::optional<Interval> continuation(const std::vector<Interval>& found, const Interval& previous,
                                     const Ribbon& ribbon) {
    const double before = 0.5 * (previous.enter + previous.exit);
    std::optional<Interval> best;
    double best_shift = ribbon.widest_m();
    for (const Interval& candidate : found) {
        double shift = 0.5 * (candidate.enter + candidate.exit) - before;
        const double turns = ribbon.closed() ? std::round(shift / ribbon.length_m()) * ribbon.length_m() : 0;
        shift -= turns;
        if (std::abs(shift) > best_shift) continue;
        best_shift = std::abs(shift);
        best = Interval{candidate.enter - turns, candidate.exit - turns};
    }
    return best;
}

bool covers_whole(const std::vector<Interval>& intervals, double length) {
    return intervals.size() == 1 && intervals[0].enter <= 0 && intervals[0].exit >= length;
}

using Table = std::vector<std::vector<Interval>>;  // crossing, probe

std::optional<Table> follow(const std::vector<std::vector<Interval>>& lines, const Ribbon& ribbon) {
    const std::size_t middle = lines.size() / 2, count = lines[middle].size();
    Table table(count, std::vector<Interval>(lines.size()));
    for (std::size_t k = 0; k < count; ++k) {
        table[k][middle] = lines[middle][k];
        for (std::size_t step = 1; step <= middle; ++step)
            for (const bool up : {true, false}) {
                const std::size_t here = up ? middle + step : middle - step, last = up ? here - 1 : here + 1;
                const auto next = continuation(lines[here], table[k][last], ribbon);
                if (!next) return std::nullopt;
                table[k][here] = *next;
            }
    }
    return table;
}

std::optional<Track::Side> side_of(const std::vector<Interval>& row, double end_s, bool enter, bool closed) {
    Track::Side side;
    std::size_t at_end = 0;
    for (const Interval& interval : row) {
        side.probe_s_m.push_back(enter ? interval.enter : interval.exit);
        if (!closed && side.probe_s_m.back() == end_s) ++at_end;
    }
    side.fixed = at_end == row.size();
    side.fixed_s_m = end_s;
    if (at_end != 0 && !side.fixed) return std::nullopt;
    return side;
}

bool outline_enters(const std::vector<Loop>& strip, const Region& region, double margin) {
    for (const Loop& loop : region.loops())
        for (std::size_t i = 0; i < loop.size(); ++i) {
            const Vec2 &a = loop[i], &b = loop[(i + 1) % loop.size()];
            for (const double u : {0.0, 0.25, 0.5, 0.75}) {
                const Vec2 p = a + u * (b - a);
                if (inside(strip, p) && distance_to(strip, p) > margin) return true;
            }
        }
    return false;
}

}  // namespace

std::vector<double> probe_taus() {
    std::vector<double> taus;
    for (int i = 0; i < probes; ++i) taus.push_back(-1 + 2.0 * i / (probes - 1));
    return taus;
}

double Track::solve(const Side& side, double tau) const {
    if (side.fixed) return side.fixed_s_m;
    const double place = 0.5 * (tau + 1) * (probes - 1);
    const auto below = std::min(static_cast<std::size_t>(std::max(place, 0.0)), side.probe_s_m.size() - 2);
    const double u = place - static_cast<double>(below);
    const double guess = (1 - u) * side.probe_s_m[below] + u * side.probe_s_m[below + 1];
    for (const double line_tau : {tau, clamped(tau)}) {
        const LineSearch line(*ribbon_, *region_, line_tau);
        for (double half = 1e-4 * ribbon_->narrowest_m(); half < ribbon_->widest_m(); half *= 2) {
            const double a = guess - half, b = guess + half;
            if ((line.exact_level(a) < 0) != (line.exact_level(b) < 0)) return line.root(a, b);
        }
    }
    return guess;
}

Crossings find_crossings(std::shared_ptr<const Ribbon> ribbon, std::shared_ptr<const Region> region) {
    const std::vector<Loop> strip = outline(*ribbon);
    if (apart(box_of(strip), box_of(region->loops()), 0.1 * ribbon->widest_m())) return {};
    std::vector<std::vector<Interval>> lines;
    std::size_t most = 0, whole = 0;
    for (const double tau : probe_taus()) {
        lines.push_back(intervals_at(*ribbon, *region, clamped(tau)));
        most = std::max(most, lines.back().size());
        if (covers_whole(lines.back(), ribbon->length_m())) ++whole;
    }
    if (whole == lines.size()) return {Crossing::everything, {}};
    if (most == 0)
        return {outline_enters(strip, *region, 1e-3 * ribbon->narrowest_m()) ? Crossing::partial : Crossing::none, {}};
    const bool equal = std::all_of(lines.begin(), lines.end(), [&](const auto& line) { return line.size() == most; });
    const auto table = equal && whole == 0 ? follow(lines, *ribbon) : std::nullopt;
    if (!table) return {Crossing::partial, {}};
    Crossings found{Crossing::full, {}};
    for (const auto& row : *table) {
        auto enter = side_of(row, 0, true, ribbon->closed());
        auto exit = side_of(row, ribbon->length_m(), false, ribbon->closed());
        if (!enter || !exit) return {Crossing::partial, {}};
        found.tracks.emplace_back(ribbon, region, std::move(*enter), std::move(*exit));
    }
    return found;
}

}  // namespace annulet
