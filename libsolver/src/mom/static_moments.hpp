// Galerkin integrals of 1/(4 pi R) for pairs of cells that are near each other: once per geometry.
#pragma once

#include "mom/element.hpp"

#include <array>
#include <vector>

namespace annulet {

/// Local matrices of one ordered pair: inner integral over `source` in closed form, outer over `test`.
struct PairMoments {
    std::array<std::array<double, 5>, 5> vector{};  ///< [test slot][source slot], m
    double scalar = 0;                              ///< of unit charge on either cell, 1/m
};

/// `touching`: close enough for the rule that resolves the logarithms at the edges.
PairMoments static_pair(const PlanarElement& test, const PlanarElement& source, bool touching);

/// Scalar moment alone, for panels of bound charge: 1/m.
double static_scalar(const PlanarElement& test, const PlanarElement& source, bool touching);

}  // namespace annulet
