#include "mom/static_pairs.hpp"

#include "mom/outer_rule.hpp"

namespace annulet {

StaticPairs::StaticPairs(const Mesh& mesh) : mesh_(mesh) {
    for (const Cell& cell : mesh.cells) {
        const bool planar = cell.kind != CellKind::segment;
        planar_.push_back(planar ? planar_element(mesh, cell) : PlanarElement{});
        if (mesh.ground_plane_m)
            planar_image_.push_back(planar ? planar_.back().mirrored(*mesh.ground_plane_m) : PlanarElement{});
    }
}

PairMoments StaticPairs::moments(int test, int source, bool image) const {
    const PlanarElement& t = planar_[static_cast<std::size_t>(test)];
    const PlanarElement& s = (image ? planar_image_ : planar_)[static_cast<std::size_t>(source)];
    const bool touching = test == source ? !image || distance(t, s) == 0 : distance(t, s) <= 1e-9 * t.diameter();
    return static_pair(t, s, touching);
}

}  // namespace annulet
