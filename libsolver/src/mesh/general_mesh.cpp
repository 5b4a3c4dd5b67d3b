#include "mesh/general_mesh.hpp"

#include <algorithm>
#include <cmath>
#include <limits>
#include <map>

#include "mesh/cross_grid.hpp"
#include "mesh/fill.hpp"
#include "mesh/shared_outlines.hpp"
#include "mesh/strip_sheet.hpp"

namespace annulet {

namespace {

constexpr double infinity = std::numeric_limits<double>::infinity();
constexpr double metal_growth = 0.5;  // of triangles and of spacing along outlines, per distance
constexpr double corner_cells = 1.7;  // first step along the outline from a corner, in widths of the edge layer
constexpr double sharp_turn_rad = 0.3;
constexpr double shortest_of_width = 0.02;
constexpr double fewest_cells_per_gap = 2;
constexpr double least_area_m2 = 1e-12;  // what booleans of coinciding edges leave behind

// Width of the region at a point of its outline: along the inward normal to an edge that faces it; infinite where the
// first edge met does not.
double ray(const Loops2& loops, const Vec2& from, const Vec2& along) {
    double nearest = infinity;
    bool facing = false;
    for (const Loop& loop : loops)
        for (std::size_t i = 0; i < loop.size(); ++i) {
            const Vec2 &a = loop[i], edge = loop[(i + 1) % loop.size()] - a;
            const double turn = cross(along, edge);
            if (std::abs(turn) < 1e-12 * edge.norm()) continue;
            const double t = cross(a - from, edge) / turn, u = cross(a - from, along) / turn;
            if (!(t > 1e-8 && u >= 0 && u <= 1 && t < nearest)) continue;
            nearest = t;
            facing = turn > 0.5 * edge.norm();
        }
    return facing ? nearest : infinity;
}

class GeneralMesher {
public:
    GeneralMesher(Mesh& mesh, const Model& model, const std::vector<bool>& general, const GeneralPlane& plane,
                  const MeshOptions& options)
        : mesh_(mesh), model_(model), general_(general), plane_(plane), options_(options) {}

    void add() {
        std::vector<Loops2> parts = metal_parts();
        const std::size_t metals = parts.size();
        for (const GeneralGap& gap : plane_.gaps) parts.push_back(gap.region);
        Loops2 all;
        for (const Loops2& part : parts) all.insert(all.end(), part.begin(), part.end());
        find_sources();
        const std::vector<DividedLoop> divided = divide_outlines(
            all, [this](const Vec2& p) { return size(p); }, options_.refine);
        std::size_t loop = 0;
        for (std::size_t k = 0; k < parts.size(); ++k) {
            const auto own = std::span(divided).subspan(loop, parts[k].size());
            loop += parts[k].size();
            add_part(own, k < metals ? nullptr : &plane_.gaps[k - metals]);
        }
    }

private:
    // Divided along the edges of the sheets that it lies on.
    std::vector<Loops2> metal_parts() const {
        std::vector<Loops2> regions{plane_.metal};
        for (const Laminate& laminate : model_.laminates) {
            if (!on_top(laminate, plane_.plane_m) && !on_bottom(laminate, plane_.plane_m)) continue;
            const Loops2 sheet = sheet_outline(model_, laminate).region;
            std::vector<Loops2> divided;
            for (const Loops2& region : regions) {
                divided.push_back(common(region, sheet));
                divided.push_back(without(region, sheet));
            }
            regions = std::move(divided);
        }
        std::vector<Loops2> parts;
        for (const Loops2& region : regions)
            for (Loops2& part : separate(region))
                if (area_of(part) > least_area_m2) parts.push_back(std::move(part));
        return parts;
    }

    // Where cells begin small: corners of the outline and gaps.
    struct Source {
        Vec2 at{0, 0};
        double size_m = 0;
    };

    void find_sources() {
        for (const Loop& loop : plane_.metal)
            for (std::size_t i = 0; i < loop.size(); ++i) {
                const Vec2 in = loop[i] - loop[(i + loop.size() - 1) % loop.size()],
                           out = loop[(i + 1) % loop.size()] - loop[i];
                const Vec2 edge = out.normalized();
                const double width = ray(plane_.metal, 0.5 * (loop[i] + loop[(i + 1) % loop.size()]), left_of(edge));
                if (std::isfinite(width)) widths_.push_back({0.5 * (loop[i] + loop[(i + 1) % loop.size()]), width});
                if (std::abs(std::atan2(cross(in, out), in.dot(out))) < sharp_turn_rad) continue;
                const double corner_width = std::min(ray(plane_.metal, loop[i] + 0.3 * out, left_of(edge)),
                                                     ray(plane_.metal, loop[i] - 0.3 * in, left_of(in.normalized())));
                sources_.push_back({loop[i], corner_cells * edge_cell(corner_width)});
            }
        for (const GeneralGap& gap : plane_.gaps) {
            const double width = area_of(gap.region) / gap.length_m;
            const double cell =
                gap.length_m / std::max(fewest_cells_per_gap, std::ceil(gap.length_m / std::min(width, wave())));
            for (const Loop& loop : gap.region)
                for (const Vec2& p : loop) sources_.push_back({p, cell});
        }
    }

    double wave() const { return wave_cell_m(options_); }

    // Width of the cell at an edge of metal of this width.
    double edge_cell(double width_m) const {
        if (!std::isfinite(width_m)) return infinity;
        return std::max(edge_cell_m(width_m, options_), shortest_of_width * width_m);
    }

    double width_at(const Vec2& p) const {
        double nearest = infinity, width = infinity;
        for (const Source& source : widths_)
            if (const double d = (source.at - p).squaredNorm(); d < nearest) nearest = d, width = source.size_m;
        return width;
    }

    double size(const Vec2& p) const {
        double h = std::min(wave(), width_at(p));
        for (const Source& source : sources_) h = std::min(h, source.size_m + metal_growth * (p - source.at).norm());
        return h;
    }

    void add_part(std::span<const DividedLoop> loops, const GeneralGap* gap) {
        FillRequest request;
        request.growth = metal_growth;
        request.h_max_m = wave();
        request.refine = options_.refine;
        request.most_layers = gap == nullptr ? 1 : 0;
        for (const DividedLoop& loop : loops) request.loops.push_back(loop.points);
        if (std::isinf(request.h_max_m)) {
            const Box box = box_of(request.loops);
            request.h_max_m = (box.high - box.low).maxCoeff();
        }
        for (const DividedLoop& loop : loops) request.first_layer_m.push_back(first_layers(loop, request.loops));
        const FilledRegion filled = fill(request);
        for (const SheetMesh::Column& column : filled.cells) add_cell(filled.points, column, gap);
    }

    // FillRequest's first layer over the width of its first cell.
    static double first_of_layer() { return metal_growth / std::expm1(metal_growth); }

    // At free edges only.
    std::vector<double> first_layers(const DividedLoop& loop, const Loops2& part) const {
        const std::size_t n = loop.points.size();
        std::vector<double> ahead(n, 0.0), first(n, 0.0);
        for (std::size_t i = 0; i < n; ++i) {
            const Vec2 &a = loop.points[i], &b = loop.points[(i + 1) % n];
            if (loop.shared[i]) continue;
            double width = ray(part, 0.5 * (a + b), left_of((b - a).normalized()));
            if (std::isinf(width)) width = width_at(0.5 * (a + b));
            if (std::isfinite(width)) ahead[i] = first_of_layer() * edge_cell_m(width, options_);
        }
        for (std::size_t i = 0; i < n; ++i) {
            const double before = ahead[(i + n - 1) % n];
            if (before > 0 && ahead[i] > 0) first[i] = std::min(before, ahead[i]);
        }
        return first;
    }

    int node(const Vec2& p) {
        const auto [found, added] = nodes_.emplace(std::make_pair(p.x(), p.y()), static_cast<int>(mesh_.nodes.size()));
        if (added) mesh_.nodes.push_back(lift(p, plane_.plane_m));
        return found->second;
    }

    void add_cell(const std::vector<Vec2>& points, const SheetMesh::Column& column, const GeneralGap* gap) {
        Cell cell;
        cell.kind = column.kind;
        Vec2 middle(0, 0);
        for (int i = 0; i < cell.corners(); ++i) {
            const auto k = static_cast<std::size_t>(i);
            const Vec2& p = points[static_cast<std::size_t>(column.node[k])];
            cell.node[k] = node(p);
            middle += p / cell.corners();
        }
        if (gap == nullptr) cell.conductor = conductor_at(middle);
        mesh_.cells.push_back(cell);
        if (gap == nullptr) return;
        const auto place = static_cast<std::size_t>(gap->place);
        Gap& target = place < mesh_.ports.size() ? mesh_.ports[place] : mesh_.lumped[place - mesh_.ports.size()];
        target.length_m = gap->length_m;
        target.members.push_back({static_cast<int>(mesh_.cells.size()) - 1, lift(gap->direction / gap->length_m, 0)});
    }

    const Region& region(std::size_t metal) {
        const auto found = regions_.find(metal);
        return found != regions_.end() ? found->second
                                       : regions_.emplace(metal, Region(model_.metals[metal].shape)).first->second;
    }

    // That of the metal listed last which holds the point.
    int conductor_at(const Vec2& p) {
        const Metal* owner = nullptr;
        double nearest = infinity;
        for (std::size_t k = 0; k < model_.metals.size(); ++k) {
            const Metal& metal = model_.metals[k];
            if (metal.cut || !general_[k] || std::abs(metal.plane_m - plane_.plane_m) > 1e-9) continue;
            const double level = std::max(region(k).level(p), 0.0);
            if (level <= nearest) nearest = level, owner = &metal;
        }
        const Conductor& wanted = owner->conductor;
        for (std::size_t c = 0; c < mesh_.conductors.size(); ++c) {
            const Conductor& known = mesh_.conductors[c];
            if (known.name == wanted.name && known.conductivity_s_per_m == wanted.conductivity_s_per_m &&
                known.thickness_m == wanted.thickness_m && known.roughness_rms_m == wanted.roughness_rms_m)
                return static_cast<int>(c);
        }
        mesh_.conductors.push_back(wanted);
        return static_cast<int>(mesh_.conductors.size()) - 1;
    }

    Mesh& mesh_;
    const Model& model_;
    const std::vector<bool>& general_;
    const GeneralPlane& plane_;
    const MeshOptions& options_;
    std::vector<Source> sources_, widths_;
    std::map<std::pair<double, double>, int> nodes_;
    std::map<std::size_t, Region> regions_;
};

}  // namespace

void add_general(Mesh& mesh, const Model& model, const std::vector<bool>& general,
                 const std::vector<GeneralPlane>& planes, const MeshOptions& options) {
    for (const GeneralPlane& plane : planes) GeneralMesher(mesh, model, general, plane, options).add();
}

}  // namespace annulet
