#include <annulet/io/touchstone.hpp>

#include <fmt/format.h>

#include <algorithm>

namespace annulet {
namespace {

using Eigen::Index;
using Eigen::MatrixXcd;
constexpr Index pairs_per_line = 4;

std::string printable_ascii(const std::string& text) {
    std::string clean;
    for (const char c : text) {
        const bool continues_a_character = (static_cast<unsigned char>(c) & 0xC0) == 0x80;
        if (c >= ' ' && c <= '~')
            clean += c;
        else if (!continues_a_character)
            clean += c == '\t' || c == '\n' ? ' ' : '?';
    }
    return clean;
}

std::string references(const std::vector<double>& reference_ohm) {
    return fmt::format("{}", fmt::join(reference_ohm, " "));
}

std::string pair(const std::complex<double>& s) {
    return fmt::format(" {: .12e} {: .12e}", s.real(), s.imag());
}

/// One and two ports stand in one line, two ports column by column (N11 N21 N12 N22).
std::string short_line(const MatrixXcd& s) {
    std::string line;
    for (Index column = 0; column < s.cols(); ++column)
        for (Index row = 0; row < s.rows(); ++row) line += pair(s(row, column));
    return line + "\n";
}

/// Row by row, each row on a new line.
std::string matrix_lines(const MatrixXcd& s) {
    std::string lines;
    for (Index row = 0; row < s.rows(); ++row)
        for (Index column = 0; column < s.cols(); ++column) {
            lines += pair(s(row, column));
            if (column + 1 == s.cols() || (column + 1) % pairs_per_line == 0) lines += '\n';
        }
    return lines;
}

}  // namespace

std::string touchstone_extension(std::size_t ports) {
    return fmt::format(".s{}p", ports);
}

std::string touchstone_text(const TouchstoneData& data) {
    const auto ports = data.reference_ohm.size();
    const bool version_2 = ports > 2;
    std::string text;
    for (const auto& comment : data.comments) text += "! " + printable_ascii(comment) + "\n";
    if (version_2) {
        text += fmt::format(
            "[Version] 2.0\n# Hz S RI\n[Number of Ports] {}\n[Number of Frequencies] {}\n[Reference] {}\n"
            "[Matrix Format] Full\n[Network Data]\n",
            ports, data.frequency_hz.size(), references(data.reference_ohm));
    } else {
        const auto& reference = data.reference_ohm;
        const bool alike = std::all_of(reference.begin(), reference.end(), [&](double r) { return r == reference[0]; });
        text += fmt::format("# Hz S RI R {}\n", alike ? fmt::format("{}", reference[0]) : references(reference));
    }
    for (std::size_t i = 0; i < data.frequency_hz.size(); ++i)
        text += fmt::format("{}", data.frequency_hz[i]) +
                (version_2 ? matrix_lines(data.scattering[i]) : short_line(data.scattering[i]));
    return version_2 ? text + "[End]\n" : text;
}

}  // namespace annulet
