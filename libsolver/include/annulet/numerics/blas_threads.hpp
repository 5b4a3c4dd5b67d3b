// How many threads the linear algebra may use.
#pragma once

namespace annulet {

/// While alive, OpenMP regions and BLAS calls started by the calling thread use `threads` threads; the previous
/// number comes back at the end. Inside an OpenMP parallel region BLAS is single-threaded without help.
class BlasThreads {
public:
    /// `threads` >= 1.
    explicit BlasThreads(int threads);
    ~BlasThreads();
    BlasThreads(const BlasThreads&) = delete;
    BlasThreads& operator=(const BlasThreads&) = delete;

    /// The number of threads that a BLAS call of the calling thread would use now.
    static int current();

private:
    int previous_;
};

}  // namespace annulet
