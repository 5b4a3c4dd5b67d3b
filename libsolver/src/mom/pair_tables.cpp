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

std::vector<Extent> extents(const std::vector<Element>& elements) {
    std::vector<Extent> out;
    for (const Element& element : elements) {
        Extent e;
        for (int i = 0; i < element.corners(); ++i) {
            const Vec3& p = element.corner[at(i)];
            e.centre += p / element.corners();
            for (int j = 0; j < i; ++j) e.diameter = std::max(e.diameter, (p - element.corner[at(j)]).norm());
        }
        // The reduced kernel of distant segments is off by (a/d)^4: 3e-4 where the near zone of short cells ends.
        e.diameter = std::max(e.diameter, 4 * element.radius_m);
        out.push_back(e);
    }
    return out;
}

/// Table order: by role and kind, then by number.
bool before(const PairTables& t, int p, int q) {
    return std::pair(t.table_of[at(p)], t.lane_of[at(p)]) < std::pair(t.table_of[at(q)], t.lane_of[at(q)]);
}

std::vector<Neighbours> find_neighbours(const PairTables& tables, const std::vector<Extent>& test,
                                        const std::vector<Extent>& source) {
    const int elements = static_cast<int>(test.size());
    const auto& kinds = tables.sources[0].coarse;
    const auto table = [&](int e) -> const LocalTable& { return kinds[at(tables.table_of[at(e)])]; };
    std::vector<Neighbours> out(test.size());
#pragma omp parallel for schedule(dynamic, 16)
    for (int p = 0; p < elements; ++p)
        for (int q = 0; q < elements; ++q) {
            if (before(tables, q, p) || !interacting(table(p), table(q))) continue;
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
    using Row = Basis::Matrix::InnerIterator;
    for (std::size_t a = 0; a < 5; ++a)
        for (std::size_t b = 0; b < 5; ++b) {
            if (m.vector[a][b] == 0) continue;
            for (Row i(basis.slots, basis.first_slot[at(p)] + static_cast<int>(a)); i; ++i)
                for (Row j(basis.slots, basis.first_slot[at(q)] + static_cast<int>(b)); j; ++j)
                    out.emplace_back(static_cast<int>(i.col()), static_cast<int>(j.col()),
                                     sign * i.value() * j.value() * m.vector[a][b]);
        }
}

/// Both testing orders of every near pair.
void append_statics(const StaticPairs& pairs, const Basis& basis, const SourceSet& set, bool image, int p, int charges,
                    Triplets& vector, Triplets& scalar) {
    const double sign = image ? -1 : 1;
    for (const int q : set.neighbours[at(p)].near) {
        const auto add = [&](int test, int source) {
            const PairMoments m = pairs.moments(test, source, image);
            append_vector(basis, test, source, m, sign, vector);
            if (test < charges && source < charges) scalar.emplace_back(test, source, sign * m.scalar);
        };
        add(p, q);
        if (p != q) add(q, p);
    }
}

/// Sums of triplets without ever holding all of them twice: sorted and merged block by block.
Eigen::SparseMatrix<double> gather_triplets(std::vector<Triplets>& parts, int size) {
    Eigen::SparseMatrix<double> sum(size, size);
    constexpr std::size_t block = 256;  // joined in the order of the elements: independent of the number of threads
    for (std::size_t first = 0; first < parts.size(); first += block) {
        Triplets some;
        for (std::size_t i = first; i < std::min(first + block, parts.size()); ++i) {
            some.insert(some.end(), parts[i].begin(), parts[i].end());
            Triplets().swap(parts[i]);
        }
        Eigen::SparseMatrix<double> part(size, size);
        part.setFromTriplets(some.begin(), some.end());
        sum += part;
    }
    return sum;
}

void fill_statics(PairTables& tables, const Mesh& mesh, const std::vector<Element>& elements, const Basis& basis) {
    const StaticPairs pairs(elements, mesh.ground_plane_m);
    const int count = static_cast<int>(elements.size());
    std::vector<Triplets> vector(elements.size()), scalar(elements.size());
#pragma omp parallel for schedule(dynamic, 4)
    for (int p = 0; p < count; ++p)
        for (std::size_t s = 0; s < tables.sources.size(); ++s)
            append_statics(pairs, basis, tables.sources[s], s == 1, p, tables.charges, vector[at(p)], scalar[at(p)]);
    tables.vector_statics = gather_triplets(vector, basis.unknowns);
    tables.scalar_statics = gather_triplets(scalar, tables.charges);
}

}  // namespace

PairTables make_pair_tables(const Mesh& mesh, const Basis& basis) {
    const auto elements = make_elements(mesh);
    PairTables tables;
    tables.sources.push_back({local_tables(elements, false), local_tables(elements, true), {}});
    tables.charges = static_cast<int>(basis.divergence.rows());
    tables.table_of.resize(elements.size());
    tables.lane_of.resize(elements.size());
    const auto& coarse = tables.sources[0].coarse;
    for (std::size_t t = 0; t < coarse.size(); ++t)
        for (int lane = 0; lane < coarse[t].lanes; ++lane) {
            tables.table_of[at(coarse[t].element[at(lane)])] = static_cast<int>(t);
            tables.lane_of[at(coarse[t].element[at(lane)])] = lane;
        }
    const auto extent = extents(elements);
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
    fill_statics(tables, mesh, elements, basis);
    return tables;
}

}  // namespace annulet
