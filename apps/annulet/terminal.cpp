#include "terminal.hpp"

#include <fmt/format.h>

#include <atomic>
#include <cerrno>
#include <chrono>
#include <csignal>
#include <cstdio>
#include <cstring>

namespace annulet::app {
namespace {

// The one global that can change: a signal handler can reach nothing else.
std::atomic<bool> interrupt_requested{false};
static_assert(std::atomic<bool>::is_always_lock_free);

void on_interrupt(int) {
    interrupt_requested.store(true);
}

class SilentProgress : public Progress {
public:
    void report(const std::string&, std::size_t, std::size_t) override {}
    bool cancelled() const override { return interrupt_requested.load(); }
};

class TerminalProgress : public SilentProgress {
public:
    ~TerminalProgress() override { std::fputs("\r\033[K", stderr); }
    void report(const std::string& stage, std::size_t done, std::size_t total) override {
        const auto now = std::chrono::steady_clock::now();
        const bool too_soon = stage == stage_ && now - shown_ < std::chrono::milliseconds(100);
        if (too_soon) return;
        shown_ = now;
        stage_ = stage;
        const auto text = total > 0 ? fmt::format("\r\033[K{} {}/{}", stage, done, total) : "\r\033[K" + stage;
        std::fputs(text.c_str(), stderr);
        std::fflush(stderr);
    }

private:
    std::string stage_;
    std::chrono::steady_clock::time_point shown_;
};

}  // namespace

void catch_interrupts() {
    struct sigaction action {};
    action.sa_handler = on_interrupt;
    action.sa_flags = static_cast<int>(SA_RESETHAND);
    sigemptyset(&action.sa_mask);
    sigaction(SIGINT, &action, nullptr);
    sigaction(SIGTERM, &action, nullptr);
}

std::unique_ptr<Progress> make_progress(bool visible) {
    if (visible) return std::make_unique<TerminalProgress>();
    return std::make_unique<SilentProgress>();
}

void report_faults(const InputError& error, const std::string& file, const std::string& text) {
    for (const auto& fault : error.faults()) std::fputs(format(fault, file, text).c_str(), stderr);
}

void report_error(const std::string& message, const std::string& help) {
    fmt::print(stderr, "annulet: error: {}\n", message);
    if (!help.empty()) fmt::print(stderr, "help: {}\n", help);
}

void print(const std::string& text) {
    const bool written = std::fwrite(text.data(), 1, text.size(), stdout) == text.size() && std::fflush(stdout) == 0;
    if (!written) throw FileError(fmt::format("cannot write to standard output: {}", std::strerror(errno)));
}

}  // namespace annulet::app
