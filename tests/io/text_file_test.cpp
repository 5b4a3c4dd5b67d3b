#include <annulet/core/diagnostics.hpp>
#include <annulet/io/text_file.hpp>

#include <gmock/gmock.h>
#include <gtest/gtest.h>
#include <unistd.h>

#include <filesystem>
#include <fstream>
#include <functional>

namespace annulet {
namespace {

namespace fs = std::filesystem;

class TextFile : public testing::Test {
protected:
    TextFile() { fs::create_directories(folder_); }
    ~TextFile() override { fs::remove_all(folder_); }
    std::string path(const std::string& name) const { return (folder_ / name).string(); }
    void put(const std::string& name, const std::string& text) const { std::ofstream(path(name)) << text; }
    std::ptrdiff_t entries() const { return std::distance(fs::directory_iterator(folder_), fs::directory_iterator()); }

private:
    fs::path folder_ = fs::temp_directory_path() / ("annulet_text_file_test_" + std::to_string(::getpid()));
};

std::string failure(const std::function<void()>& action) {
    try {
        action();
    } catch (const FileError& error) {
        return error.what();
    }
    return "no failure";
}

TEST_F(TextFile, ComesBackAsItWasWritten) {
    const std::string text = std::string("one\r\ntwo\0three\n", 15);
    write_files({{path("a/b/c.txt"), text, "one"}}, false);
    EXPECT_EQ(read_text(path("a/b/c.txt")), text);
}

TEST_F(TextFile, OwnFilesAreReplaced) {
    write_files({{path("x.csv"), "mark 1\n", "mark"}}, false);
    write_files({{path("x.csv"), "mark 2\n", "mark"}}, false);
    EXPECT_EQ(read_text(path("x.csv")), "mark 2\n");
    EXPECT_EQ(entries(), 1);
}

TEST_F(TextFile, StrangeFilesAreNotUnlessForced) {
    put("x.csv", "precious");
    const std::vector<OutputFile> files{{path("new.csv"), "mark", "mark"}, {path("x.csv"), "mark", "mark"}};
    EXPECT_THAT(failure([&] { write_files(files, false); }),
                testing::HasSubstr("a file stands there that annulet did not write (--force replaces it)"));
    EXPECT_EQ(read_text(path("x.csv")), "precious");
    EXPECT_FALSE(fs::exists(path("new.csv"))) << "all or nothing";
    write_files(files, true);
    EXPECT_EQ(read_text(path("x.csv")), "mark");
}

TEST_F(TextFile, AnEmptyMarkerMatchesNothing) {
    put("x", "text");
    EXPECT_NE(failure([&] { check_writable({{path("x"), "", ""}}, false); }), "no failure");
}

TEST_F(TextFile, FailureLeavesNoTemporaryFile) {
    fs::create_directory(path("taken"));
    EXPECT_THAT(failure([&] {
                    write_files({{path("a"), "1", "1"}, {path("taken"), "1", "1"}}, true);
                }),
                testing::HasSubstr("it is a directory"));
    put("file", "");
    EXPECT_THAT(failure([&] {
                    write_files({{path("a"), "1", "1"}, {path("file/below"), "1", "1"}}, true);
                }),
                testing::HasSubstr("cannot make the directory"));
    EXPECT_EQ(entries(), 2);
}

TEST_F(TextFile, UnreadableThingsAreNamed) {
    EXPECT_EQ(failure([&] { read_text(path("none")); }), "cannot read " + path("none") + ": there is no such file");
    EXPECT_THAT(failure([&] { read_text(path(".")); }), testing::HasSubstr("it is a directory"));
    EXPECT_THAT(failure([] { read_text("/dev/zero"); }), testing::HasSubstr("it is not a regular file"));
    put("large", "");
    fs::resize_file(path("large"), 65u << 20);
    EXPECT_THAT(failure([&] { read_text(path("large")); }), testing::HasSubstr("it has 65 MiB, more than 64"));
}

}  // namespace
}  // namespace annulet
