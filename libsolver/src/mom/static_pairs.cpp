#include "mom/static_pairs.hpp"

#include "mom/outer_rule.hpp"

namespace annulet {

StaticPairs::StaticPairs(const Mesh& mesh) : mesh_(mesh) {
    for (const Cell& cell : mesh.cells) {
        const bool planar = cell.kind != CellKind::segment;
        planar_.push_back(planar ? planar_element(mesh, cell) : PlanarElement{});
        wire_.push_back(planar ? WireElement{} : wire_element(mesh, cell));
        if (!mesh.ground_plane_m) continue;
        planar_image_.push_back(planar ? planar_.back().mirrored(*mesh.ground_plane_m) : PlanarElement{});
        wire_image_.push_back(wire_.back().mirrored(*mesh.ground_plane_m));
    }
}

PairMoments StaticPairs::moments(int test, int source, bool image) const {
    const auto test_at = static_cast<std::size_t>(test), source_at = static_cast<std::size_t>(source);
    const PlanarElement& t = planar_[test_at];
    const PlanarElement& s = (image ? planar_image_ : planar_)[source_at];
    const WireElement& source_wire = (image ? wire_image_ : wire_)[source_at];
    if (is_wire(test) && is_wire(source)) return static_wire_pair(wire_[test_at], source_wire);
    if (is_wire(test)) return static_wire_and_surface(wire_[test_at], s);
    if (is_wire(source)) return transposed(static_wire_and_surface(source_wire, t));
    const bool touching = test == source ? !image || distance(t, s) == 0 : distance(t, s) <= 1e-9 * t.diameter();
    return static_pair(t, s, touching);
}

}  // namespace annulet
