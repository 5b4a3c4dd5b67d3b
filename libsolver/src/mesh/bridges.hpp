#pragma once

#include <optional>

#include "mesh/gaps.hpp"

namespace annulet {

/// Where the bridge lands on the ends of the metal; nothing and a fault if it does not.
std::optional<Span> place_bridge(const Model& model, const Layout& layout, int place, const Place& drawn,
                                 const Bridge& bridge, MeshFaults& faults);

/// True if an end of the bridge meets the side of a strip.
bool lands_on_side(const Model& model, const Layout& layout, const Place& drawn, const Bridge& bridge);

/// Puts the slit into its piece of `layout`, or a fault.
void place_slit(const Model& model, Layout& layout, int place, const Place& drawn, const Across& across,
                MeshFaults& faults);

}  // namespace annulet
