// Wires that touch what they are not joined to.
#pragma once

#include <annulet/mesh/mesh.hpp>

#include "mesh/faults.hpp"
#include "mesh/layout.hpp"
#include "mesh/wire_plan.hpp"

namespace annulet {

/// Faults: wires that come nearer than the sum of their radii away from a joint, that lie in or reach below the ground
/// plane, that touch metal.
void check_wire_contacts(const Model& model, const WirePlan& plan, const std::vector<Piece>& metal, MeshFaults& faults);

}  // namespace annulet
