#include <annulet/numerics/blas_threads.hpp>

#include <omp.h>

#include <cassert>

#include "numerics/lapack.hpp"

namespace annulet {

namespace {

#ifdef ANNULET_HAS_OPENBLAS
constexpr int own_thread_pool = 1;  // openblas_get_parallel: 0 sequential, 1 own threads, 2 OpenMP
#endif

// A BLAS built on OpenMP takes its number from omp_get_max_threads at each call; one with its own pool must be told.
void set_threads(int threads) {
    omp_set_num_threads(threads);
#ifdef ANNULET_HAS_OPENBLAS
    if (openblas_get_parallel() == own_thread_pool) openblas_set_num_threads(threads);
#endif
}

}  // namespace

BlasThreads::BlasThreads(int threads) : previous_(omp_get_max_threads()) {
    assert(threads >= 1);
    set_threads(threads);
}

BlasThreads::~BlasThreads() {
    set_threads(previous_);
}

int BlasThreads::current() {
    if (omp_in_parallel() != 0) return 1;
#ifdef ANNULET_HAS_OPENBLAS
    if (openblas_get_parallel() == own_thread_pool) return openblas_get_num_threads();
#endif
    return omp_get_max_threads();
}

}  // namespace annulet
