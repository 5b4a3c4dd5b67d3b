#include "mesh/general_metal.hpp"

#include <algorithm>
#include <cmath>

#include "mesh/bridges.hpp"

namespace annulet {

namespace {

constexpr double same_plane_m = 1e-9;
constexpr double touch_m = 1e-7;  // nearer than this is contact
constexpr double arc_error_m = 1e-7;

bool on_plane(const Metal& metal, double plane_m) {
    return std::abs(metal.plane_m - plane_m) <= same_plane_m;
}

// What the cuts listed after it leave of a metal.
Loops2 left_of_metal(const Model& model, std::size_t k) {
    Loops2 region = region_of(model.metals[k].shape);
    for (std::size_t c = k + 1; c < model.metals.size(); ++c) {
        const Metal& cut = model.metals[c];
        if (cut.cut && on_plane(cut, model.metals[k].plane_m) && flaw(cut.shape).empty())
            region = without(region, region_of(cut.shape));
    }
    return region;
}

class Classifier {
public:
    explicit Classifier(const Model& model) : model_(model), general_(model.metals.size(), false) {}

    std::vector<bool> found() {
        for (std::size_t k = 0; k < model_.metals.size(); ++k) {
            regions_.emplace_back();
            grown_.emplace_back();
            if (!usable(k)) continue;
            regions_[k] = left_of_metal(model_, k);
            grown_[k] = offset_by(regions_[k], touch_m, arc_error_m);
        }
        shapes();
        contacts();
        bridges_to_sides();
        for (bool changed = true; changed;) changed = spread();
        return std::move(general_);
    }

private:
    bool usable(std::size_t k) const { return !model_.metals[k].cut && flaw(model_.metals[k].shape).empty(); }

    void shapes() {
        for (std::size_t k = 0; k < model_.metals.size(); ++k) {
            if (!usable(k)) continue;
            general_[k] = classify(model_.metals[k].shape) == ConductorKind::general;
            if (general_[k]) continue;
            // Alone with its cuts: a fault means a notch, a hole or a wedge.
            Model alone;
            for (std::size_t c = k; c < model_.metals.size(); ++c)
                if (c == k || (model_.metals[c].cut && flaw(model_.metals[c].shape).empty()))
                    alone.metals.push_back(model_.metals[c]);
            MeshFaults faults;
            for (const Piece& piece : lay_out_metal(alone, faults)) {
                pieces_.push_back(piece);
                pieces_.back().metal = static_cast<int>(k);
            }
            general_[k] = !faults.empty();
        }
        joins_ = find_joins(model_, pieces_);
    }

    bool joined(std::size_t a, std::size_t b) const {
        return std::any_of(joins_.begin(), joins_.end(), [&](const Join& join) {
            const auto from = static_cast<std::size_t>(pieces_[static_cast<std::size_t>(join.from.piece)].metal);
            const auto to = static_cast<std::size_t>(pieces_[static_cast<std::size_t>(join.to.piece)].metal);
            return std::minmax(from, to) == std::minmax(a, b);
        });
    }

    bool touching(std::size_t a, std::size_t b) const {
        if (!on_plane(model_.metals[a], model_.metals[b].plane_m) || grown_[a].empty() || grown_[b].empty())
            return false;
        if (apart(box_of(grown_[a]), box_of(grown_[b]), 0)) return false;
        return area_of(common(grown_[a], regions_[b])) > 0;
    }

    void contacts() {
        for (std::size_t a = 0; a < regions_.size(); ++a)
            for (std::size_t b = a + 1; b < regions_.size(); ++b) {
                if (!touching(a, b)) continue;
                contacts_.emplace_back(a, b);
                // Ends that join overlap by rounding only.
                const double overlap = area_of(common(regions_[a], regions_[b]));
                if (!joined(a, b) ||
                    overlap > touch_m * std::sqrt(std::min(area_of(regions_[a]), area_of(regions_[b]))))
                    general_[a] = general_[b] = true;
            }
    }

    void bridges_to_sides() {
        Layout layout;
        layout.pieces = pieces_;
        const std::vector<Place> places = places_of(model_);
        for (const Place& place : places) {
            touched_.push_back(metals_touched(model_, place.placement));
            const auto* bridge = std::get_if<Bridge>(&place.placement);
            if (bridge == nullptr || !lands_on_side(model_, layout, place, *bridge)) continue;
            for (const std::size_t k : touched_.back()) general_[k] = true;
        }
    }

    bool spread() {
        bool changed = false;
        const auto together = [&](std::size_t a, std::size_t b) {
            if (general_[a] == general_[b]) return;
            general_[a] = general_[b] = changed = true;
        };
        for (const auto& [a, b] : contacts_) together(a, b);
        for (const auto& touched : touched_)
            for (std::size_t i = 1; i < touched.size(); ++i) together(touched[0], touched[i]);
        return changed;
    }

    const Model& model_;
    std::vector<bool> general_;
    std::vector<Loops2> regions_, grown_;
    std::vector<Piece> pieces_;
    std::vector<Join> joins_;
    std::vector<std::pair<std::size_t, std::size_t>> contacts_;
    std::vector<std::vector<std::size_t>> touched_;
};

Loop rectangle_along(const Vec2& a, const Vec2& b, double beyond_m, double width_m) {
    const Vec2 along = (b - a).normalized(), side = 0.5 * width_m * left_of(along);
    const Vec2 from = a - beyond_m * along, to = b + beyond_m * along;
    return {from - side, to - side, to + side, from + side};
}

// The part of `region` that holds `p`.
Loops2 part_at(const Loops2& region, const Vec2& p) {
    for (Loops2& part : separate(region))
        if (inside(part, p)) return std::move(part);
    return {};
}

class GapMaker {
public:
    GapMaker(const Model& model, GeneralPlane& plane, MeshFaults& faults)
        : model_(model), plane_(plane), faults_(faults), places_(places_of(model)) {}

    // True where the place belongs to this plane.
    void add(int index) {
        const Place& place = places_[static_cast<std::size_t>(index)];
        GeneralGap gap;
        gap.place = index;
        if (const auto* bridge = std::get_if<Bridge>(&place.placement)) {
            if (std::abs(bridge->from.z() - plane_.plane_m) <= same_plane_m) make_bridge(place, *bridge, gap);
        } else if (const auto* across = std::get_if<Across>(&place.placement)) {
            if (std::abs(across->from.z() - plane_.plane_m) <= same_plane_m) make_slit(place, *across, gap);
        }
        if (gap.region.empty()) return;
        for (const GeneralGap& other : plane_.gaps) {
            if (area_of(common(offset_by(gap.region, touch_m, arc_error_m), other.region)) <= 0) continue;
            const Place& first = places_[static_cast<std::size_t>(other.place)];
            return faults_.add(place.where, fmt::format("{} touches or overlaps {}", place.what, first.what),
                               "move them apart");
        }
        plane_.gaps.push_back(std::move(gap));
    }

private:
    void fault(const Place& place, const std::string& text, std::string help = {}) {
        faults_.add(place.where, place.what + " " + text, std::move(help));
    }

    bool sound(const Place& place, const Vec3& from, const Vec3& to, double width_m) {
        if (!from.allFinite() || !to.allFinite() || !std::isfinite(width_m))
            return fault(place, "has a number that is not finite"), false;
        if (std::abs(from.z() - to.z()) > same_plane_m)
            return fault(place, "bridges two planes, which is not yet meshed"), false;
        if ((to - from).norm() < 1e-9 || width_m < 1e-9) return fault(place, "has no length or no width"), false;
        return true;
    }

    void make_bridge(const Place& place, const Bridge& bridge, GeneralGap& gap) {
        if (!sound(place, bridge.from, bridge.to, bridge.width_m)) return;
        const Vec2 a = bridge.from.head<2>(), b = bridge.to.head<2>();
        for (const Vec2& end : {a, b}) {
            const double away = inside(plane_.metal, end) ? 0 : distance_to(plane_.metal, end);
            if (away <= 1e-6 + 1e-3 * (b - a).norm()) continue;
            return fault(place,
                         fmt::format("touches no metal: its bridge {} at {}, {} from the nearest edge",
                                     end == a ? "starts" : "ends", mm(end), mm(away)),
                         "let both ends of the bridge lie on the edges of the gap, or somewhat inside the metal");
        }
        const double length = (b - a).norm(), beyond = 0.5 * length + 0.1 * bridge.width_m;
        const Loop whole = rectangle_along(a, b, beyond, bridge.width_m);
        const Loops2 open = without(std::span(&whole, 1), plane_.metal);
        Vec2 middle = 0.5 * (a + b);
        for (double u = 0.05; inside(plane_.metal, middle) && u < 1; u += 0.05) middle = a + u * (b - a);
        gap.region = part_at(open, middle);
        if (gap.region.empty())
            return fault(place, "lies on unbroken metal: its bridge is shorted",
                         "break the metal there with a cut, or draw it with across and gap");
        gap.direction = (b - a) / length;
        gap.length_m = area_of(gap.region) / bridge.width_m;
        double low = 0, high = length;
        for (const Vec2& corner : gap.region[0]) {
            low = std::min(low, gap.direction.dot(corner - a));
            high = std::max(high, gap.direction.dot(corner - a));
        }
        const bool starts_open = low<-0.999 * beyond, ends_open = high> length + 0.999 * beyond;
        if (!starts_open && !ends_open) return;
        gap.region.clear();
        fault(place,
              fmt::format("{} on an edge that its bridge of {} overhangs, at {}", starts_open ? "starts" : "ends",
                          mm(bridge.width_m), mm(starts_open ? a : b)),
              "make the bridge narrower, or end it further inside the metal");
    }

    void make_slit(const Place& place, const Across& across, GeneralGap& gap) {
        if (!sound(place, across.from, across.to, across.gap_m)) return;
        const Vec2 a = across.from.head<2>(), b = across.to.head<2>();
        // Past the edges by a little, as curved edges bulge out beside the drawn line.
        const Loop whole = rectangle_along(a, b, 0.02 * (b - a).norm() + 0.5 * across.gap_m, across.gap_m);
        gap.region = part_at(common(std::span(&whole, 1), plane_.metal), 0.5 * (a + b));
        if (gap.region.empty())
            return fault(place, fmt::format("touches no metal: its line starts at {}, {} from the nearest edge", mm(a),
                                            mm(distance_to(plane_.metal, a))));
        gap.direction = left_of((b - a).normalized());
        gap.length_m = across.gap_m;
        for (const Vec2& end : {a, b}) {
            const double depth = inside(plane_.metal, end) ? distance_to(plane_.metal, end) : 0;
            if (depth <= 0.02 * (b - a).norm()) continue;
            gap.region.clear();
            return fault(place,
                         fmt::format("does not cross the metal from edge to edge: its line has an end at {}, {} inside",
                                     mm(end), mm(depth)));
        }
        slits_.push_back(gap.region);
    }

public:
    /// Slits are taken out of the metal when all places are known.
    void finish() {
        for (const Loops2& slit : slits_) plane_.metal = without(plane_.metal, slit);
    }

private:
    const Model& model_;
    GeneralPlane& plane_;
    MeshFaults& faults_;
    std::vector<Place> places_;
    std::vector<Loops2> slits_;
};

}  // namespace

std::vector<bool> general_metals(const Model& model) {
    return Classifier(model).found();
}

std::vector<std::size_t> metals_touched(const Model& model, const Placement& placement) {
    std::vector<std::size_t> touched;
    Vec3 from(0, 0, 0), to(0, 0, 0);
    double reach = 0;
    const auto* bridge = std::get_if<Bridge>(&placement);
    const auto* across = std::get_if<Across>(&placement);
    if (bridge == nullptr && across == nullptr) return touched;
    from = bridge != nullptr ? bridge->from : across->from;
    to = bridge != nullptr ? bridge->to : across->to;
    if (!from.allFinite() || !to.allFinite()) return touched;
    reach = 1e-6 + 1e-3 * (to - from).norm();
    for (std::size_t k = 0; k < model.metals.size(); ++k) {
        const Metal& metal = model.metals[k];
        if (metal.cut || !on_plane(metal, from.z()) || !flaw(metal.shape).empty()) continue;
        const Region region(metal.shape);
        const Vec2 a = from.head<2>(), b = to.head<2>(), middle = 0.5 * (a + b);
        const bool at_ends = region.level(a) <= reach || region.level(b) <= reach;
        if (bridge != nullptr ? at_ends : region.level(middle) <= 0) touched.push_back(k);
    }
    return touched;
}

std::vector<GeneralPlane> general_planes(const Model& model, const std::vector<bool>& general, MeshFaults& faults) {
    std::vector<GeneralPlane> planes;
    for (std::size_t k = 0; k < model.metals.size(); ++k) {
        const Metal& metal = model.metals[k];
        if (!flaw(metal.shape).empty() || (!metal.cut && !general[k])) continue;
        auto plane = std::find_if(planes.begin(), planes.end(),
                                  [&](const GeneralPlane& p) { return on_plane(metal, p.plane_m); });
        if (plane == planes.end() && metal.cut) continue;
        if (plane == planes.end()) plane = planes.insert(planes.end(), GeneralPlane{metal.plane_m, {}, {}});
        const Loops2 region = region_of(metal.shape);
        plane->metal = metal.cut ? without(plane->metal, region) : united(plane->metal, region);
    }
    const std::vector<Place> places = places_of(model);
    for (GeneralPlane& plane : planes) {
        GapMaker maker(model, plane, faults);
        for (std::size_t i = 0; i < places.size(); ++i) {
            const std::vector<std::size_t> touched = metals_touched(model, places[i].placement);
            if (!touched.empty() && general[touched[0]]) maker.add(static_cast<int>(i));
        }
        maker.finish();
    }
    return planes;
}

}  // namespace annulet
