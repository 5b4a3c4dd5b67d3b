#include "mom/sheet_basis.hpp"

#include <array>

#include "mom/element.hpp"
#include "mom/elements.hpp"
#include "mom/gram.hpp"

namespace annulet {

namespace {

std::size_t at(int i) {
    return static_cast<std::size_t>(i);
}

/// Where the unknowns of one sheet stand: one vertical flux per column, then lateral fluxes by edge and layer.
struct SheetUnknowns {
    int first = 0, columns = 0, layers = 0;
    int vertical(int column) const { return first + column; }
    int lateral(int edge, int layer) const { return first + columns + edge * layers + layer; }
    int end(int edges) const { return first + columns + edges * layers; }
};

/// Lateral outflow of a column through one of its edges: unknown of layer 0 and sign.
struct Outflow {
    int edge;
    double sign;
};

std::vector<std::vector<Outflow>> outflows(const SheetMesh& sheet, const std::vector<SheetEdge>& edges) {
    std::vector<std::vector<Outflow>> out(sheet.columns.size());
    for (std::size_t c = 0; c < sheet.columns.size(); ++c)
        out[c].resize(sheet.columns[c].kind == CellKind::quadrilateral ? 4 : 3);
    for (std::size_t e = 0; e < edges.size(); ++e)
        for (std::size_t side = 0; side < 2; ++side)
            if (edges[e].column[side] >= 0)
                out[at(edges[e].column[side])][at(edges[e].slot[side])] = {static_cast<int>(e), side == 0 ? 1.0 : -1.0};
    return out;
}

/// Upward flux through interface `level` of a column, as triplets scaled by `scale` in row `row`:
/// V_0 is an unknown, V_{l+1} = V_l - (lateral outflow of layer l).
void append_vertical(const SheetUnknowns& u, int column, const std::vector<Outflow>& out, int level, double scale,
                     int row, std::vector<Eigen::Triplet<double>>& triplets) {
    triplets.emplace_back(row, u.vertical(column), scale);
    for (int l = 0; l < level; ++l)
        for (const Outflow& o : out) triplets.emplace_back(row, u.lateral(o.edge, l), -scale * o.sign);
}

void append_column(const SheetUnknowns& u, int column, const std::vector<Outflow>& out, const SheetElements& where,
                   const Basis& basis, BasisTriplets& t) {
    for (int l = 0; l < u.layers; ++l) {
        const int row = basis.first_slot[at(where.layer[at(column)][at(l)])];
        for (std::size_t a = 0; a < out.size(); ++a)
            t.slots.emplace_back(row + static_cast<int>(a), u.lateral(out[a].edge, l), out[a].sign);
        const int mean = row + static_cast<int>(out.size());
        append_vertical(u, column, out, l, 0.5, mean, t.slots);
        append_vertical(u, column, out, l + 1, 0.5, mean, t.slots);
    }
    // What flows up arrives on the top face (outflow of the panel: minus) and has left the bottom face.
    append_vertical(u, column, out, u.layers, -1, where.top[at(column)], t.divergence);
    append_vertical(u, column, out, 0, 1, where.bottom[at(column)], t.divergence);
}

std::vector<SheetUnknowns> number(const Mesh& mesh, int first) {
    std::vector<SheetUnknowns> out;
    for (const SheetMesh& sheet : mesh.sheets) {
        out.push_back({first, static_cast<int>(sheet.columns.size()), sheet.layers()});
        first = out.back().end(static_cast<int>(sheet_edges(sheet).size()));
    }
    return out;
}

/// Consistent mass of the flux that varies linearly between two interfaces: t / (6 A) [[2, 1], [1, 2]].
void append_vertical_mass(int row, double thickness_m, double area_m2, std::vector<Eigen::Triplet<double>>& triplets) {
    const double m = thickness_m / (6 * area_m2);
    triplets.emplace_back(row, row, 2 * m);
    triplets.emplace_back(row + 1, row + 1, 2 * m);
    triplets.emplace_back(row, row + 1, m);
    triplets.emplace_back(row + 1, row, m);
}

Eigen::SparseMatrix<double> sheet_mass(const SheetMesh& sheet, const SheetUnknowns& u, const SheetElements& where,
                                       const std::vector<Element>& elements, const Basis& basis) {
    std::vector<Eigen::Triplet<double>> lateral, vertical, flux;
    const auto out = outflows(sheet, sheet_edges(sheet));
    for (int c = 0; c < u.columns; ++c)
        for (int l = 0; l < u.layers; ++l) {
            const int index = where.layer[at(c)][at(l)], row = basis.first_slot[at(index)];
            const PlanarElement e = planar_element(elements[at(index)]);
            const double t = elements[at(index)].thickness_m;
            const Eigen::Matrix4d g = rooftop_gram(e) / t;
            for (int a = 0; a < e.slots; ++a)
                for (int b = 0; b < e.slots; ++b) lateral.emplace_back(row + a, row + b, g(a, b));
            append_vertical_mass(c * (u.layers + 1) + l, t, e.area_m2, vertical);
        }
    const int levels = u.columns * (u.layers + 1);
    for (int c = 0; c < u.columns; ++c)
        for (int l = 0; l <= u.layers; ++l) append_vertical(u, c, out[at(c)], l, 1, c * (u.layers + 1) + l, flux);
    Eigen::SparseMatrix<double> m_lateral(basis.slots.rows(), basis.slots.rows()), m_vertical(levels, levels);
    Eigen::SparseMatrix<double> v(levels, basis.unknowns), s = basis.slots;
    m_lateral.setFromTriplets(lateral.begin(), lateral.end());
    m_vertical.setFromTriplets(vertical.begin(), vertical.end());
    v.setFromTriplets(flux.begin(), flux.end());
    return Eigen::SparseMatrix<double>(s.transpose() * m_lateral * s) +
           Eigen::SparseMatrix<double>(v.transpose() * m_vertical * v);
}

}  // namespace

int append_sheets(const Mesh& mesh, int& rows, Basis& basis, BasisTriplets& triplets) {
    const auto elements = make_elements(mesh);
    int charges = static_cast<int>(mesh.cells.size());
    for (std::size_t e = mesh.cells.size(); e < elements.size(); ++e) {
        basis.first_slot.push_back(rows);
        rows += elements[e].slots();
        if (elements[e].carries_charge()) ++charges;
    }
    const auto where = sheet_elements(mesh);
    const auto unknowns = number(mesh, basis.unknowns);
    for (std::size_t s = 0; s < mesh.sheets.size(); ++s) {
        const auto edges = sheet_edges(mesh.sheets[s]);
        const auto out = outflows(mesh.sheets[s], edges);
        for (int c = 0; c < unknowns[s].columns; ++c)
            append_column(unknowns[s], c, out[at(c)], where[s], basis, triplets);
        for (std::size_t e = 0; e < edges.size(); ++e)
            for (std::size_t l = 0; l < where[s].wall[e].size(); ++l)
                triplets.divergence.emplace_back(where[s].wall[e][l],
                                                 unknowns[s].lateral(static_cast<int>(e), static_cast<int>(l)), -1.0);
        basis.unknowns = unknowns[s].end(static_cast<int>(edges.size()));
    }
    return charges;
}

std::vector<Eigen::SparseMatrix<double>> polarisation_mass(const Mesh& mesh, const Basis& basis) {
    std::vector<Eigen::SparseMatrix<double>> out;
    if (mesh.sheets.empty()) return out;
    const auto elements = make_elements(mesh);
    const auto where = sheet_elements(mesh);
    const auto unknowns = number(mesh, basis.metal_unknowns);
    for (std::size_t s = 0; s < mesh.sheets.size(); ++s)
        out.push_back(sheet_mass(mesh.sheets[s], unknowns[s], where[s], elements, basis));
    return out;
}

}  // namespace annulet
