// Static moments of any pair of cells: chooses the integrals by the kinds of the two.
#pragma once

#include <annulet/mesh/mesh.hpp>

#include <vector>

#include "mom/element.hpp"
#include "mom/static_moments.hpp"
#include "mom/wire_pairs.hpp"

namespace annulet {

class StaticPairs {
public:
    explicit StaticPairs(const Mesh& mesh);
    /// Outer integral over cell `test`, inner over cell `source` or its mirror image in the ground plane. Safe to
    /// call from several threads.
    PairMoments moments(int test, int source, bool image) const;

private:
    const Mesh& mesh_;
    bool is_wire(int cell) const { return mesh_.cells[static_cast<std::size_t>(cell)].kind == CellKind::segment; }

    std::vector<PlanarElement> planar_, planar_image_;  ///< by cell; empty entries for segments
    std::vector<WireElement> wire_, wire_image_;        ///< by cell; empty entries for flat cells
};

}  // namespace annulet
