#include <algorithm>
#include <annulet/geometry/boolean.hpp>
#include <clipper.hpp>
#include <cmath>

namespace annulet {

namespace {

using ClipperLib::Path;
using ClipperLib::Paths;

Paths paths_of(std::span<const Loop> loops) {
    Paths paths;
    for (const Loop& loop : loops) {
        Path path;
        for (const Vec2& p : loop)
            path.emplace_back(std::llround(p.x() / region_grain_m), std::llround(p.y() / region_grain_m));
        paths.push_back(std::move(path));
    }
    return paths;
}

Loop loop_of(const Path& path) {
    Loop loop;
    for (const ClipperLib::IntPoint& p : path)
        loop.emplace_back(static_cast<double>(p.X) * region_grain_m, static_cast<double>(p.Y) * region_grain_m);
    return loop;
}

Loops2 loops_of(const Paths& paths) {
    Loops2 loops;
    for (const Path& path : paths) loops.push_back(loop_of(path));
    return loops;
}

Loops2 operated(ClipperLib::ClipType operation, const Paths& a, const Paths& b, ClipperLib::PolyFillType fill) {
    ClipperLib::Clipper clipper;
    clipper.PreserveCollinear(true);
    clipper.StrictlySimple(true);
    clipper.AddPaths(a, ClipperLib::ptSubject, true);
    clipper.AddPaths(b, ClipperLib::ptClip, true);
    Paths result;
    clipper.Execute(operation, result, fill, ClipperLib::pftNonZero);
    return loops_of(result);
}

}  // namespace

Loops2 filled(std::span<const Loop> loops) {
    return operated(ClipperLib::ctUnion, paths_of(loops), {}, ClipperLib::pftEvenOdd);
}

Loops2 region_of(const Shape& shape) {
    return filled(Region(shape).loops());
}

Loops2 united(std::span<const Loop> loops) {
    return operated(ClipperLib::ctUnion, paths_of(loops), {}, ClipperLib::pftNonZero);
}

Loops2 united(std::span<const Loop> a, std::span<const Loop> b) {
    return operated(ClipperLib::ctUnion, paths_of(a), paths_of(b), ClipperLib::pftNonZero);
}

Loops2 without(std::span<const Loop> a, std::span<const Loop> b) {
    return operated(ClipperLib::ctDifference, paths_of(a), paths_of(b), ClipperLib::pftNonZero);
}

Loops2 common(std::span<const Loop> a, std::span<const Loop> b) {
    return operated(ClipperLib::ctIntersection, paths_of(a), paths_of(b), ClipperLib::pftNonZero);
}

Loops2 offset_by(std::span<const Loop> loops, double by_m, double arc_error_m) {
    ClipperLib::ClipperOffset offset(2, std::max(arc_error_m / region_grain_m, 1.0));
    offset.AddPaths(paths_of(loops), ClipperLib::jtRound, ClipperLib::etClosedPolygon);
    Paths result;
    offset.Execute(result, by_m / region_grain_m);
    return loops_of(result);
}

double area_of(std::span<const Loop> region) {
    double area = 0;
    for (const Loop& loop : region) area += signed_area(loop);
    return area;
}

std::vector<Loops2> separate(std::span<const Loop> region) {
    std::vector<Loops2> parts;
    ClipperLib::Clipper clipper;
    clipper.PreserveCollinear(true);
    clipper.AddPaths(paths_of(region), ClipperLib::ptSubject, true);
    ClipperLib::PolyTree tree;
    clipper.Execute(ClipperLib::ctUnion, tree, ClipperLib::pftNonZero, ClipperLib::pftNonZero);
    for (const ClipperLib::PolyNode* node = tree.GetFirst(); node != nullptr; node = node->GetNext()) {
        if (node->IsHole()) continue;
        Loops2 part{loop_of(node->Contour)};
        for (const ClipperLib::PolyNode* hole : node->Childs) part.push_back(loop_of(hole->Contour));
        parts.push_back(std::move(part));
    }
    return parts;
}

}  // namespace annulet
