// Files read and written whole. Nothing is overwritten that annulet did not write, unless forced.
#pragma once

#include <string>
#include <vector>

namespace annulet {

/// The whole of a regular file of at most 64 MiB. Throws FileError with the system's reason.
std::string read_text(const std::string& path);

/// A file to be written. One that stands at `path` already counts as ours when its first lines carry `marker`.
struct OutputFile {
    std::string path;
    std::string content;
    std::string marker;
};

/// Writes all the files or, on any failure, leaves those that stood before: each goes to a temporary file beside its
/// target first, and all are renamed only when every one is on disk. Missing directories are made.
/// Throws FileError; with `force` whatever stands at a path is replaced, short of a directory.
void write_files(const std::vector<OutputFile>& files, bool force);

/// Refuses now what `write_files` would refuse, so that nobody waits for a result that cannot be kept.
/// Only `path` and `marker` are looked at.
void check_writable(const std::vector<OutputFile>& files, bool force);

}  // namespace annulet
