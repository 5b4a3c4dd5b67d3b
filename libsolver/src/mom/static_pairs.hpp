// Static moments of any pair of elements: chooses the integrals by the kinds of the two.
#pragma once

#include <optional>
#include <vector>

#include "mom/element.hpp"
#include "mom/static_moments.hpp"
#include "mom/wire_pairs.hpp"

namespace annulet {

class StaticPairs {
public:
    /// `elements` must outlive this.
    StaticPairs(const std::vector<Element>& elements, std::optional<double> ground_plane_m);
    /// Outer integral over element `test`, inner over element `source` or its mirror image in the ground plane. Safe to
    /// call from several threads.
    PairMoments moments(int test, int source, bool image) const;

private:
    bool is_wire(std::size_t e) const { return elements_[e].kind == CellKind::segment; }
    PairMoments wire_moments(std::size_t test, std::size_t source, bool image) const;

    const std::vector<Element>& elements_;
    std::vector<PlanarElement> planar_, planar_image_;  ///< by element; empty entries for segments
    std::vector<WireElement> wire_, wire_image_;        ///< by element; empty entries for flat ones
};

}  // namespace annulet
