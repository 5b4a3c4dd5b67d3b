// The few LAPACK and BLAS routines in use, by their Fortran names [Anderson1999]. Hidden string lengths come last.
#pragma once

#ifdef ANNULET_HAS_OPENBLAS

#include <complex>
#include <cstddef>

extern "C" {

void zsytrf_(const char* uplo, const int* n, std::complex<double>* a, const int* lda, int* pivots,
             std::complex<double>* work, const int* lwork, int* info, std::size_t uplo_length);
void zsytrs_(const char* uplo, const int* n, const int* nrhs, const std::complex<double>* a, const int* lda,
             const int* pivots, std::complex<double>* b, const int* ldb, int* info, std::size_t uplo_length);
void zsycon_(const char* uplo, const int* n, const std::complex<double>* a, const int* lda, const int* pivots,
             const double* anorm, double* rcond, std::complex<double>* work, int* info, std::size_t uplo_length);
int openblas_get_parallel(void);
int openblas_get_num_threads(void);
void openblas_set_num_threads(int threads);

}  // extern "C"

#endif
