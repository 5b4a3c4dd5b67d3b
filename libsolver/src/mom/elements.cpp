#include "mom/elements.hpp"

#include <algorithm>
#include <map>
#include <utility>

namespace annulet {

namespace {

std::size_t at(int i) {
    return static_cast<std::size_t>(i);
}

int corners(CellKind kind) {
    return kind == CellKind::quadrilateral ? 4 : 3;
}

Element metal_element(const Mesh& mesh, const Cell& cell) {
    Element e;
    e.kind = cell.kind;
    e.radius_m = cell.radius_m;
    for (int i = 0; i < 4; ++i) e.corner[at(i)] = mesh.nodes[at(cell.node[at(i < cell.corners() ? i : 0)])];
    return e;
}

Element flat_element(const SheetMesh& sheet, const SheetMesh::Column& column, double z_m, ElementRole role) {
    Element e;
    e.role = role;
    e.kind = column.kind;
    const int n = corners(column.kind);
    for (int i = 0; i < 4; ++i) e.corner[at(i)] = lift(sheet.plan[at(column.node[at(i < n ? i : 0)])], z_m);
    return e;
}

Element wall_element(const SheetMesh& sheet, const SheetEdge& edge, int layer) {
    const auto& column = sheet.columns[at(edge.column[0])];
    const int n = corners(column.kind);
    const Vec2 a = sheet.plan[at(column.node[at(edge.slot[0])])];
    const Vec2 b = sheet.plan[at(column.node[at((edge.slot[0] + 1) % n)])];
    const double low = sheet.level_m[at(layer)], high = sheet.level_m[at(layer + 1)];
    Element e;
    e.role = ElementRole::panel;
    e.corner = {lift(a, low), lift(b, low), lift(b, high), lift(a, high)};
    return e;
}

Element layer_element(const SheetMesh& sheet, int column, int layer) {
    const double low = sheet.level_m[at(layer)], high = sheet.level_m[at(layer + 1)];
    Element e = flat_element(sheet, sheet.columns[at(column)], 0.5 * (low + high), ElementRole::layer);
    e.thickness_m = high - low;
    return e;
}

/// Visits every panel of all sheets, then every layer, in the one order that fixes the numbering.
template <class Face, class Wall, class Layer>
void visit(const Mesh& mesh, const Face& face, const Wall& wall, const Layer& layer) {
    for (std::size_t s = 0; s < mesh.sheets.size(); ++s) {
        const SheetMesh& sheet = mesh.sheets[s];
        const int columns = static_cast<int>(sheet.columns.size()), layers = sheet.layers();
        for (int c = 0; c < columns; ++c)
            for (const bool top : {false, true}) face(s, c, top);
        const auto edges = sheet_edges(sheet);
        for (std::size_t e = 0; e < edges.size(); ++e)
            if (edges[e].column[1] < 0)
                for (int l = 0; l < layers; ++l) wall(s, e, edges[e], l);
    }
    for (std::size_t s = 0; s < mesh.sheets.size(); ++s)
        for (int c = 0; c < static_cast<int>(mesh.sheets[s].columns.size()); ++c)
            for (int l = 0; l < mesh.sheets[s].layers(); ++l) layer(s, c, l);
}

int metal_on_face(const SheetMesh& sheet, int column, bool top) {
    const auto& on = top ? sheet.metal_on_top : sheet.metal_on_bottom;
    return on.empty() ? -1 : on[at(column)];
}

}  // namespace

std::vector<SheetEdge> sheet_edges(const SheetMesh& sheet) {
    std::vector<SheetEdge> edges;
    std::map<std::pair<int, int>, std::size_t> known;
    for (int c = 0; c < static_cast<int>(sheet.columns.size()); ++c) {
        const auto& column = sheet.columns[at(c)];
        const int n = corners(column.kind);
        for (int slot = 0; slot < n; ++slot) {
            const int a = column.node[at(slot)], b = column.node[at((slot + 1) % n)];
            const auto [entry, fresh] = known.try_emplace({std::min(a, b), std::max(a, b)}, edges.size());
            if (fresh) edges.emplace_back();
            SheetEdge& edge = edges[entry->second];
            edge.column[fresh ? 0 : 1] = c;
            edge.slot[fresh ? 0 : 1] = slot;
        }
    }
    return edges;
}

std::vector<Element> make_elements(const Mesh& mesh) {
    std::vector<Element> out;
    for (const Cell& cell : mesh.cells) out.push_back(metal_element(mesh, cell));
    visit(
        mesh,
        [&](std::size_t s, int c, bool top) {
            const SheetMesh& sheet = mesh.sheets[s];
            const double z = top ? sheet.level_m.back() : sheet.level_m.front();
            if (metal_on_face(sheet, c, top) < 0)
                out.push_back(flat_element(sheet, sheet.columns[at(c)], z, ElementRole::panel));
        },
        [&](std::size_t s, std::size_t, const SheetEdge& edge, int l) {
            out.push_back(wall_element(mesh.sheets[s], edge, l));
        },
        [&](std::size_t s, int c, int l) { out.push_back(layer_element(mesh.sheets[s], c, l)); });
    return out;
}

std::vector<SheetElements> sheet_elements(const Mesh& mesh) {
    std::vector<SheetElements> out(mesh.sheets.size());
    for (std::size_t s = 0; s < mesh.sheets.size(); ++s) {
        out[s].wall.resize(sheet_edges(mesh.sheets[s]).size());
        out[s].layer.resize(mesh.sheets[s].columns.size());
    }
    int next = static_cast<int>(mesh.cells.size());
    visit(
        mesh,
        [&](std::size_t s, int c, bool top) {
            const int metal = metal_on_face(mesh.sheets[s], c, top);
            (top ? out[s].top : out[s].bottom).push_back(metal >= 0 ? metal : next);
            if (metal < 0) ++next;
        },
        [&](std::size_t s, std::size_t e, const SheetEdge&, int) { out[s].wall[e].push_back(next++); },
        [&](std::size_t s, int c, int) { out[s].layer[at(c)].push_back(next++); });
    return out;
}

}  // namespace annulet
