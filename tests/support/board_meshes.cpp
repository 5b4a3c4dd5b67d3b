#include "support/board_meshes.hpp"

#include <annulet/core/constants.hpp>

#include <algorithm>
#include <cmath>

#include "support/test_meshes.hpp"

namespace annulet::test {

namespace {

/// Lines of one direction with the range of cells that is metal.
struct Lines {
    std::vector<double> at;
    int first = 0, last = 0;  ///< metal between lines first and last
};

/// Margin lines from 0 (metal edge) to 1 (rim), fine at both ends.
std::vector<double> margin_nodes(int n) {
    return n <= 2 ? uniform_nodes(n) : cosine_nodes(n);
}

Lines with_margins(const std::vector<double>& metal, double margin_m, int cells) {
    Lines lines{metal, 0, static_cast<int>(metal.size()) - 1};
    if (margin_m <= 0) return lines;
    const auto x = margin_nodes(cells);
    std::vector<double> before, after;
    for (int i = cells; i >= 1; --i) before.push_back(metal.front() - margin_m * x[static_cast<std::size_t>(i)]);
    for (int i = 1; i <= cells; ++i) after.push_back(metal.back() + margin_m * x[static_cast<std::size_t>(i)]);
    lines.at.insert(lines.at.begin(), before.begin(), before.end());
    lines.at.insert(lines.at.end(), after.begin(), after.end());
    lines.first = cells;
    lines.last += cells;
    return lines;
}

/// Cell lengths from both ends of the arm inward, each at most twice the one before and `longest`.
std::vector<double> arm_cells(double arm, double at_gap, double at_end, double longest) {
    std::vector<double> left, right;
    double a = at_gap, b = at_end, sum = 0;
    while (sum < arm) {
        double& next = a <= b ? a : b;
        (a <= b ? left : right).push_back(next);
        sum += next;
        next = std::min(2 * next, longest);
    }
    left.insert(left.end(), right.rbegin(), right.rend());
    for (double& cell : left) cell *= arm / sum;
    return left;
}

/// Symmetric lines along the strip: two cells in the gap, the cells at the open ends as fine as at the edges.
std::vector<double> along_nodes(const StripBoard& b) {
    const double arm = 0.5 * (b.length_m - b.gap_m);
    std::vector<double> right{0.5 * b.gap_m};
    for (double cell : arm_cells(arm, 0.5 * b.gap_m, b.end_cell * b.width_m, arm / b.along))
        right.push_back(right.back() + cell);
    right.back() = 0.5 * b.length_m;
    std::vector<double> x;
    for (auto i = right.rbegin(); i != right.rend(); ++i) x.push_back(-*i);
    x.push_back(0);
    x.insert(x.end(), right.begin(), right.end());
    return x;
}

std::vector<double> levels(const StripBoard& b) {
    // Ascending heights; thickness doubles per layer away from the metal on top.
    double total = 0;
    for (int l = 0; l < b.layers; ++l) total += std::pow(2, l);
    std::vector<double> z{0};
    for (int l = 0; l < b.layers; ++l) z.insert(z.begin(), z.front() - b.thickness_m * std::pow(2, l) / total);
    return z;
}

}  // namespace

Mesh strip_board(const StripBoard& b) {
    std::vector<double> y;
    for (double t : b.across == 3 ? edge_nodes(0.06) : cosine_nodes(b.across)) y.push_back((t - 0.5) * b.width_m);
    const bool sheet = b.thickness_m > 0;
    const Lines lx = with_margins(along_nodes(b), sheet ? b.margin_m : 0, b.margin_cells);
    const Lines ly = with_margins(y, sheet ? b.margin_m : 0, b.margin_cells);
    const int nx = static_cast<int>(lx.at.size()), ny = static_cast<int>(ly.at.size());
    Mesh mesh;
    SheetMesh s;
    for (double px : lx.at)
        for (double py : ly.at) {
            mesh.nodes.emplace_back(px, py, 0);
            s.plan.emplace_back(px, py);
        }
    Gap gap{"feed", {}, b.gap_m};
    for (int i = 0; i + 1 < nx; ++i)
        for (int j = 0; j + 1 < ny; ++j) {
            Cell cell;
            cell.node = {i * ny + j, (i + 1) * ny + j, (i + 1) * ny + j + 1, i * ny + j + 1};
            const bool metal = i >= lx.first && i < lx.last && j >= ly.first && j < ly.last;
            s.columns.push_back({CellKind::quadrilateral, cell.node});
            s.metal_on_top.push_back(metal ? static_cast<int>(mesh.cells.size()) : -1);
            if (!metal) continue;
            const double middle = 0.5 * (lx.at[static_cast<std::size_t>(i)] + lx.at[static_cast<std::size_t>(i + 1)]);
            if (std::abs(middle) < 0.5 * b.gap_m)
                gap.members.push_back({static_cast<int>(mesh.cells.size()), Vec3(1 / b.gap_m, 0, 0)});
            mesh.cells.push_back(cell);
        }
    mesh.ports.push_back(gap);
    if (!sheet) return mesh;
    Laminate laminate;
    laminate.name = "board";
    laminate.thickness_m = b.thickness_m;
    laminate.permittivity = {{1e9, b.permittivity}};
    laminate.loss_tangent = b.loss_tangent;
    mesh.laminates = {laminate};
    s.laminate = 0;
    s.level_m = levels(b);
    mesh.sheets = {s};
    return mesh;
}

}  // namespace annulet::test
