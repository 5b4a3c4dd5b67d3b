// The parsed file and the places of its values.
#pragma once

#include <annulet/core/diagnostics.hpp>

#include <string>
#include <string_view>
#include <vector>

// An assertion inside the parser must not end the program over a slip in a file: "[.]" trips one in release 3.3, and
// the path behind it reports the fault well.
#ifndef TOML_ASSERT
#define TOML_ASSERT(expr) static_assert(true)
#endif
#include <toml++/toml.h>

namespace annulet {

inline constexpr std::size_t largest_text_bytes = 4'000'000;

struct ParsedText {
    std::string text;
    std::string file_name;
    toml::table root;
    std::vector<std::size_t> line_starts;

    /// Place of byte `offset` of the string value `node`; its first quote where the value is not written verbatim
    /// (escapes, several lines).
    Position within(const toml::node& node, std::string_view value, std::size_t offset) const;
};

Position position_of(const toml::node& node);
Position position_of(const toml::key& key);

/// Collects the faults of one evaluation.
class Faults {
public:
    void add(Position where, std::string message, std::string help = {});
    std::size_t count() const { return faults_.size(); }
    /// Throws InputError when anything was added.
    void throw_if_any();

private:
    std::vector<Diagnostic> faults_;
    bool more_ = false;
};

}  // namespace annulet
