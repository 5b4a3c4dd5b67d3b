// Node positions of one block of strip.
#pragma once

#include <annulet/geometry/ribbon.hpp>

#include <span>
#include <vector>

#include "mesh/along_grid.hpp"

namespace annulet {

/// Radii (m) for nodes at angles `angle_rad` (monotonic) so that the polygon about the centre has the area of the
/// true sector: for equal steps d, r sqrt(d / sin d). `radius_m` are the true radii. The ends keep their radius,
/// unless `closed`: then the last node is the first again and all are scaled.
std::vector<double> area_keeping_radii(std::span<const double> angle_rad, std::span<const double> radius_m,
                                       bool closed);

/// Nodes on the line `tau` from s = from_m to to_m at the given fractions (0 ... 1).
/// `closed`: the block goes all around without any front.
std::vector<Vec2> block_nodes(const Ribbon& ribbon, double tau, double from_m, double to_m,
                              std::span<const double> fractions, bool closed);

/// Node lines of block `block` of a piece, one per tau. Beyond the edges (|tau| > 1) the fronts go on as they meet the
/// edge, at constant s.
std::vector<std::vector<Vec2>> block_lines(const Piece& piece, const AlongBlock& along, std::size_t block,
                                           std::span<const double> taus, double refine);

}  // namespace annulet
