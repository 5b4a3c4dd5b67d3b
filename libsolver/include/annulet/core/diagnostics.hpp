// What is wrong, where, and what to do about it.
#pragma once

#include <stdexcept>
#include <string>
#include <vector>

namespace annulet {

/// A place in a text; lines and columns count from 1, 0 means unknown.
struct Position {
    int line = 0;
    int column = 0;
    friend bool operator==(const Position&, const Position&) = default;
    friend auto operator<=>(const Position&, const Position&) = default;
};

enum class Severity { caution, error };

struct Diagnostic {
    Severity severity = Severity::error;
    Position where;
    std::string message;  ///< one sentence, no trailing stop, values with units
    std::string help;     ///< the remedy, or empty
};

/// Bad input: carries every fault found, in order of position. Exit status 2.
class InputError : public std::runtime_error {
public:
    explicit InputError(std::vector<Diagnostic> faults);
    const std::vector<Diagnostic>& faults() const { return faults_; }

private:
    std::vector<Diagnostic> faults_;
};

/// The numerics failed (singular matrix, no convergence); the text carries the values. Exit status 3.
class NumericalError : public std::runtime_error {
public:
    using std::runtime_error::runtime_error;
};

/// A file could not be read or written. Exit status 4.
class FileError : public std::runtime_error {
public:
    using std::runtime_error::runtime_error;
};

/// The user interrupted the work. Exit status 130.
class Cancelled : public std::runtime_error {
public:
    Cancelled() : std::runtime_error("interrupted") {}
};

/// `file:line:column: error: message`, the line of `text` with a caret under the column,
/// and `help: ...` where there is a remedy. Ends with a newline.
std::string format(const Diagnostic& fault, const std::string& file, const std::string& text);

/// The nearest of `known` to `word` by edit distance, or empty if none is near enough to be meant.
std::string nearest(const std::string& word, const std::vector<std::string>& known);

}  // namespace annulet
