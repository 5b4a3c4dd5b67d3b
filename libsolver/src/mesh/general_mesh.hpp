// Cells of general metal and of the gaps in it.
#pragma once

#include "mesh/general_metal.hpp"

namespace annulet {

/// Appends nodes, cells and gap members to the mesh of the strips.
void add_general(Mesh& mesh, const Model& model, const std::vector<bool>& general,
                 const std::vector<GeneralPlane>& planes, const MeshOptions& options);

}  // namespace annulet
