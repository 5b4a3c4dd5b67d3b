// Static moments of any pair of cells: chooses the integrals by the kinds of the two.
#pragma once

#include <annulet/mesh/mesh.hpp>

#include <vector>

#include "mom/element.hpp"
#include "mom/static_moments.hpp"

namespace annulet {

class StaticPairs {
public:
    explicit StaticPairs(const Mesh& mesh);
    /// Outer integral over cell `test`, inner over cell `source` or its mirror image in the ground plane. Safe to
    /// call from several threads.
    PairMoments moments(int test, int source, bool image) const;

private:
    const Mesh& mesh_;
    std::vector<PlanarElement> planar_, planar_image_;  ///< by cell; empty entries for segments
};

}  // namespace annulet
