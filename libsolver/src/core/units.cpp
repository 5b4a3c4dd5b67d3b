#include <annulet/core/constants.hpp>
#include <annulet/core/units.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <charconv>
#include <cmath>
#include <cstdlib>

namespace annulet {

namespace {

constexpr Dimension siemens{-2, -1, 3, 2, 0};
constexpr double degree = constants::pi / 180;

// The inch and the mil are exact by definition (international yard, 1959).
constexpr auto units = std::to_array<Unit>({
    {"nm", 1e-9, kinds::length.dimension},
    {"um", 1e-6, kinds::length.dimension},
    {"µm", 1e-6, kinds::length.dimension},
    {"mm", 1e-3, kinds::length.dimension},
    {"cm", 1e-2, kinds::length.dimension},
    {"m", 1, kinds::length.dimension},
    {"km", 1e3, kinds::length.dimension},
    {"mil", 25.4e-6, kinds::length.dimension},
    {"inch", 25.4e-3, kinds::length.dimension},
    {"Hz", 1, kinds::frequency.dimension},
    {"kHz", 1e3, kinds::frequency.dimension},
    {"MHz", 1e6, kinds::frequency.dimension},
    {"GHz", 1e9, kinds::frequency.dimension},
    {"THz", 1e12, kinds::frequency.dimension},
    {"ps", 1e-12, kinds::time.dimension},
    {"ns", 1e-9, kinds::time.dimension},
    {"us", 1e-6, kinds::time.dimension},
    {"ms", 1e-3, kinds::time.dimension},
    {"s", 1, kinds::time.dimension},
    {"deg", degree, kinds::angle.dimension},
    {"°", degree, kinds::angle.dimension},
    {"rad", 1, kinds::angle.dimension},
    {"mohm", 1e-3, kinds::resistance.dimension},
    {"ohm", 1, kinds::resistance.dimension},
    {"Ω", 1, kinds::resistance.dimension},
    {"kohm", 1e3, kinds::resistance.dimension},
    {"Mohm", 1e6, kinds::resistance.dimension},
    {"pH", 1e-12, kinds::inductance.dimension},
    {"nH", 1e-9, kinds::inductance.dimension},
    {"uH", 1e-6, kinds::inductance.dimension},
    {"µH", 1e-6, kinds::inductance.dimension},
    {"mH", 1e-3, kinds::inductance.dimension},
    {"H", 1, kinds::inductance.dimension},
    {"fF", 1e-15, kinds::capacitance.dimension},
    {"pF", 1e-12, kinds::capacitance.dimension},
    {"nF", 1e-9, kinds::capacitance.dimension},
    {"uF", 1e-6, kinds::capacitance.dimension},
    {"µF", 1e-6, kinds::capacitance.dimension},
    {"F", 1, kinds::capacitance.dimension},
    {"uW", 1e-6, kinds::power.dimension},
    {"mW", 1e-3, kinds::power.dimension},
    {"W", 1, kinds::power.dimension},
    {"kW", 1e3, kinds::power.dimension},
    {"dBm", 1e-3, kinds::power.dimension, true},
    {"S", 1, siemens},
    {"S/m", 1, kinds::conductivity.dimension},
    {"MS/m", 1e6, kinds::conductivity.dimension},
    {"%", 1e-2, {}},
});

constexpr auto named_kinds = std::to_array<Kind>({kinds::number,
                                                  kinds::length,
                                                  kinds::frequency,
                                                  kinds::time,
                                                  kinds::angle,
                                                  kinds::resistance,
                                                  kinds::inductance,
                                                  kinds::capacitance,
                                                  kinds::power,
                                                  kinds::conductivity,
                                                  {"area", {2, 0, 0, 0, 0}, ""},
                                                  {"volume", {3, 0, 0, 0, 0}, ""},
                                                  {"speed", {1, 0, -1, 0, 0}, ""},
                                                  {"conductance", siemens, ""}});

std::string base_units(const Dimension& d) {
    std::string text;
    const auto append = [&text](const char* symbol, int exponent) {
        if (exponent == 0) return;
        text += text.empty() ? "" : " ";
        text += exponent == 1 ? std::string(symbol) : fmt::format("{}^{}", symbol, exponent);
    };
    append("kg", d.kilogram);
    append("m", d.metre);
    append("s", d.second);
    append("A", d.ampere);
    append("rad", d.radian);
    return text;
}

// The units in which a message shows a kind, largest first.
std::vector<std::string_view> shown_units(const Dimension& d) {
    if (d == kinds::length.dimension) return {"km", "m", "mm", "um"};
    if (d == kinds::frequency.dimension) return {"THz", "GHz", "MHz", "kHz", "Hz"};
    if (d == kinds::time.dimension) return {"s", "ms", "us", "ns", "ps"};
    if (d == kinds::angle.dimension) return {"deg"};
    if (d == kinds::resistance.dimension) return {"Mohm", "kohm", "ohm"};
    if (d == kinds::inductance.dimension) return {"H", "mH", "uH", "nH", "pH"};
    if (d == kinds::capacitance.dimension) return {"F", "uF", "nF", "pF", "fF"};
    if (d == kinds::power.dimension) return {"W", "mW", "uW"};
    if (d == kinds::conductivity.dimension) return {"S/m"};
    return {};
}

[[noreturn]] void refuse(std::string message, std::string help) {
    throw InputError({{Severity::error, {}, std::move(message), std::move(help)}});
}

// Counts in full: "2000000", not "2e+06".
std::string plain(double value) {
    const bool count = std::abs(value) < 1e12 && value == std::round(value);
    return count ? fmt::format("{:.0f}", value) : fmt::format("{:.6g}", value);
}

std::string zero(const Dimension& dimension) {
    if (dimension == kinds::length.dimension) return "0 mm";
    for (const auto symbol : shown_units(dimension)) {
        if (find_unit(symbol)->scale == 1) return fmt::format("0 {}", symbol);
    }
    return "0 deg";
}

std::string_view trimmed(std::string_view text) {
    const auto first = text.find_first_not_of(" \t");
    if (first == std::string_view::npos) return {};
    return text.substr(first, text.find_last_not_of(" \t") - first + 1);
}

}  // namespace

int Dimension::largest() const {
    return std::max({std::abs(metre), std::abs(kilogram), std::abs(second), std::abs(ampere), std::abs(radian)});
}

Dimension operator*(const Dimension& a, const Dimension& b) {
    return {a.metre + b.metre, a.kilogram + b.kilogram, a.second + b.second, a.ampere + b.ampere, a.radian + b.radian};
}

Dimension power(const Dimension& a, int n) {
    return {a.metre * n, a.kilogram * n, a.second * n, a.ampere * n, a.radian * n};
}

Dimension operator/(const Dimension& a, const Dimension& b) {
    return a * power(b, -1);
}

Quantity Unit::times(double value) const {
    if (decibel) return {scale * std::pow(10.0, value / 10), dimension, false};
    return {value * scale, dimension, dimension.none()};
}

std::optional<Unit> find_unit(std::string_view symbol) {
    const auto found = std::find_if(units.begin(), units.end(), [&](const Unit& u) { return u.symbol == symbol; });
    if (found == units.end()) return std::nullopt;
    return *found;
}

std::vector<std::string> unit_symbols() {
    std::vector<std::string> symbols;
    for (const Unit& unit : units) symbols.emplace_back(unit.symbol);
    return symbols;
}

std::string kind_with_article(const Dimension& dimension) {
    const auto found = std::find_if(named_kinds.begin(), named_kinds.end(),
                                    [&](const Kind& kind) { return kind.dimension == dimension; });
    if (found == named_kinds.end()) return "a quantity in " + base_units(dimension);
    return kind_with_article(*found);
}

std::string kind_with_article(const Kind& kind) {
    const std::string name = kind.name;
    return (std::string("aeiou").find(name[0]) != std::string::npos ? "an " : "a ") + name;
}

std::string kind_with_article(const Quantity& quantity) {
    return quantity.ratio ? "a ratio" : kind_with_article(quantity.dimension);
}

std::string to_text(double value_si, const Dimension& dimension) {
    const auto shown = shown_units(dimension);
    if (shown.empty()) {
        return dimension.none() ? plain(value_si) : fmt::format("{:.6g} {}", value_si, base_units(dimension));
    }
    if (value_si == 0) return zero(dimension);
    for (const auto symbol : shown) {
        const Unit unit = *find_unit(symbol);
        // Millimetres read better than a fraction of a metre or tens of micrometres: board dimensions.
        const double least = symbol == "mm" ? 0.01 : 1;
        const bool last = symbol == shown.back();
        if (last || std::abs(value_si) >= least * unit.scale * (1 - 1e-9)) {
            return fmt::format("{:.6g} {}", value_si / unit.scale, unit.symbol);
        }
    }
    return {};
}

std::string to_text(double value_si, const Kind& kind) {
    const bool fraction = std::string_view(kind.name) == kinds::fraction.name;
    return fraction ? fmt::format("{:.6g} %", 100 * value_si) : to_text(value_si, kind.dimension);
}

double parse_quantity(const std::string& text, const Kind& kind, const std::string& what, double bare_scale) {
    const std::string_view whole = trimmed(text);
    const std::string help = fmt::format("write it as '{}'", kind.example);
    double value = 0;
    const auto [end, error] = std::from_chars(whole.data(), whole.data() + whole.size(), value);
    if (error != std::errc{} || !std::isfinite(value)) {
        refuse(fmt::format("{} must be {}, but is '{}'", what, kind_with_article(kind), text), help);
    }
    const std::string symbol(trimmed(whole.substr(static_cast<std::size_t>(end - whole.data()))));
    if (symbol.empty()) return value * bare_scale;
    const auto unit = find_unit(symbol);
    if (!unit) {
        const std::string near = nearest(symbol, unit_symbols());
        refuse(fmt::format("unknown unit '{}' in {} '{}'", symbol, what, text),
               near.empty() ? help : fmt::format("did you mean '{}'?", near));
    }
    const Quantity quantity = unit->times(value);
    if (quantity.dimension != kind.dimension) {
        refuse(fmt::format("{} must be {}, but '{}' is {}", what, kind_with_article(kind), text,
                           kind_with_article(quantity)),
               help);
    }
    return quantity.value;
}

}  // namespace annulet
