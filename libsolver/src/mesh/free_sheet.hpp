// Plans of sheets of any shape under any metal: layers of quadrilaterals along the edges of the metal, triangles
// beyond.
#pragma once

#include <optional>
#include <vector>

#include "mesh/footprint.hpp"
#include "mesh/strip_sheet.hpp"

namespace annulet {

/// `faces`: the metal on the sheet's faces. Nothing and a fault if a metal cell lies only partly over the sheet, or
/// cells on the two faces overlap without being the same.
std::optional<SheetPlan> free_sheet(const SheetOutline& outline, const std::vector<const Footprint*>& faces,
                                    const MeshOptions& options, const Laminate& laminate, MeshFaults& faults);

}  // namespace annulet
