// Vector and scalar potential matrices at one wavenumber: quadrature tables for all pairs, statics for near ones.
#pragma once

#include <annulet/mom/basis.hpp>

#include <Eigen/SparseCore>

#include <complex>
#include <vector>

#include "mom/local_table.hpp"

namespace annulet {

/// Elements q >= p (in table order) near element p; all other q > p are far.
struct Neighbours {
    std::vector<int> near;    ///< centres closer than two diameters: closed-form statics, fine rule for the rest
    std::vector<int> middle;  ///< closer than four: fine rule
};

/// All elements seen as sources, once as they are and once as images in the ground plane.
struct SourceSet {
    std::vector<LocalTable> coarse, fine;  ///< one per role and kind
    std::vector<Neighbours> neighbours;    ///< by test element
};

/// Everything that does not depend on frequency.
struct PairTables {
    std::vector<SourceSet> sources;      ///< the elements; with a ground plane also their images
    std::vector<int> table_of, lane_of;  ///< by element
    int charges = 0;                     ///< elements that carry charge stand first
    /// Static part of near pairs tested on the row, 1/(4 pi R) included, not symmetrised:
    /// unknowns x unknowns (m) and charges x charges (1/m).
    Eigen::SparseMatrix<double> vector_statics, scalar_statics;
};

PairTables make_pair_tables(const Mesh& mesh, const Basis& basis);

struct Potentials {
    Eigen::MatrixXcd vector;  ///< <f_m, G f_n>, unknowns x unknowns, m
    Eigen::MatrixXcd scalar;  ///< of unit charges on elements, charges x charges, 1/m
};

/// At the wavenumber k (1/m); `symmetrise`: mean of both testing orders of the static part.
Potentials fill_potentials(const PairTables& tables, const Basis& basis, double k_per_m, bool symmetrise);

/// Kernel evaluations of one fill, for the benchmark.
std::size_t kernel_evaluations(const PairTables& tables);

}  // namespace annulet
