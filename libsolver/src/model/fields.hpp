// Reading the keys of a table with their kinds and limits.
#pragma once

#include "model/parameters.hpp"

#include <annulet/core/vec3.hpp>

#include <initializer_list>
#include <limits>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace annulet {

inline constexpr std::size_t longest_list = 10'000;
inline constexpr double unlimited = std::numeric_limits<double>::infinity();

/// Allowed values, in SI.
struct Range {
    double least = -unlimited;
    double most = unlimited;
    bool above_least = false;  ///< the least value itself is excluded
};

namespace ranges {
inline constexpr double farthest_m = 1e6;
inline constexpr Range any{};
inline constexpr Range coordinate{-farthest_m, farthest_m};
inline constexpr Range positive{0, unlimited, true};
inline constexpr Range not_negative{0, unlimited};
inline constexpr Range positive_length{0, farthest_m, true};
inline constexpr Range not_negative_length{0, farthest_m};
inline constexpr Range frequency{1, 1e13};
}  // namespace ranges

struct Context {
    const ParsedText& parsed;
    Faults& faults;
    Parameters& parameters;

    /// Value in SI of `node`, which `what` names in messages; NaN when faulty (reported).
    double quantity(const toml::node& node, const std::string& what, const Kind& kind, const Range& range);
    /// Array of 2 or 3 coordinates; empty when faulty.
    std::optional<Vec2> point2(const toml::node& node, const std::string& what);
    std::optional<Vec3> point3(const toml::node& node, const std::string& what);
    /// Two or three numbers as lengths.
    std::vector<double> coordinates(const toml::node& node, const std::string& what,
                                    const Range& range = ranges::coordinate);
};

/// "metal 'band'" or, without name, "metal 2".
std::string item_label(const char* kind, const toml::table& table, std::size_t index);

/// The keys of one table. The constructor reports unknown and reserved ones; getters report what is wrong and return
/// nothing, NaN or an empty value, so that reading goes on to the next fault.
class Fields {
public:
    Fields(const toml::table& table, std::string what, Context& context, std::vector<std::string> allowed,
           const std::vector<std::string>& reserved = {});

    bool has(std::string_view key) const { return table_.contains(key); }
    const toml::node* get(std::string_view key) const { return table_.get(key); }
    /// Reports when absent.
    const toml::node* need(std::string_view key, const char* example);
    const toml::array* need_list(std::string_view key, const char* example);
    const toml::array* list(std::string_view key);
    const toml::table* table(std::string_view key);

    double need(std::string_view key, const Kind& kind, const Range& range);
    double number(std::string_view key, const Kind& kind, const Range& range, double otherwise);
    std::optional<double> optional(std::string_view key, const Kind& kind, const Range& range);
    std::optional<int> whole(std::string_view key, int least, int most);
    std::string text(std::string_view key, std::string otherwise = {});
    /// Reports when absent or empty.
    std::string need_text(std::string_view key, const char* example);
    bool flag(std::string_view key);
    std::optional<Vec2> need_point2(std::string_view key);
    std::optional<Vec3> need_point3(std::string_view key);

    /// The one of `keys` that is present, or reports none or several ("shape", "exactly one of ...").
    std::string exactly_one(const std::vector<std::string>& keys, const char* noun, const std::string& help = {});
    /// Reports each of `keys` that is present: "'x' has no meaning ...".
    void refuse(std::initializer_list<const char*> keys, const std::string& reason, const std::string& help = {});

    std::string named(std::string_view key) const;
    Position where() const { return position_of(table_); }
    Position where(std::string_view key) const;
    const std::string& what() const { return what_; }
    Context& context() { return context_; }

private:
    void report_unknown(const toml::key& key, const std::vector<std::string>& allowed);

    const toml::table& table_;
    std::string what_;
    Context& context_;
};

}  // namespace annulet
