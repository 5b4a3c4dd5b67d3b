#include "mesh/cross_grid.hpp"

#include <algorithm>
#include <cmath>

#include "mesh/spacing.hpp"

namespace annulet {

namespace {

constexpr int carry_rounds = 4;
constexpr int most_rounds = 100;

struct Link {
    Landing* from;
    Landing* to;
};

CrossGrid& grid_of(std::vector<CrossGrid>& grids, const Landing& landing) {
    return grids[static_cast<std::size_t>(landing.piece)];
}

std::size_t nearest_line(const CrossGrid& grid, double tau) {
    std::size_t best = 0;
    for (std::size_t i = 1; i < grid.lines.size(); ++i)
        if (std::abs(grid.lines[i] - tau) < std::abs(grid.lines[best] - tau)) best = i;
    return best;
}

// Lines nearer than this to one another are one line.
double merge_distance(const Landing& landing) {
    return 0.02 * std::abs(landing.tau_b - landing.tau_a);
}

// True if a line was added.
bool insert(CrossGrid& grid, double tau, double within) {
    if (std::abs(grid.lines[nearest_line(grid, tau)] - tau) <= within) return false;
    grid.lines.insert(std::upper_bound(grid.lines.begin(), grid.lines.end(), tau), tau);
    return true;
}

bool strictly_between(double tau, const Landing& landing) {
    const auto [low, high] = std::minmax(landing.tau_a, landing.tau_b);
    return tau > low && tau < high;
}

bool carry_over(std::vector<CrossGrid>& grids, const Landing& from, const Landing& to) {
    bool added = false;
    const std::vector<double> lines = grid_of(grids, from).lines;
    for (const double tau : lines) {
        if (!strictly_between(tau, from)) continue;
        const double v = (tau - from.tau_a) / (from.tau_b - from.tau_a);
        added = insert(grid_of(grids, to), to.tau_a + v * (to.tau_b - to.tau_a), merge_distance(to)) || added;
    }
    return added;
}

// Intervals of `lines` covered by the landing, from tau_a to tau_b.
std::vector<std::size_t> intervals(const CrossGrid& grid, const Landing& landing) {
    const std::size_t a = nearest_line(grid, landing.tau_a), b = nearest_line(grid, landing.tau_b);
    std::vector<std::size_t> covered;
    for (std::size_t i = std::min(a, b); i < std::max(a, b); ++i) covered.push_back(i);
    if (a > b) std::reverse(covered.begin(), covered.end());
    return covered;
}

double sum_of(const CrossGrid& grid, const std::vector<std::size_t>& covered) {
    double sum = 0;
    for (const std::size_t i : covered) sum += grid.cells[i];
    return sum;
}

// Adds cells one by one where they are largest.
void raise(CrossGrid& grid, const std::vector<std::size_t>& covered, double to, const AcrossMap& map) {
    const auto share = [&](std::size_t i) {
        return (map.to_u(grid.lines[i + 1]) - map.to_u(grid.lines[i])) / grid.cells[i];
    };
    for (double sum = sum_of(grid, covered); sum < to; ++sum)
        ++grid.cells[*std::max_element(covered.begin(), covered.end(),
                                       [&](std::size_t i, std::size_t j) { return share(i) < share(j); })];
}

// Both ends of a link need as many cells; where its inner lines correspond, also between those.
bool equalise(std::vector<CrossGrid>& grids, const Link& link, const AcrossMap& map) {
    CrossGrid &a = grid_of(grids, *link.from), &b = grid_of(grids, *link.to);
    const auto of_a = intervals(a, *link.from), of_b = intervals(b, *link.to);
    const double before = sum_of(a, of_a) + sum_of(b, of_b);
    if (of_a.size() == of_b.size())
        for (std::size_t i = 0; i < of_a.size(); ++i) {
            double &count_a = a.cells[of_a[i]], &count_b = b.cells[of_b[i]];
            count_a = count_b = std::max(count_a, count_b);
        }
    const double most = std::max(sum_of(a, of_a), sum_of(b, of_b));
    raise(a, of_a, most, map);
    raise(b, of_b, most, map);
    return sum_of(a, of_a) + sum_of(b, of_b) > before;
}

std::vector<Link> links_of(Layout& layout) {
    std::vector<Link> links;
    for (Span& span : layout.spans) links.push_back({&span.from, &span.to});
    for (auto* joins : {&layout.joins, &layout.aligned})
        for (Join& join : *joins) links.push_back({&join.from, &join.to});
    return links;
}

void set_lines(std::vector<CrossGrid>& grids, const std::vector<Link>& links) {
    for (const Link& link : links)
        for (Landing* landing : {link.from, link.to}) {
            CrossGrid& grid = grid_of(grids, *landing);
            const double within = merge_distance(*landing);
            for (double* tau : {&landing->tau_a, &landing->tau_b}) {
                insert(grid, *tau, within);
                *tau = grid.lines[nearest_line(grid, *tau)];
            }
        }
    bool added = true;
    for (int round = 0; added && round < carry_rounds; ++round) {
        added = false;
        for (const Link& link : links) {
            added = carry_over(grids, *link.from, *link.to) || added;
            added = carry_over(grids, *link.to, *link.from) || added;
        }
    }
}

void set_taus(CrossGrid& grid, const AcrossMap& map, double refine) {
    grid.taus = {grid.lines[0]};
    grid.line_index = {0};
    for (std::size_t i = 0; i + 1 < grid.lines.size(); ++i) {
        const double from = map.to_u(grid.lines[i]), to = map.to_u(grid.lines[i + 1]);
        const double cells = refined_cells(grid.cells[i], refine);
        // Written so that mirrored lines come out as exact mirror images.
        for (double k = 1; k < cells; ++k) grid.taus.push_back(map.to_tau((from * (cells - k) + to * k) / cells));
        grid.taus.push_back(grid.lines[i + 1]);
        grid.line_index.push_back(static_cast<int>(grid.taus.size()) - 1);
    }
}

}  // namespace

std::vector<CrossGrid> cross_grids(Layout& layout, const MeshOptions& options) {
    const AcrossMap map(options.edge_cell_fraction);
    std::vector<CrossGrid> grids(layout.pieces.size(), CrossGrid{{-1, 1}, {}, {}, {}});
    const std::vector<Link> links = links_of(layout);
    set_lines(grids, links);
    for (CrossGrid& grid : grids)
        for (std::size_t i = 0; i + 1 < grid.lines.size(); ++i) {
            const double share = map.to_u(grid.lines[i + 1]) - map.to_u(grid.lines[i]);
            grid.cells.push_back(std::max(1.0, std::ceil(options.cells_across * share - 0.25)));
        }
    bool changed = true;
    for (int round = 0; changed; ++round) {
        if (round == most_rounds)
            throw NumericalError(
                "the node lines of bridges that overlap one another on several strips cannot be matched; "
                "align the edges of the bridges or move them apart");
        changed = false;
        for (const Link& link : links) changed = equalise(grids, link, map) || changed;
    }
    return grids;
}

void refine_grids(std::vector<CrossGrid>& grids, const MeshOptions& options) {
    const AcrossMap map(options.edge_cell_fraction);
    for (CrossGrid& grid : grids) set_taus(grid, map, options.refine);
}

double edge_cell_m(double width_m, const MeshOptions& options) {
    const AcrossMap map(options.edge_cell_fraction);
    return 0.5 * width_m * (1 + map.to_tau(1.0 / options.cells_across));
}

std::vector<int> landing_lines(const CrossGrid& grid, const Landing& landing) {
    const int a = grid.line_index[nearest_line(grid, landing.tau_a)];
    const int b = grid.line_index[nearest_line(grid, landing.tau_b)];
    std::vector<int> lines;
    for (int j = a; a < b ? j <= b : j >= b; j += a < b ? 1 : -1) lines.push_back(j);
    return lines;
}

}  // namespace annulet
