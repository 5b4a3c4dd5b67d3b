#include <annulet/core/diagnostics.hpp>
#include <annulet/io/text_file.hpp>

#include <fmt/format.h>
#include <sys/stat.h>
#include <unistd.h>

#include <cerrno>
#include <cstdlib>
#include <cstring>
#include <filesystem>
#include <fstream>
#include <string_view>
#include <system_error>
#include <utility>

namespace annulet {
namespace {

namespace fs = std::filesystem;
constexpr std::uintmax_t most_bytes = 64u << 20;
constexpr std::streamsize marker_reach_bytes = 512;

[[noreturn]] void fail(const std::string& verb, const std::string& path, const std::string& reason) {
    throw FileError(fmt::format("cannot {} {}: {}", verb, path, reason));
}

std::string system_reason() {
    return std::strerror(errno);
}

/// A file beside its target that disappears unless it is renamed in time.
class TemporaryFile {
public:
    explicit TemporaryFile(const OutputFile& file) : target_(file.path), path_(file.path + ".XXXXXX") {
        const int descriptor = ::mkstemp(path_.data());
        if (descriptor < 0) fail("write", target_, system_reason());
        alive_ = true;
        const auto reason = fill(descriptor, file.content);
        ::close(descriptor);
        if (!reason.empty()) {
            remove();
            fail("write", target_, reason);
        }
    }
    TemporaryFile(TemporaryFile&& other) noexcept
        : target_(std::move(other.target_)),
          path_(std::move(other.path_)),
          alive_(std::exchange(other.alive_, false)) {}
    TemporaryFile& operator=(TemporaryFile&&) = delete;
    ~TemporaryFile() { remove(); }

    void take_its_place() {
        if (std::rename(path_.c_str(), target_.c_str()) != 0) fail("write", target_, system_reason());
        alive_ = false;
    }

private:
    static std::string fill(int descriptor, std::string_view content) {
        while (!content.empty()) {
            const auto written = ::write(descriptor, content.data(), content.size());
            if (written < 0 && errno == EINTR) continue;
            if (written < 0) return system_reason();
            content.remove_prefix(static_cast<std::size_t>(written));
        }
        // mkstemp is for the owner's eyes only; a result is an ordinary file.
        const mode_t mask = ::umask(0);
        ::umask(mask);
        if (::fchmod(descriptor, 0666 & ~mask) != 0 || ::fsync(descriptor) != 0) return system_reason();
        return {};
    }
    void remove() noexcept {
        if (alive_) ::unlink(path_.c_str());
        alive_ = false;
    }

    std::string target_;
    std::string path_;
    bool alive_ = false;
};

bool is_ours(const OutputFile& file) {
    std::ifstream stream(file.path, std::ios::binary);
    std::string start(static_cast<std::size_t>(marker_reach_bytes), '\0');
    stream.read(start.data(), marker_reach_bytes);
    start.resize(static_cast<std::size_t>(stream.gcount()));
    return !file.marker.empty() && start.find(file.marker) != std::string::npos;
}

void make_directory_of(const std::string& path) {
    const auto parent = fs::path(path).parent_path();
    if (parent.empty()) return;
    std::error_code error;
    fs::create_directories(parent, error);
    if (error) fail("make the directory", parent.string(), error.message());
}

}  // namespace

std::string read_text(const std::string& path) {
    std::error_code error;
    const auto status = fs::status(path, error);
    if (status.type() == fs::file_type::not_found) fail("read", path, "there is no such file");
    if (error) fail("read", path, error.message());
    if (fs::is_directory(status)) fail("read", path, "it is a directory");
    if (!fs::is_regular_file(status)) fail("read", path, "it is not a regular file");
    const auto size = fs::file_size(path, error);
    if (error) fail("read", path, error.message());
    if (size > most_bytes) fail("read", path, fmt::format("it has {} MiB, more than {}", size >> 20, most_bytes >> 20));
    errno = 0;
    std::ifstream stream(path, std::ios::binary);
    if (!stream) fail("read", path, system_reason());
    std::string text(static_cast<std::size_t>(size), '\0');
    stream.read(text.data(), static_cast<std::streamsize>(size));
    text.resize(static_cast<std::size_t>(stream.gcount()));
    if (stream.bad()) fail("read", path, system_reason());
    return text;
}

void check_writable(const std::vector<OutputFile>& files, bool force) {
    for (const auto& file : files) {
        std::error_code error;
        const auto status = fs::status(file.path, error);
        if (!fs::exists(status)) continue;
        if (fs::is_directory(status)) fail("write", file.path, "it is a directory");
        if (!force && !is_ours(file))
            fail("write", file.path, "a file stands there that annulet did not write (--force replaces it)");
    }
}

void write_files(const std::vector<OutputFile>& files, bool force) {
    check_writable(files, force);
    std::vector<TemporaryFile> ready;
    for (const auto& file : files) {
        make_directory_of(file.path);
        ready.emplace_back(file);
    }
    for (auto& file : ready) file.take_its_place();
}

}  // namespace annulet
