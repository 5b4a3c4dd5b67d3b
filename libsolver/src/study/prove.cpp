#include <annulet/core/diagnostics.hpp>
#include <annulet/study/prove.hpp>

#include <omp.h>

#include <algorithm>
#include <atomic>
#include <chrono>
#include <exception>
#include <utility>

#include "study/prove_cases.hpp"

namespace annulet {

namespace {

std::vector<ProveTask> all_tasks() {
    std::vector<ProveTask> tasks;
    for (const auto& group : {dipole_tasks(), loop_tasks(), coupling_tasks(), flat_metal_tasks()})
        tasks.insert(tasks.end(), group.begin(), group.end());
    return tasks;
}

/// The first exception of any thread, to be thrown again after the parallel region.
class FirstFault {
public:
    void keep() {
#pragma omp critical(annulet_prove_fault)
        if (!fault_) fault_ = std::current_exception();
        stop_ = true;
    }
    bool any() const {
        return stop_;
    }
    void rethrow() const {
        if (fault_) std::rethrow_exception(fault_);
    }

private:
    std::exception_ptr fault_;
    std::atomic<bool> stop_{false};
};

}  // namespace

bool ProveReport::pass() const {
    return failed() == 0;
}

int ProveReport::judged() const {
    return static_cast<int>(std::count_if(cases.begin(), cases.end(), [](const ProveCase& c) { return c.judged; }));
}

int ProveReport::failed() const {
    return static_cast<int>(std::count_if(cases.begin(), cases.end(), [](const ProveCase& c) { return !c.pass(); }));
}

ProveReport prove(Progress* progress) {
    const auto start = std::chrono::steady_clock::now();
    const auto tasks = all_tasks();
    std::vector<std::vector<ProveCase>> results(tasks.size());
    FirstFault fault;
    std::atomic<std::size_t> finished{0};
#pragma omp parallel for schedule(dynamic, 1)
    for (std::size_t i = 0; i < tasks.size(); ++i) {
        if (fault.any()) continue;
        try {
            // Only the thread that began the work may speak to who watches it.
            if (omp_get_thread_num() == 0) checkpoint(progress, "prove", finished, tasks.size());
            results[i] = tasks[i]();
            ++finished;
        } catch (...) {
            fault.keep();
        }
    }
    fault.rethrow();
    ProveReport report;
    for (const auto& cases : results) report.cases.insert(report.cases.end(), cases.begin(), cases.end());
    report.total_s = std::chrono::duration<double>(std::chrono::steady_clock::now() - start).count();
    return report;
}

ProveCase complex_case(std::string name, std::string quantity, std::complex<double> reference,
                       std::complex<double> computed, double tolerance, std::string source) {
    ProveCase c;
    c.name = std::move(name);
    c.quantity = std::move(quantity);
    c.is_complex = true;
    c.reference = reference;
    c.computed = computed;
    c.scale = std::abs(reference);
    c.tolerance = tolerance;
    c.source = std::move(source);
    return c;
}

ProveCase real_case(std::string name, std::string quantity, double reference, double computed, double tolerance,
                    std::string source) {
    ProveCase c = complex_case(std::move(name), std::move(quantity), reference, computed, tolerance, std::move(source));
    c.is_complex = false;
    return c;
}

ProveCase shown_only(ProveCase shown, std::string why_not) {
    shown.judged = false;
    shown.why_not = std::move(why_not);
    return shown;
}

}  // namespace annulet
