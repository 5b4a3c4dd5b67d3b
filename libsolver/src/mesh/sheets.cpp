#include "mesh/sheets.hpp"

#include <algorithm>
#include <cmath>

#include "mesh/footprint.hpp"
#include "mesh/free_sheet.hpp"

namespace annulet {

namespace {

Vec2 middle(const Loop& corners) {
    Vec2 sum(0, 0);
    for (const Vec2& p : corners) sum += p;
    return sum / static_cast<double>(corners.size());
}

class SheetMaker {
public:
    SheetMaker(Mesh& mesh, const StripGrids& grids, MeshFaults& faults) : mesh_(mesh), grids_(grids), faults_(faults) {}

    void add(int index) {
        const Laminate& laminate = grids_.model.laminates[static_cast<std::size_t>(index)];
        const SheetOutline outline = sheet_outline(grids_.model, laminate);
        if (outline.region.empty()) return nothing_left(laminate);
        const Footprint top(mesh_, laminate.top_m), bottom(mesh_, laminate.bottom_m());
        auto plan = strip_sheet(grids_, laminate, outline);
        if (!plan || !covered(*plan, laminate, outline, top, bottom)) {
            plan = free_sheet(outline, {&top, &bottom}, grids_.options, laminate, faults_);
            if (!plan) return;
        }
        SheetMesh sheet;
        sheet.laminate = index;
        cover(*plan, top, sheet.metal_on_top);
        cover(*plan, bottom, sheet.metal_on_bottom);
        const int layers =
            std::max(1, static_cast<int>(std::lround(grids_.model.accuracy.layers * grids_.options.refine)));
        sheet.level_m = layer_levels(laminate, layers, !sheet.metal_on_top.empty(), !sheet.metal_on_bottom.empty());
        drop_unused(*plan);
        sheet.plan = std::move(plan->points);
        sheet.columns = std::move(plan->columns);
        mesh_.sheets.push_back(std::move(sheet));
    }

private:
    void nothing_left(const Laminate& laminate) {
        faults_.add(laminate.where,
                    fmt::format("laminate '{}' has no area left: its openings take it all away", laminate.name));
    }

    // By column the cell that covers it; empty if there is none at all. Moves plan points onto the nodes.
    static void cover(SheetPlan& plan, const Footprint& face, std::vector<int>& metal) {
        metal.clear();
        if (face.cells().empty()) return;
        std::vector<int> node;
        for (Vec2& p : plan.points) {
            node.push_back(face.node_at(p));
            if (node.back() >= 0) p = face.point(node.back());
        }
        bool any = false;
        for (const SheetMesh::Column& column : plan.columns) {
            std::array<int, 4> nodes{-1, -1, -1, -1};
            bool complete = true;
            for (std::size_t i = 0; i < 4; ++i) {
                if (column.node[i] >= 0) nodes[i] = node[static_cast<std::size_t>(column.node[i])];
                complete = complete && (column.node[i] < 0 || nodes[i] >= 0);
            }
            metal.push_back(complete ? face.cell_with(nodes) : -1);
            any = any || metal.back() >= 0;
        }
        if (!any) metal.clear();
    }

    // True if each cell of the faces that lies over the sheet covers a column.
    bool covered(const SheetPlan& plan, const Laminate& laminate, const SheetOutline& outline, const Footprint& top,
                 const Footprint& bottom) const {
        for (const Footprint* face : {&top, &bottom}) {
            SheetPlan copy = plan;
            std::vector<int> metal;
            cover(copy, *face, metal);
            const auto count =
                static_cast<std::size_t>(std::count_if(metal.begin(), metal.end(), [](int m) { return m >= 0; }));
            std::size_t wanted = face->cells().size();
            if (!laminate.openings.empty())
                wanted =
                    static_cast<std::size_t>(std::count_if(face->cells().begin(), face->cells().end(), [&](int cell) {
                        return inside(outline.region, middle(face->corners(cell)));
                    }));
            if (count != wanted) return false;
        }
        return true;
    }

    static void drop_unused(SheetPlan& plan) {
        std::vector<int> number(plan.points.size(), -1);
        std::vector<Vec2> kept;
        for (SheetMesh::Column& column : plan.columns)
            for (int& node : column.node) {
                if (node < 0) continue;
                int& known = number[static_cast<std::size_t>(node)];
                if (known < 0) {
                    known = static_cast<int>(kept.size());
                    kept.push_back(plan.points[static_cast<std::size_t>(node)]);
                }
                node = known;
            }
        plan.points = std::move(kept);
    }

    Mesh& mesh_;
    const StripGrids& grids_;
    MeshFaults& faults_;
};

}  // namespace

void add_sheets(Mesh& mesh, const StripGrids& grids, MeshFaults& faults) {
    mesh.laminates = grids.model.laminates;
    SheetMaker maker(mesh, grids, faults);
    for (std::size_t k = 0; k < grids.model.laminates.size(); ++k) maker.add(static_cast<int>(k));
}

}  // namespace annulet
