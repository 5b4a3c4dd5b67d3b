#include <annulet/core/diagnostics.hpp>
#include <annulet/core/progress.hpp>

namespace annulet {

void checkpoint(Progress* progress, const std::string& stage, std::size_t done, std::size_t total) {
    if (progress == nullptr) return;
    if (progress->cancelled()) throw Cancelled();
    progress->report(stage, done, total);
}

}  // namespace annulet
