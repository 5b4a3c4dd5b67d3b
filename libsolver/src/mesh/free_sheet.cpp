#include "mesh/free_sheet.hpp"

#include <algorithm>
#include <annulet/core/constants.hpp>
#include <cmath>
#include <limits>
#include <map>
#include <set>

#include "mesh/fill.hpp"
#include "mesh/plan_border.hpp"

namespace annulet {

namespace {

constexpr double share_tolerance = 0.02;  // of a cell's area beyond the sheet: the bulge of arcs over chords
constexpr double same_place_m = 3e-9;     // the grid of the booleans, with rounding
constexpr double sharp_turn_rad = 0.3;    // corners of outlines that are kept
constexpr double widest_turn_rad = constants::pi / 12;
constexpr int fine_steps = 16;

using Key = std::pair<long long, long long>;
Key key_of(const Vec2& p) {
    return {std::llround(p.x() / region_grain_m), std::llround(p.y() / region_grain_m)};
}

class FreeSheet {
public:
    FreeSheet(const SheetOutline& outline, const std::vector<const Footprint*>& faces, const MeshOptions& options,
              const Laminate& laminate, MeshFaults& faults)
        : outline_(outline), faces_(faces), options_(options), laminate_(laminate), faults_(faults) {}

    std::optional<SheetPlan> made() {
        Loops2 metal;
        double sum = 0;
        for (const Footprint* face : faces_) {
            const std::size_t before = plan_.columns.size();
            for (const int cell : face->cells())
                if (!add_metal(face->corners(cell))) return std::nullopt;
            const Loops2 own = border_loops(std::span(plan_.columns).subspan(before), plan_.points);
            sum += area_of(own);
            metal = united(metal, own);
        }
        if (sum - area_of(metal) > 1e-6 * sum + 1e-12) return overlapping();
        for (Loops2& part : separate(metal.empty() ? outline_.region : without(outline_.region, metal)))
            if (!sliver(part)) add_bare(part);
        return std::move(plan_);
    }

private:
    std::optional<SheetPlan> overlapping() {
        faults_.add(
            laminate_.where,
            fmt::format("the metal on the two faces of laminate '{}' overlaps with different cells, which is not "
                        "yet meshed",
                        laminate_.name),
            "let the metal of the two faces keep apart in plan, or be the same");
        return std::nullopt;
    }

    int point(const Vec2& p) {
        const auto [at, added] = number_.emplace(key_of(p), static_cast<int>(plan_.points.size()));
        if (added) plan_.points.push_back(p);
        return at->second;
    }

    // False and a fault if the cell lies partly over the sheet.
    bool add_metal(const Loop& corners) {
        const double area = signed_area(corners);
        const double covered = area_of(common(outline_.region, std::span(&corners, 1))) / area;
        if (covered < share_tolerance) return true;
        if (covered < 1 - share_tolerance) {
            faults_.add(laminate_.where,
                        fmt::format("an edge of laminate '{}' crosses the metal near {} where no line of cells can "
                                    "follow it, which is not yet meshed",
                                    laminate_.name, mm(corners[0])),
                        "let the sheet end beyond the metal or across it, away from ports and corners");
            return false;
        }
        SheetMesh::Column column;
        column.kind = corners.size() == 4 ? CellKind::quadrilateral : CellKind::triangle;
        for (std::size_t i = 0; i < corners.size(); ++i) column.node[i] = point(corners[i]);
        std::set<int> same(column.node.begin(), column.node.end());
        if (!known_.insert(same).second) return true;
        for (std::size_t i = 0; i < corners.size(); ++i) {
            const std::size_t j = (i + 1) % corners.size();
            // Thickness of the cell across this edge.
            const double across = area / (corners[j] - corners[i]).norm();
            edges_[std::minmax(column.node[i], column.node[j])] = across;
            extent_m_ = std::max(extent_m_, std::sqrt(area));
        }
        plan_.columns.push_back(column);
        return true;
    }

    bool sliver(const Loops2& part) const {
        double perimeter = 0;
        for (const Loop& loop : part)
            for (std::size_t i = 0; i < loop.size(); ++i) perimeter += (loop[(i + 1) % loop.size()] - loop[i]).norm();
        const double thinnest = std::max(1e-8, 0.01 * extent_m_);
        return 2 * area_of(part) < thinnest * perimeter;
    }

    struct Marked {
        Vec2 at{0, 0};
        int node = -1;  ///< of the metal
    };

    int metal_node(const Vec2& p) const {
        const auto [x, y] = key_of(p);
        for (long long i = x - 3; i <= x + 3; ++i)
            for (long long j = y - 3; j <= y + 3; ++j)
                if (const auto found = number_.find({i, j}); found != number_.end() && found->second < metal_points_)
                    return found->second;
        return -1;
    }

    double across(int a, int b) const {
        const auto found = edges_.find(std::minmax(a, b));
        return found == edges_.end() ? 0 : found->second;
    }

    // Wanted length of the edges of the sheet itself.
    double size(const Vec2& p) const {
        double h = h_max();
        for (const auto& [at, own] : metal_sizes_) h = std::min(h, own + sheet_growth * (p - at).norm());
        return h / options_.refine;
    }

    double h_max() const {
        const Box box = box_of(outline_.outer);
        return std::min(wave_cell_m(options_), 0.25 * (box.high - box.low).maxCoeff());
    }

    void set_metal_sizes(const std::vector<std::vector<Marked>>& loops) {
        metal_sizes_.clear();
        for (const auto& loop : loops)
            for (std::size_t i = 0; i < loop.size(); ++i) {
                const Marked &a = loop[i], &b = loop[(i + 1) % loop.size()];
                if (across(a.node, b.node) > 0)
                    metal_sizes_.emplace_back(0.5 * (a.at + b.at), (b.at - a.at).norm() * options_.refine);
            }
    }

    void add_bare(const Loops2& part) {
        metal_points_ = static_cast<int>(plan_.points.size());
        std::vector<std::vector<Marked>> loops;
        for (const Loop& loop : part) {
            std::vector<Marked> marked;
            for (const Vec2& p : loop) {
                const int node = metal_node(p);
                marked.push_back({node >= 0 ? plan_.points[static_cast<std::size_t>(node)] : p, node});
            }
            loops.push_back(std::move(marked));
        }
        set_metal_sizes(loops);
        FillRequest request;
        request.growth = sheet_growth;
        request.h_max_m = h_max();
        request.refine = options_.refine;
        for (const auto& loop : loops) add_loop(loop, request);
        const FilledRegion filled = fill(request);
        std::vector<int> number;
        for (const Vec2& p : filled.points) number.push_back(point(p));
        for (SheetMesh::Column column : filled.cells) {
            for (int& node : column.node)
                if (node >= 0) node = number[static_cast<std::size_t>(node)];
            plan_.columns.push_back(column);
        }
    }

    // Edges along metal stay, others are divided anew.
    void add_loop(const std::vector<Marked>& loop, FillRequest& request) const {
        const std::size_t n = loop.size();
        const auto kept = [&](std::size_t i) {
            const Vec2 in = loop[i].at - loop[(i + n - 1) % n].at, out = loop[(i + 1) % n].at - loop[i].at;
            return loop[i].node >= 0 || std::abs(std::atan2(cross(in, out), in.dot(out))) > sharp_turn_rad;
        };
        std::size_t start = 0;
        while (start < n && !kept(start)) ++start;
        start %= n;
        Loop corners;
        std::vector<double> first;
        for (std::size_t i = 0; i < n;) {
            std::vector<Vec2> run{loop[(start + i) % n].at};
            const Marked& from = loop[(start + i) % n];
            do run.push_back(loop[(start + ++i) % n].at);
            while (i < n && !kept((start + i) % n));
            const Marked& to = loop[(start + i) % n];
            const double ahead = run.size() == 2 ? across(from.node, to.node) : 0;
            add_run(run, ahead > 0, corners, first);
            // The smaller of the two edges' wishes holds at a corner.
            first[first.size() - run_points_] = ahead;
        }
        set_first(first);
        request.loops.push_back(std::move(corners));
        request.first_layer_m.push_back(std::move(first));
    }

    // Until here `first` holds the wish of the edge that starts at each corner.
    static void set_first(std::vector<double>& first) {
        const std::vector<double> ahead = first;
        for (std::size_t i = 0; i < first.size(); ++i) {
            const double before = ahead[(i + ahead.size() - 1) % ahead.size()];
            first[i] = before > 0 && ahead[i] > 0 ? std::min(before, ahead[i]) : 0;
        }
    }

    // Per edge of the run, half of what it turns at its two inner ends.
    static std::vector<double> turns_of(const std::vector<Vec2>& run) {
        std::vector<double> turns(run.size() - 1, 0.0);
        for (std::size_t i = 1; i + 1 < run.size(); ++i) {
            const Vec2 in = run[i] - run[i - 1], out = run[i + 1] - run[i];
            const double turn = std::abs(std::atan2(cross(in, out), in.dot(out)));
            turns[i - 1] += 0.5 * turn;
            turns[i] += 0.5 * turn;
        }
        return turns;
    }

    // All points of the run but the last.
    void add_run(const std::vector<Vec2>& run, bool fixed, Loop& corners, std::vector<double>& first) const {
        run_points_ = 1;
        corners.push_back(run[0]);
        first.push_back(0);
        if (fixed) return;
        const std::vector<double> turns = turns_of(run);
        double cells = 0;
        std::vector<double> at{0};  // cells used up to each point of a fine division
        std::vector<Vec2> fine{run[0]};
        for (std::size_t i = 0; i + 1 < run.size(); ++i)
            for (int k = 1; k <= fine_steps; ++k) {
                const Vec2 p = run[i] + (run[i + 1] - run[i]) * k / fine_steps;
                const double by_length = (p - fine.back()).norm() / size(0.5 * (p + fine.back()));
                cells += std::max(by_length, turns[i] / fine_steps / widest_turn_rad * options_.refine);
                fine.push_back(p);
                at.push_back(cells);
            }
        const double count = std::max(1.0, std::round(cells));
        for (double c = 1; c < count; ++c) {
            const double wanted = cells * c / count;
            const auto above = static_cast<std::size_t>(std::lower_bound(at.begin(), at.end(), wanted) - at.begin());
            const double u = (wanted - at[above - 1]) / (at[above] - at[above - 1]);
            corners.push_back((1 - u) * fine[above - 1] + u * fine[above]);
            first.push_back(0);
            ++run_points_;
        }
    }

    const SheetOutline& outline_;
    const std::vector<const Footprint*>& faces_;
    const MeshOptions& options_;
    const Laminate& laminate_;
    MeshFaults& faults_;
    SheetPlan plan_;
    std::map<Key, int> number_;
    std::set<std::set<int>> known_;
    std::map<std::pair<int, int>, double> edges_;
    std::vector<std::pair<Vec2, double>> metal_sizes_;
    double extent_m_ = 0;
    int metal_points_ = 0;
    mutable std::size_t run_points_ = 0;
};

}  // namespace

std::optional<SheetPlan> free_sheet(const SheetOutline& outline, const std::vector<const Footprint*>& faces,
                                    const MeshOptions& options, const Laminate& laminate, MeshFaults& faults) {
    return FreeSheet(outline, faces, options, laminate, faults).made();
}

}  // namespace annulet
