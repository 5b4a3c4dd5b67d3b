#include "model/outline.hpp"
#include "model/reading.hpp"

#include <fmt/format.h>

#include <algorithm>

namespace annulet {

namespace {

// Sheets that overlap by less than the etching of a board are taken as touching.
constexpr double least_overlap_m2 = 1e-10;

std::string millimetres(double length_m) {
    return to_text(length_m, kinds::length.dimension);
}

void check_around(Reading& reading) {
    for (const Around& around : reading.around) {
        if (around.metal.empty() || reading.omitted(around.laminate) || reading.metal_names.count(around.metal) > 0)
            continue;
        const std::string near = nearest(around.metal, {reading.metal_names.begin(), reading.metal_names.end()});
        reading.faults().add(
            around.where,
            fmt::format("the outline of laminate '{}' is around metal '{}', which does not exist", around.laminate,
                        around.metal),
            near.empty() ? "name a [[metal]] that is no cut" : fmt::format("did you mean '{}'?", near));
    }
}

Loops sheet_loops(const Laminate& laminate, const Model& model) {
    if (const auto* shape = std::get_if<Shape>(&laminate.outline)) return outline_loops(*shape);
    const auto& around = std::get<AroundMetal>(laminate.outline);
    for (const Metal& metal : model.metals) {
        if (metal.name == around.metal) return grown(outline_loops(metal.shape), around.margin_m);
    }
    return {};
}

void check_laminate_overlap(Reading& reading) {
    const auto& sheets = reading.model.laminates;
    std::vector<Loops> outlines, openings(sheets.size());
    for (std::size_t i = 0; i < sheets.size(); ++i) {
        outlines.push_back(sheet_loops(sheets[i], reading.model));
        for (const Shape& shape : sheets[i].openings) {
            const Loops loops = outline_loops(shape);
            openings[i].insert(openings[i].end(), loops.begin(), loops.end());
        }
    }
    for (std::size_t i = 0; i < sheets.size(); ++i) {
        for (std::size_t j = i + 1; j < sheets.size(); ++j) {
            const double overlap =
                std::min(sheets[i].top_m, sheets[j].top_m) - std::max(sheets[i].bottom_m(), sheets[j].bottom_m());
            if (overlap < tiny_m) continue;
            if (common_area_m2(outlines[i], openings[i], outlines[j], openings[j]) < least_overlap_m2) continue;
            reading.faults().add(sheets[j].where,
                                 fmt::format("laminate '{}' overlaps laminate '{}' (line {}) from {} to {}",
                                             sheets[j].name, sheets[i].name, sheets[i].where.line,
                                             millimetres(std::max(sheets[i].bottom_m(), sheets[j].bottom_m())),
                                             millimetres(std::min(sheets[i].top_m, sheets[j].top_m))),
                                 "move one of them: sheets may touch but not overlap");
        }
    }
}

double lowest_point(const Wire& wire) {
    if (const auto* path = std::get_if<WirePath>(&wire.shape)) {
        double lowest = unlimited;
        for (const auto& piece : path->pieces) {
            if (const auto* point = std::get_if<Vec3>(&piece)) lowest = std::min(lowest, point->z());
        }
        return lowest;
    }
    // A circle reaches down by its radius times the sine of the tilt of its plane.
    if (const auto* circle = std::get_if<WireCircle>(&wire.shape)) {
        return circle->centre.z() -
               circle->radius_m * std::sqrt(std::max(0.0, 1 - circle->normal.z() * circle->normal.z()));
    }
    return std::get<WireHelix>(wire.shape).centre.z();
}

void check_ground(Reading& reading) {
    if (!reading.model.ground_plane_m) return;
    const double ground = *reading.model.ground_plane_m;
    const auto report = [&](Position where, const std::string& what, double height, const char* relation) {
        reading.faults().add(where,
                             fmt::format("{} at {} lies {} the ground plane at {}", what, millimetres(height), relation,
                                         millimetres(ground)),
                             "move it up, or lower the plane of [ground]");
    };
    for (const Metal& metal : reading.model.metals) {
        if (metal.plane_m < ground - tiny_m)
            report(metal.where, fmt::format("metal '{}'", metal.name), metal.plane_m, "below");
        if (std::abs(metal.plane_m - ground) <= tiny_m)
            report(metal.where, fmt::format("metal '{}'", metal.name), metal.plane_m, "in");
    }
    for (const Laminate& laminate : reading.model.laminates) {
        if (laminate.bottom_m() < ground - tiny_m)
            report(laminate.where, fmt::format("the lower face of laminate '{}'", laminate.name), laminate.bottom_m(),
                   "below");
    }
    for (const Wire& wire : reading.model.wires) {
        if (lowest_point(wire) < ground - tiny_m)
            report(wire.where, fmt::format("the lowest point of wire '{}'", wire.name), lowest_point(wire), "below");
    }
    for (const Via& via : reading.model.vias) {
        const double lowest = std::min(via.from_m, via.to_m);
        if (lowest < ground - tiny_m) report(via.where, fmt::format("the end of via '{}'", via.name), lowest, "below");
    }
}

void check_omitted(Reading& reading) {
    for (const std::string& name : reading.omit) {
        if (reading.omittable.count(name) > 0) continue;
        const std::string near = nearest(name, {reading.omittable.begin(), reading.omittable.end()});
        reading.faults().add(
            {},
            fmt::format(
                "cannot leave out '{}': the model has no metal, via, wire, laminate or lumped part of this name", name),
            near.empty() ? "" : fmt::format("did you mean '{}'?", near));
    }
}

bool has_conductor(const Model& model) {
    return !model.wires.empty() ||
           std::any_of(model.metals.begin(), model.metals.end(), [](const Metal& m) { return !m.cut; });
}

}  // namespace

void check_together(Reading& reading) {
    check_omitted(reading);
    check_around(reading);
    // The rest reads numbers that faults may have left undefined.
    if (reading.faults().count() > 0) return;
    if (!has_conductor(reading.model))
        reading.faults().add({1, 1}, "the model has no conductor", "add a [[metal]] or a [[wire]]");
    check_laminate_overlap(reading);
    check_ground(reading);
}

}  // namespace annulet
