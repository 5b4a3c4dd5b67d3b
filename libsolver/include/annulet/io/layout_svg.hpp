// The layout as a drawing to be checked by eye: to scale, readable without colour.
#pragma once

#include <annulet/study/check.hpp>

#include <string>

namespace annulet {

/// SVG: sheets hatched, metal by height in shades and patterns, ports and parts with their names, a bar of round
/// length, forbidden places ringed and numbered. With `mesh` the cells of the metal (and columns of the sheets) as thin
/// lines.
std::string layout_svg(const Model& model, const std::vector<PlacedFinding>& findings, const Mesh* mesh);

/// Text near the start of every file of this kind; see OutputFile.
std::string layout_svg_marker();

}  // namespace annulet
