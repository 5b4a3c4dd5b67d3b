// Quantities with their kind: a value in SI units and the exponents of its base units.
#pragma once

#include <annulet/core/diagnostics.hpp>

#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace annulet {

/// Exponents of the SI base units. The radian counts as one, so that an angle is not taken for a plain number.
struct Dimension {
    int metre = 0;
    int kilogram = 0;
    int second = 0;
    int ampere = 0;
    int radian = 0;
    friend bool operator==(const Dimension&, const Dimension&) = default;
    bool none() const { return *this == Dimension{}; }
    /// The largest exponent by magnitude.
    int largest() const;
};

Dimension operator*(const Dimension& a, const Dimension& b);
Dimension operator/(const Dimension& a, const Dimension& b);
Dimension power(const Dimension& a, int exponent);

/// A kind of quantity that a model file or an option asks for.
struct Kind {
    const char* name;
    Dimension dimension;
    const char* example;  ///< shown as remedy
};

namespace kinds {
inline constexpr Kind number{"number", {}, "4.3"};
inline constexpr Kind fraction{"fraction", {}, "5 %"};
inline constexpr Kind length{"length", {1, 0, 0, 0, 0}, "8 mm"};
inline constexpr Kind frequency{"frequency", {0, 0, -1, 0, 0}, "868.3 MHz"};
inline constexpr Kind time{"time", {0, 0, 1, 0, 0}, "20 ns"};
inline constexpr Kind angle{"angle", {0, 0, 0, 0, 1}, "15 deg"};
inline constexpr Kind resistance{"resistance", {2, 1, -3, -2, 0}, "50 ohm"};
inline constexpr Kind inductance{"inductance", {2, 1, -2, -2, 0}, "12 nH"};
inline constexpr Kind capacitance{"capacitance", {-2, -1, 4, 2, 0}, "0.4 pF"};
inline constexpr Kind power{"power", {2, 1, -3, 0, 0}, "25 mW"};
inline constexpr Kind conductivity{"conductivity", {-3, -1, 3, 2, 0}, "5.8e7 S/m"};
}  // namespace kinds

struct Quantity {
    double value = 0;  ///< SI (radians for angles)
    Dimension dimension{};
    bool ratio = false;  ///< a true pure number (percent, sine, length by length); it never takes a unit
    /// A number without unit, which takes the unit of the place where it is used.
    bool is_bare() const { return dimension.none() && !ratio; }
};

struct Unit {
    std::string_view symbol;
    double scale;  ///< SI value of one
    Dimension dimension;
    bool decibel = false;  ///< decibels above `scale`
    Quantity times(double value) const;
};

/// Units are case sensitive (mHz and MHz differ).
std::optional<Unit> find_unit(std::string_view symbol);
std::vector<std::string> unit_symbols();

/// "length", "frequency", ... with "a" or "an"; products of no known kind show their base units.
std::string kind_with_article(const Dimension& dimension);
std::string kind_with_article(const Quantity& quantity);
std::string kind_with_article(const Kind& kind);

/// For messages: six digits with a fitting unit, as "8 mm", "868.3 MHz", "15 deg".
std::string to_text(double value_si, const Dimension& dimension);
/// The same; fractions as per cent.
std::string to_text(double value_si, const Kind& kind);

/// One number with an optional unit, for command options: "868.3 MHz", "2e9", "10 %". A number without unit
/// is multiplied by `bare_scale`. Throws InputError without position; `what` names the value in its message.
double parse_quantity(const std::string& text, const Kind& kind, const std::string& what, double bare_scale = 1);

}  // namespace annulet
