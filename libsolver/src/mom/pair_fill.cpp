#include "mom/pair_fill.hpp"

#include <algorithm>
#include <mutex>
#include <span>

#include "mom/lane_kernel.hpp"

namespace annulet {

namespace {

using Complex = std::complex<double>;
std::size_t at(int i) {
    return static_cast<std::size_t>(i);
}

/// Collects what one test element contributes: one column of T per slot, one column of the scalar matrix.
class RowAccumulator {
public:
    RowAccumulator(const Basis& basis, int charges)
        : basis_(basis),
          charges_(charges),
          slots_(basis.unknowns, most_slots),
          scalar_(Eigen::VectorXcd::Zero(charges)) {}

    void begin(int element) {
        element_ = element;
        slots_.setZero();
        scalar_.setZero();
    }

    void add(const LaneResult& r, int test_slots, int source_slots, int lane, int source) {
        const double half = source == element_ ? 0.5 : 1.0;  // T + T^T is the matrix
        if (source < charges_) scalar_[source] += half * Complex(r.scalar_re[lane], r.scalar_im[lane]);
        const int* outer = basis_.slots.outerIndexPtr();
        for (int b = 0; b < source_slots; ++b) {
            const int row = basis_.first_slot[at(source)] + b;
            for (int i = outer[row]; i < outer[row + 1]; ++i) {
                const int n = basis_.slots.innerIndexPtr()[i];
                const double scale = half * basis_.slots.valuePtr()[i];
                for (int a = 0; a < test_slots; ++a)
                    slots_(n, a) +=
                        scale * Complex(r.vector_re[a * most_slots + b][lane], r.vector_im[a * most_slots + b][lane]);
            }
        }
    }

    /// Adds to the shared matrices; columns of T are shared by neighbouring elements.
    void finish(int test_slots, Potentials& out, std::span<std::mutex> locks) {
        if (element_ < charges_) out.scalar.col(element_) += scalar_;
        const int* outer = basis_.slots.outerIndexPtr();
        for (int a = 0; a < test_slots; ++a) {
            const int row = basis_.first_slot[at(element_)] + a;
            for (int i = outer[row]; i < outer[row + 1]; ++i) {
                const int m = basis_.slots.innerIndexPtr()[i];
                const std::lock_guard guard(locks[at(m) % locks.size()]);
                out.vector.col(m) += basis_.slots.valuePtr()[i] * slots_.col(a);
            }
        }
    }

private:
    const Basis& basis_;
    int charges_;
    Eigen::MatrixXcd slots_;
    Eigen::VectorXcd scalar_;
    int element_ = -1;
};

/// Far sources: the coarse rule over whole tables, lanes that a finer rule covers left out.
void add_far(const PairTables& tables, const SourceSet& set, int p, double k, std::vector<char>& skip,
             RowAccumulator& row) {
    const auto& near = set.neighbours[at(p)];
    for (const auto* list : {&near.near, &near.middle})
        for (int q : *list) skip[at(q)] = 1;
    const int own = tables.table_of[at(p)];
    const TestCell test = test_cell(tables.sources[0].coarse[at(own)], tables.lane_of[at(p)]);
    LaneResult result;
    for (std::size_t t = at(own); t < set.coarse.size(); ++t) {
        const LocalTable& source = set.coarse[t];
        if (!interacting(tables.sources[0].coarse[at(own)], source)) continue;
        for (int first = t == at(own) ? tables.lane_of[at(p)] : 0; first < source.lanes; first += lane_chunk) {
            const int count = std::min(lane_chunk, source.lanes - first);
            interact(test, source, first, count, k, KernelPart::whole, result);
            for (int e = 0; e < count; ++e) {
                const int q = source.element[at(first + e)];
                if (!skip[at(q)]) row.add(result, test.slots, source.slots, e, q);
            }
        }
    }
    for (const auto* list : {&near.near, &near.middle})
        for (int q : *list) skip[at(q)] = 0;
}

void add_listed(const PairTables& tables, const SourceSet& set, int p, double k, const std::vector<int>& list,
                KernelPart part, RowAccumulator& row) {
    const int own = tables.table_of[at(p)];
    const TestCell test = test_cell(tables.sources[0].fine[at(own)], tables.lane_of[at(p)]);
    LaneResult result;
    for (std::size_t t = 0; t < set.fine.size(); ++t) {
        std::vector<int> lanes;
        for (int q : list)
            if (tables.table_of[at(q)] == static_cast<int>(t)) lanes.push_back(tables.lane_of[at(q)]);
        if (lanes.empty()) continue;
        const LocalTable source = gather(set.fine[t], lanes);
        for (int first = 0; first < source.lanes; first += lane_chunk) {
            const int count = std::min(lane_chunk, source.lanes - first);
            interact(test, source, first, count, k, part, result);
            for (int e = 0; e < count; ++e) row.add(result, test.slots, source.slots, e, source.element[at(first + e)]);
        }
    }
}

void add_test_element(const PairTables& tables, int p, double k, std::vector<char>& skip, RowAccumulator& row) {
    for (const SourceSet& set : tables.sources) {
        add_far(tables, set, p, k, skip, row);
        add_listed(tables, set, p, k, set.neighbours[at(p)].near, KernelPart::remainder, row);
        add_listed(tables, set, p, k, set.neighbours[at(p)].middle, KernelPart::whole, row);
    }
}

void add_statics(const Eigen::SparseMatrix<double>& statics, bool symmetrise, Eigen::MatrixXcd& out) {
    for (int j = 0; j < statics.outerSize(); ++j)
        for (Eigen::SparseMatrix<double>::InnerIterator i(statics, j); i; ++i) {
            const double part = symmetrise ? 0.5 * i.value() : i.value();
            out(i.row(), i.col()) += part;
            if (symmetrise) out(i.col(), i.row()) += part;
        }
}

}  // namespace

Potentials fill_potentials(const PairTables& tables, const Basis& basis, double k_per_m, bool symmetrise) {
    const int elements = static_cast<int>(tables.table_of.size());
    Potentials out{Eigen::MatrixXcd::Zero(basis.unknowns, basis.unknowns),
                   Eigen::MatrixXcd::Zero(tables.charges, tables.charges)};
    std::vector<std::mutex> locks(256);
#pragma omp parallel
    {
        RowAccumulator row(basis, tables.charges);
        std::vector<char> skip(at(elements), 0);
#pragma omp for schedule(dynamic, 4)
        for (int p = 0; p < elements; ++p) {
            row.begin(p);
            add_test_element(tables, p, k_per_m, skip, row);
            const auto& own = tables.sources[0].coarse[at(tables.table_of[at(p)])];
            row.finish(own.slots, out, locks);
        }
    }
    out.vector += out.vector.transpose().eval();
    out.scalar += out.scalar.transpose().eval();
    add_statics(tables.vector_statics, symmetrise, out.vector);
    add_statics(tables.scalar_statics, symmetrise, out.scalar);
    return out;
}

std::size_t kernel_evaluations(const PairTables& tables) {
    std::size_t count = 0;
    const auto points = [&](const std::vector<LocalTable>& t, int cell) {
        return at(t[at(tables.table_of[at(cell)])].points);
    };
    const int cells = static_cast<int>(tables.table_of.size());
    for (const SourceSet& set : tables.sources)
        for (int p = 0; p < cells; ++p) {
            const int own = tables.table_of[at(p)];
            for (std::size_t t = at(own); t < set.coarse.size(); ++t) {
                const int first = t == at(own) ? tables.lane_of[at(p)] : 0;
                count += points(tables.sources[0].coarse, p) * at(set.coarse[t].points * (set.coarse[t].lanes - first));
            }
            for (const auto* list : {&set.neighbours[at(p)].near, &set.neighbours[at(p)].middle})
                for (int q : *list) count += points(tables.sources[0].fine, p) * points(set.fine, q);
        }
    return count;
}

}  // namespace annulet
