// Touchstone files [Touchstone2009]: scattering parameters of any number of ports as text.
#pragma once

#include <Eigen/Core>

#include <string>
#include <vector>

namespace annulet {

struct TouchstoneData {
    std::vector<double> frequency_hz;          ///< ascending
    std::vector<Eigen::MatrixXcd> scattering;  ///< ports x ports, one per frequency
    std::vector<double> reference_ohm;         ///< one per port
    std::vector<std::string> comments;         ///< without the leading '!'
};

/// Version 1.1 for one and two ports, 2.0 for more; hertz, S, real and imaginary parts, references port by port
/// (on the option line where two ports differ, as version 2.1 of the format describes version 1.1).
/// Comments are reduced to printable ASCII.
std::string touchstone_text(const TouchstoneData& data);

/// Reads versions 1.0, 1.1 and 2.0: S parameters in any unit and number format, full and triangular matrices.
/// `ports` as told by the file's extension, needed for version 1 only. Throws InputError with line and column;
/// noise data are passed over.
TouchstoneData read_touchstone(const std::string& text, int ports);

/// ".s1p", ".s2p", ...
std::string touchstone_extension(std::size_t ports);

}  // namespace annulet
