#include <algorithm>
#include <utility>

#include "mom/pair_fill.hpp"
#include "mom/static_pairs.hpp"

namespace annulet {

namespace {

std::size_t at(int i) {
    return static_cast<std::size_t>(i);
}

struct Extent {
    Vec3 centre{0, 0, 0};
    double diameter = 0;
};

std::vector<Extent> extents(const Mesh& mesh) {
    std::vector<Extent> out;
    for (const Cell& cell : mesh.cells) {
        Extent e;
        for (int i = 0; i < cell.corners(); ++i) {
            const Vec3& p = mesh.nodes[at(cell.node[at(i)])];
            e.centre += p / cell.corners();
            for (int j = 0; j < i; ++j)
                e.diameter = std::max(e.diameter, (p - mesh.nodes[at(cell.node[at(j)])]).norm());
        }
        // The reduced kernel of distant segments is off by (a/d)^4: 3e-4 where the near zone of short cells ends.
        e.diameter = std::max(e.diameter, 4 * cell.radius_m);
        out.push_back(e);
    }
    return out;
}

/// Table order: by kind of cell, then by number.
bool before(const PairTables& t, int p, int q) {
    return std::pair(t.table_of_cell[at(p)], t.lane_of_cell[at(p)]) <
           std::pair(t.table_of_cell[at(q)], t.lane_of_cell[at(q)]);
}

std::vector<Neighbours> find_neighbours(const PairTables& tables, const std::vector<Extent>& test,
                                        const std::vector<Extent>& source) {
    const int cells = static_cast<int>(test.size());
    std::vector<Neighbours> out(test.size());
#pragma omp parallel for schedule(dynamic, 16)
    for (int p = 0; p < cells; ++p)
        for (int q = 0; q < cells; ++q) {
            if (before(tables, q, p)) continue;
            const double apart = (test[at(p)].centre - source[at(q)].centre).norm();
            const double size = std::max(test[at(p)].diameter, source[at(q)].diameter);
            if (apart < 2 * size)
                out[at(p)].near.push_back(q);
            else if (apart < 4 * size)
                out[at(p)].middle.push_back(q);
        }
    return out;
}

using Triplets = std::vector<Eigen::Triplet<double>>;

void append_vector(const Basis& basis, int p, int q, const PairMoments& m, double sign, Triplets& out) {
    using Row = Eigen::SparseMatrix<double, Eigen::RowMajor>::InnerIterator;
    for (std::size_t a = 0; a < 4; ++a)
        for (std::size_t b = 0; b < 4; ++b) {
            if (m.vector[a][b] == 0) continue;
            for (Row i(basis.slots, basis.first_slot[at(p)] + static_cast<int>(a)); i; ++i)
                for (Row j(basis.slots, basis.first_slot[at(q)] + static_cast<int>(b)); j; ++j)
                    out.emplace_back(static_cast<int>(i.col()), static_cast<int>(j.col()),
                                     sign * i.value() * j.value() * m.vector[a][b]);
        }
}

/// Both testing orders of every near pair.
void append_statics(const StaticPairs& pairs, const Basis& basis, const SourceSet& set, bool image, int p,
                    Triplets& vector, Triplets& scalar) {
    const double sign = image ? -1 : 1;
    for (const int q : set.neighbours[at(p)].near) {
        const auto add = [&](int test, int source) {
            const PairMoments m = pairs.moments(test, source, image);
            append_vector(basis, test, source, m, sign, vector);
            scalar.emplace_back(test, source, sign * m.scalar);
        };
        add(p, q);
        if (p != q) add(q, p);
    }
}

void fill_statics(PairTables& tables, const Mesh& mesh, const Basis& basis) {
    const StaticPairs pairs(mesh);
    const int cells = static_cast<int>(mesh.cells.size());
    std::vector<Triplets> vector(mesh.cells.size()), scalar(mesh.cells.size());
#pragma omp parallel for schedule(dynamic, 4)
    for (int p = 0; p < cells; ++p)
        for (std::size_t s = 0; s < tables.sources.size(); ++s)
            append_statics(pairs, basis, tables.sources[s], s == 1, p, vector[at(p)], scalar[at(p)]);
    // Joined in the order of the cells, so that sums do not depend on the number of threads.
    Triplets all_vector, all_scalar;
    for (int p = 0; p < cells; ++p) {
        all_vector.insert(all_vector.end(), vector[at(p)].begin(), vector[at(p)].end());
        all_scalar.insert(all_scalar.end(), scalar[at(p)].begin(), scalar[at(p)].end());
    }
    tables.vector_statics.resize(basis.unknowns, basis.unknowns);
    tables.vector_statics.setFromTriplets(all_vector.begin(), all_vector.end());
    tables.scalar_statics.resize(cells, cells);
    tables.scalar_statics.setFromTriplets(all_scalar.begin(), all_scalar.end());
}

}  // namespace

PairTables make_pair_tables(const Mesh& mesh, const Basis& basis) {
    PairTables tables;
    tables.sources.push_back({local_tables(mesh, false), local_tables(mesh, true), {}});
    tables.table_of_cell.resize(mesh.cells.size());
    tables.lane_of_cell.resize(mesh.cells.size());
    const auto& coarse = tables.sources[0].coarse;
    for (std::size_t t = 0; t < coarse.size(); ++t)
        for (int lane = 0; lane < coarse[t].lanes; ++lane) {
            tables.table_of_cell[at(coarse[t].cell[at(lane)])] = static_cast<int>(t);
            tables.lane_of_cell[at(coarse[t].cell[at(lane)])] = lane;
        }
    const auto extent = extents(mesh);
    tables.sources[0].neighbours = find_neighbours(tables, extent, extent);
    if (mesh.ground_plane_m) {
        const double plane = *mesh.ground_plane_m;
        SourceSet image;
        for (const auto& t : tables.sources[0].coarse) image.coarse.push_back(mirror_image(t, plane));
        for (const auto& t : tables.sources[0].fine) image.fine.push_back(mirror_image(t, plane));
        auto mirrored = extent;
        for (auto& e : mirrored) e.centre.z() = 2 * plane - e.centre.z();
        image.neighbours = find_neighbours(tables, extent, mirrored);
        tables.sources.push_back(std::move(image));
    }
    fill_statics(tables, mesh, basis);
    return tables;
}

}  // namespace annulet
