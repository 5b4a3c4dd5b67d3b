#include "support/test_meshes.hpp"

#include <annulet/core/constants.hpp>

#include <cmath>

namespace annulet::test {

namespace {

/// Quadrilaterals between consecutive rows of nodes; `closed` joins the last row to the first. Row-major nodes.
void add_cells(Mesh& mesh, int rows, int columns, bool closed) {
    const int last = closed ? rows : rows - 1;
    for (int i = 0; i < last; ++i)
        for (int j = 0; j + 1 < columns; ++j) {
            const int next = (i + 1) % rows;
            Cell cell;
            cell.node = {i * columns + j, i * columns + j + 1, next * columns + j + 1, next * columns + j};
            mesh.cells.push_back(cell);
        }
}

double area_factor(double dphi) {
    return std::sqrt(dphi / std::sin(dphi));
}

}  // namespace

std::vector<double> uniform_nodes(int n) {
    std::vector<double> x;
    for (int i = 0; i <= n; ++i) x.push_back(double(i) / n);
    return x;
}

std::vector<double> cosine_nodes(int n) {
    std::vector<double> x;
    for (int i = 0; i <= n; ++i) x.push_back(0.5 - 0.5 * std::cos(constants::pi * i / n));
    return x;
}

std::vector<double> edge_nodes(double edge) {
    return {0, edge, 1 - edge, 1};
}

Mesh annulus(double r_in_m, double r_out_m, int around, const std::vector<double>& across, double z_m) {
    Mesh mesh;
    const double dphi = 2 * constants::pi / around;
    for (int i = 0; i < around; ++i)
        for (double t : across) {
            const double r = (r_in_m + t * (r_out_m - r_in_m)) * area_factor(dphi), phi = i * dphi;
            mesh.nodes.emplace_back(r * std::cos(phi), r * std::sin(phi), z_m);
        }
    add_cells(mesh, around, static_cast<int>(across.size()), true);
    return mesh;
}

Mesh ring_with_port(double mean_radius_m, double width_m, double gap_m, int gap_cells, int around,
                    const std::vector<double>& across) {
    Mesh mesh;
    const double half = 0.5 * gap_m / mean_radius_m, rest = (2 * constants::pi - 2 * half) / around;
    std::vector<double> phi;
    for (int i = 0; i < gap_cells; ++i) phi.push_back(-half + 2 * half * i / gap_cells);
    for (int i = 0; i < around; ++i) phi.push_back(half + rest * i);
    for (double angle : phi)
        for (double t : across) {
            const double r = (mean_radius_m + (t - 0.5) * width_m) * area_factor(rest);
            mesh.nodes.emplace_back(r * std::cos(angle), r * std::sin(angle), 0);
        }
    const int columns = static_cast<int>(across.size());
    add_cells(mesh, static_cast<int>(phi.size()), columns, true);
    Gap gap;
    gap.name = "feed";
    gap.length_m = gap_m;
    // The voltage is the same at every radius: an impressed field with a rotation would drive eddies in the gap.
    for (int i = 0; i < gap_cells; ++i)
        for (int j = 0; j + 1 < columns; ++j) {
            const double angle = -half + 2 * half * (i + 0.5) / gap_cells;
            const double middle = 0.5 * (across[static_cast<std::size_t>(j)] + across[static_cast<std::size_t>(j + 1)]);
            const double r = mean_radius_m + (middle - 0.5) * width_m;
            gap.members.push_back({i * (columns - 1) + j, Vec3(-std::sin(angle), std::cos(angle), 0) / (2 * half * r)});
        }
    mesh.ports.push_back(gap);
    return mesh;
}

Mesh plate(double a_m, double b_m, const std::vector<double>& along, const std::vector<double>& across) {
    Mesh mesh;
    for (double s : along)
        for (double t : across) mesh.nodes.emplace_back(a_m * s, b_m * (1 - t), 0);
    add_cells(mesh, static_cast<int>(along.size()), static_cast<int>(across.size()), false);
    return mesh;
}

Mesh disc(double radius_m, int n) {
    // Elliptical map of the square (u, v) in [-1, 1]^2 to the disc: x = u sqrt(1 - v^2/2), y = v sqrt(1 - u^2/2).
    Mesh mesh;
    const auto nodes = cosine_nodes(n);
    for (double s : nodes)
        for (double t : nodes) {
            const double u = 2 * s - 1, v = 1 - 2 * t;
            mesh.nodes.emplace_back(radius_m * u * std::sqrt(1 - v * v / 2), radius_m * v * std::sqrt(1 - u * u / 2),
                                    0);
        }
    add_cells(mesh, n + 1, n + 1, false);
    return mesh;
}

}  // namespace annulet::test
