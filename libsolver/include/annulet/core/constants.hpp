// Physical constants [CODATA2018]: Tiesinga, Mohr, Newell, Taylor, "CODATA recommended values
// of the fundamental physical constants: 2018", Rev. Mod. Phys. 93 (2021).
#pragma once

namespace annulet::constants {

inline constexpr double pi = 3.14159265358979323846;
inline constexpr double c0_m_per_s = 299792458.0;             // exact by definition of the metre
inline constexpr double mu0_h_per_m = 1.25663706212e-6;       // [CODATA2018]
inline constexpr double eps0_f_per_m = 8.8541878128e-12;      // [CODATA2018]
inline constexpr double eta0_ohm = mu0_h_per_m * c0_m_per_s;  // 376.730313668
inline constexpr double copper_s_per_m = 5.8e7;               // annealed copper, IACS 1914

}  // namespace annulet::constants
