#include "mesh/gaps.hpp"

#include <algorithm>
#include <cmath>

#include "mesh/bridges.hpp"
#include "mesh/general_metal.hpp"
#include "mesh/sheet_outline.hpp"

namespace annulet {

namespace {

bool same(const Vec2& a, const Vec2& b, double within_m) {
    return (a - b).norm() <= within_m;
}

void check_unsupported(const Model& model, MeshFaults& faults) {
    for (const Via& via : model.vias)
        faults.add(via.where, fmt::format("via '{}' is not yet meshed", via.name), "leave it out for now");
}

const Metal& metal_of(const Model& model, const Piece& piece) {
    return model.metals[static_cast<std::size_t>(piece.metal)];
}

}  // namespace

std::vector<Place> places_of(const Model& model) {
    std::vector<Place> places;
    for (const Port& port : model.ports)
        places.push_back({fmt::format("port '{}'", port.name), port.placement, port.where});
    for (const Lumped& part : model.lumped)
        places.push_back({fmt::format("part '{}'", part.name), part.placement, part.where});
    return places;
}

std::vector<Join> find_joins(const Model& model, const std::vector<Piece>& pieces) {
    struct End {
        int piece;
        bool at_end;
        Vec2 right, left;
    };
    std::vector<End> ends;
    for (std::size_t k = 0; k < pieces.size(); ++k)
        for (const bool at_end : {false, true})
            if (!pieces[k].loop)
                ends.push_back(
                    {static_cast<int>(k), at_end, pieces[k].front_point(at_end, -1), pieces[k].front_point(at_end, 1)});
    std::vector<Join> joins;
    for (std::size_t i = 0; i < ends.size(); ++i)
        for (std::size_t j = i + 1; j < ends.size(); ++j) {
            const End &a = ends[i], &b = ends[j];
            const Piece &piece_a = pieces[static_cast<std::size_t>(a.piece)],
                        &piece_b = pieces[static_cast<std::size_t>(b.piece)];
            if (std::abs(metal_of(model, piece_a).plane_m - metal_of(model, piece_b).plane_m) > 1e-9) continue;
            const double within = 1e-6 * piece_a.ribbon->narrowest_m();
            const bool straight = same(a.right, b.right, within) && same(a.left, b.left, within);
            const bool turned = same(a.right, b.left, within) && same(a.left, b.right, within);
            if (!straight && !turned) continue;
            Join join{{a.piece, a.at_end, -1, 1}, {b.piece, b.at_end, straight ? -1.0 : 1.0, straight ? 1.0 : -1.0}};
            joins.push_back(join);
        }
    return joins;
}

Layout lay_out(const Model& model, MeshFaults& faults) {
    Layout layout;
    check_unsupported(model, faults);
    layout.general = general_metals(model);
    layout.pieces = lay_out_metal(model, faults, layout.general);
    // A port on metal that is at fault would only repeat that fault.
    if (!faults.empty()) return layout;
    if (layout.pieces.empty() && model.wires.empty() &&
        std::find(layout.general.begin(), layout.general.end(), true) == layout.general.end()) {
        faults.add(model.metals.empty() ? Position{} : model.metals[0].where, "there is no metal to mesh");
        return layout;
    }
    const std::vector<Place> places = places_of(model);
    for (std::size_t k = 0; k < places.size(); ++k) {
        const Place& place = places[k];
        const std::vector<std::size_t> touched = metals_touched(model, place.placement);
        if (!touched.empty() && layout.general[touched[0]]) continue;
        if (const auto* bridge = std::get_if<Bridge>(&place.placement)) {
            if (auto span = place_bridge(model, layout, static_cast<int>(k), place, *bridge, faults))
                layout.spans.push_back(*span);
        } else if (const auto* across = std::get_if<Across>(&place.placement)) {
            place_slit(model, layout, static_cast<int>(k), place, *across, faults);
        }
    }
    place_sheet_edges(model, layout, faults);
    for (Piece& piece : layout.pieces) finish_fronts(piece, model, faults);
    layout.joins = find_joins(model, layout.pieces);
    check_contacts(model, layout, faults);
    return layout;
}

}  // namespace annulet
