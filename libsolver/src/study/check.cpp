#include <fmt/format.h>

#include <algorithm>
#include <annulet/mesh/plan.hpp>
#include <annulet/study/check.hpp>
#include <cmath>
#include <numeric>
#include <set>

namespace annulet {

namespace {

// Cells that share an edge or a node of a segment, as numbers of connected parts.
class Islands {
public:
    explicit Islands(const Mesh& mesh) : parent_(mesh.nodes.size()) {
        std::iota(parent_.begin(), parent_.end(), 0);
        for (const Cell& cell : mesh.cells)
            for (int i = 1; i < cell.corners(); ++i) unite(cell.node[0], cell.node[static_cast<std::size_t>(i)]);
    }
    int of(const Cell& cell) { return root(cell.node[0]); }

private:
    int root(int i) {
        while (parent_[static_cast<std::size_t>(i)] != i) i = parent_[static_cast<std::size_t>(i)];
        return i;
    }
    void unite(int a, int b) { parent_[static_cast<std::size_t>(root(a))] = root(b); }
    std::vector<int> parent_;
};

Vec3 middle(const Mesh& mesh, const Cell& cell) {
    Vec3 sum(0, 0, 0);
    for (int i = 0; i < cell.corners(); ++i)
        sum += mesh.nodes[static_cast<std::size_t>(cell.node[static_cast<std::size_t>(i)])];
    return sum / cell.corners();
}

std::vector<std::string> floating_metal(const Mesh& mesh) {
    Islands islands(mesh);
    std::set<int> fed;
    for (const Gap& port : mesh.ports)
        for (const Gap::Member& member : port.members)
            fed.insert(islands.of(mesh.cells[static_cast<std::size_t>(member.cell)]));
    std::set<int> told;
    std::vector<std::string> texts;
    for (const Cell& cell : mesh.cells) {
        const int island = islands.of(cell);
        if (fed.contains(island) || !told.insert(island).second) continue;
        const Vec3 at = middle(mesh, cell) * 1e3;
        texts.push_back(
            fmt::format("the metal around ({:.4g}, {:.4g}, {:.4g}) mm is joined to no port: it acts by "
                        "coupling alone",
                        at.x(), at.y(), at.z()));
    }
    return texts;
}

int inner_edges(const SheetMesh& sheet) {
    std::set<std::pair<int, int>> seen;
    int inner = 0;
    for (const SheetMesh::Column& column : sheet.columns) {
        const std::size_t n = column.kind == CellKind::quadrilateral ? 4 : 3;
        for (std::size_t i = 0; i < n; ++i)
            inner += seen.insert(std::minmax(column.node[i], column.node[(i + 1) % n])).second ? 0 : 1;
    }
    return inner;
}

void add(std::vector<PlacedFinding>& findings, const std::string& layer, const std::vector<RuleFinding>& rules) {
    for (const RuleFinding& rule : rules) findings.push_back({layer, rule});
}

}  // namespace

std::vector<PlacedFinding> rule_findings(const Model& model) {
    std::vector<PlacedFinding> findings;
    const Fabrication& rules = model.fabrication;
    for (const MetalPlane& plane : metal_planes(model)) {
        const std::string layer = fmt::format("metal at {:.4g} mm", plane.plane_m * 1e3);
        if (rules.minimum_slot_m) add(findings, layer, narrow_slots(plane.region, *rules.minimum_slot_m));
        if (rules.minimum_web_m) add(findings, layer, narrow_webs(plane.region, *rules.minimum_web_m));
    }
    for (const Laminate& laminate : model.laminates) {
        const std::string layer = fmt::format("laminate '{}'", laminate.name);
        const Loops2 region = sheet_region(model, laminate);
        if (rules.minimum_web_m) add(findings, layer, narrow_webs(region, *rules.minimum_web_m));
        if (rules.tool_radius_m) add(findings, layer, tight_corners(region, *rules.tool_radius_m));
    }
    return findings;
}

MeshOptions check_mesh_options(const Model& model) {
    MeshOptions options;
    options.top_frequency_hz = model.sweep.to_hz;
    for (const double f : model.sweep.at_hz) options.top_frequency_hz = std::max(options.top_frequency_hz, f);
    if (options.top_frequency_hz <= 0 && model.goal.band) options.top_frequency_hz = model.goal.band->to_hz;
    if (model.accuracy.cells_per_wavelength) options.cells_per_wavelength = *model.accuracy.cells_per_wavelength;
    if (model.accuracy.cells_across) options.cells_across = *model.accuracy.cells_across;
    return options;
}

CheckReport check_model(const Model& model, const Mesh& mesh, double top_frequency_hz) {
    CheckReport report;
    report.top_frequency_hz = top_frequency_hz;
    report.quality = mesh_quality(mesh, top_frequency_hz);
    for (const SheetMesh& sheet : mesh.sheets) {
        report.laminate_cells += sheet.layers() * static_cast<int>(sheet.columns.size());
        report.laminate_unknowns += sheet.layers() * inner_edges(sheet) + static_cast<int>(sheet.columns.size());
    }
    const bool full = model.accuracy.laminate == LaminateMethod::full;
    report.matrix_memory_bytes = matrix_bytes(report.quality.interior_edges + (full ? report.laminate_unknowns : 0));
    const double longest = report.quality.largest_over_wavelength;
    report.cells_per_wavelength = longest > 0 ? 1 / longest : 0;
    report.findings = rule_findings(model);
    report.electrical = floating_metal(mesh);
    return report;
}

}  // namespace annulet
