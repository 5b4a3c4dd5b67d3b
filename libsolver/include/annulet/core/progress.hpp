// Cooperative cancellation and progress: long computations call `report` between units of work.
#pragma once

#include <cstddef>
#include <string>

namespace annulet {

/// Implemented by whoever watches. All members may be called from the thread that started the work only.
class Progress {
public:
    virtual ~Progress() = default;
    /// `done` of `total` units of `stage` are finished (total 0: unknown).
    virtual void report(const std::string& stage, std::size_t done, std::size_t total) = 0;
    /// True once the work should stop; the worker then throws `Cancelled`.
    virtual bool cancelled() const = 0;
};

/// Throws `Cancelled` if asked to, else reports; `progress` may be null.
void checkpoint(Progress* progress, const std::string& stage, std::size_t done, std::size_t total);

}  // namespace annulet
