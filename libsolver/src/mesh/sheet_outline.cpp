#include "mesh/sheet_outline.hpp"

#include <algorithm>
#include <cmath>

namespace annulet {

namespace {

constexpr double same_plane_m = 1e-9;
constexpr double arc_error_of_margin = 1e-3;  // of round corners, as a fraction of the margin

const Metal* metal_named(const Model& model, const std::string& name) {
    for (const Metal& metal : model.metals)
        if (metal.name == name) return &metal;
    return nullptr;
}

// Rings stay rings.
std::optional<Shape> ring_around(const Shape& shape, double margin_m) {
    const auto* ring = std::get_if<Ring>(&shape);
    if (ring == nullptr || ring->width_m + 2 * margin_m >= 2 * ring->radius_m) return std::nullopt;
    return Ring{ring->centre, ring->radius_m, ring->width_m + 2 * margin_m};
}

Loops2 openings_of(const Laminate& laminate) {
    Loops2 all;
    for (const Shape& opening : laminate.openings) all = united(all, region_of(opening));
    return all;
}

// Depth of interface u in [0, 1] below metal: two layers come out as 1 : 2.
double graded_depth(double u) {
    return u / 3 + 2 * u * u / 3;
}

class EdgePlacer {
public:
    EdgePlacer(const Model& model, Layout& layout, MeshFaults& faults)
        : model_(model), layout_(layout), faults_(faults) {}

    void sheet(const Laminate& laminate) {
        std::vector<Region> regions;
        const SheetOutline outline = sheet_outline(model_, laminate);
        if (const auto* around = std::get_if<AroundMetal>(&laminate.outline)) followed_ = around->metal;
        if (outline.shape) regions.emplace_back(*outline.shape);
        if (!outline.shape && outline.outer.size() == 1) regions.emplace_back(Polygon{outline.outer[0]});
        const std::size_t outlines = regions.size();
        for (const Shape& opening : laminate.openings) regions.emplace_back(opening);
        for (std::size_t k = 0; k < layout_.pieces.size(); ++k) {
            if (!carried(laminate, metal(k))) continue;
            for (std::size_t i = 0; i < regions.size(); ++i)
                if (i >= outlines || metal(k).name != followed_) cross(laminate, layout_.pieces[k], regions[i], i);
        }
        align(laminate);
        followed_.clear();
    }

private:
    const Metal& metal(std::size_t piece) const {
        return model_.metals[static_cast<std::size_t>(layout_.pieces[piece].metal)];
    }
    static bool carried(const Laminate& laminate, const Metal& metal) {
        return on_top(laminate, metal.plane_m) || on_bottom(laminate, metal.plane_m);
    }

    void cross(const Laminate& laminate, Piece& piece, const Region& region, std::size_t index) {
        if (!enters(piece, region)) return;
        const Crossings found = find_crossings(piece.ribbon, std::make_shared<const Region>(region));
        bool clean = found.kind == Crossing::full;
        for (const Track& track : found.tracks) {
            if (!track.from_start())
                clean &= insert_sheet_edge(piece, [track](double tau) { return track.enter_s_m(tau); });
            if (!track.to_end()) clean &= insert_sheet_edge(piece, [track](double tau) { return track.exit_s_m(tau); });
        }
        if (clean) return;
        faults_.add(
            laminate.where,
            fmt::format("{} of laminate '{}' cuts into metal '{}' otherwise than from edge to edge, which is not "
                        "yet meshed",
                        index == 0 ? "the outline" : "an opening", laminate.name,
                        model_.metals[static_cast<std::size_t>(piece.metal)].name),
            "let the sheet end beyond the metal or across it, away from ports and corners");
    }

    // True if the region covers a part of this piece but not all; a cut may have taken the rest of the strip away.
    static bool enters(const Piece& piece, const Region& region) {
        const Loops2 strip = filled(piece.outline), covered = common(strip, filled(region.loops()));
        const double whole = area_of(strip), part = area_of(covered), slack = 1e-3 * whole;
        return part > slack && part < whole - slack;
    }

    void align(const Laminate& laminate) {
        for (std::size_t k = 0; k < layout_.pieces.size(); ++k) {
            const Piece& piece = layout_.pieces[k];
            if (piece.loop || !carried(laminate, metal(k))) continue;
            std::size_t next = k + 1;
            if (next == layout_.pieces.size() || layout_.pieces[next].metal != piece.metal) {
                if (!piece.ribbon->closed()) continue;
                for (next = k; next > 0 && layout_.pieces[next - 1].metal == piece.metal;) --next;
            }
            if (next == k) continue;
            layout_.aligned.push_back({{static_cast<int>(k), true, -1, 1}, {static_cast<int>(next), false, -1, 1}});
        }
    }

    const Model& model_;
    Layout& layout_;
    MeshFaults& faults_;
    std::string followed_;  // the metal that the outline follows
};

}  // namespace

SheetOutline sheet_outline(const Model& model, const Laminate& laminate) {
    SheetOutline outline;
    if (const auto* shape = std::get_if<Shape>(&laminate.outline)) {
        outline.shape = *shape;
    } else {
        const auto& around = std::get<AroundMetal>(laminate.outline);
        const Metal* metal = metal_named(model, around.metal);
        if (metal != nullptr) outline.shape = ring_around(metal->shape, around.margin_m);
        if (metal != nullptr && !outline.shape)
            outline.outer = offset_by(region_of(metal->shape), around.margin_m,
                                      std::max(1e-7, arc_error_of_margin * around.margin_m));
    }
    if (outline.shape) outline.outer = region_of(*outline.shape);
    outline.region = laminate.openings.empty() ? outline.outer : without(outline.outer, openings_of(laminate));
    return outline;
}

bool on_top(const Laminate& laminate, double plane_m) {
    return std::abs(plane_m - laminate.top_m) <= same_plane_m;
}
bool on_bottom(const Laminate& laminate, double plane_m) {
    return std::abs(plane_m - laminate.bottom_m()) <= same_plane_m;
}

std::vector<double> layer_levels(const Laminate& laminate, int layers, bool metal_on_top, bool metal_on_bottom) {
    std::vector<double> levels;
    for (int k = 0; k <= layers; ++k) {
        const double u = static_cast<double>(k) / layers;  // from the bottom up
        double height = u;
        if (metal_on_top && metal_on_bottom)
            height = u < 0.5 ? 0.5 * graded_depth(2 * u) : 1 - 0.5 * graded_depth(2 * (1 - u));
        else if (metal_on_top)
            height = 1 - graded_depth(1 - u);
        else if (metal_on_bottom)
            height = graded_depth(u);
        levels.push_back(laminate.bottom_m() + height * laminate.thickness_m);
    }
    levels.back() = laminate.top_m;
    return levels;
}

void place_sheet_edges(const Model& model, Layout& layout, MeshFaults& faults) {
    EdgePlacer placer(model, layout, faults);
    for (const Laminate& laminate : model.laminates) placer.sheet(laminate);
}

}  // namespace annulet
