// Written by scripts/prove_references.py from tests/reference/values.json: change that and run it again.
// clang-format off
#include "study/prove_references.hpp"

namespace annulet::references {

namespace {

constexpr Dipole dipoles_table[] = {
    {"tube dipole, Omega 8, 0.2 wavelengths", 0.2, 0.00366312778, {7.5667966, -362.37294}, false},
    {"tube dipole, Omega 8, 0.47 wavelengths", 0.47, 0.00860835028, {81.677837, 12.694659}, false},
    {"tube dipole, Omega 8, 0.5 wavelengths", 0.5, 0.00915781944, {103.8573, 41.621397}, false},
    {"tube dipole, Omega 8, 0.8 wavelengths", 0.8, 0.0146525111, {428.41602, -210.09734}, true},
    {"tube dipole, Omega 8, 1.25 wavelengths", 1.25, 0.0228945486, {56.700541, -113.04405}, false},
    {"tube dipole, Omega 8, 1.5 wavelengths", 1.5, 0.0274734583, {138.52969, -0.063076984}, false},
    {"tube dipole, Omega 10, 0.4 wavelengths", 0.4, 0.0026951788, {43.390629, -95.072588}, false},
    {"tube dipole, Omega 10, 0.5 wavelengths", 0.5, 0.0033689735, {94.220469, 47.766232}, false},
    {"tube dipole, Omega 10, 0.6 wavelengths", 0.6, 0.0040427682, {213.47775, 191.76731}, false},
    {"tube dipole, Omega 10, 1 wavelengths", 1.0, 0.006737947, {254.51613, -445.76738}, true},
    {"tube dipole, Omega 10, 1.5 wavelengths", 1.5, 0.0101069205, {141.38393, 32.254291}, false},
    {"tube dipole, Omega 12.5, 0.2 wavelengths", 0.2, 0.000386090827, {7.5186826, -712.62062}, false},
    {"tube dipole, Omega 12.5, 0.47 wavelengths", 0.47, 0.000907313444, {69.519883, -9.3291604}, false},
    {"tube dipole, Omega 12.5, 0.6 wavelengths", 0.6, 0.00115827248, {186.59887, 255.10725}, false},
    {"tube dipole, Omega 12.5, 0.8 wavelengths", 0.8, 0.00154436331, {1172.3646, 465.20354}, true},
    {"tube dipole, Omega 12.5, 1.25 wavelengths", 1.25, 0.00241306767, {87.779057, -313.52604}, true},
    {"tube dipole, Omega 15, 0.2 wavelengths", 0.2, 0.000110616874, {7.7131948, -923.50404}, false},
    {"tube dipole, Omega 15, 0.4 wavelengths", 0.4, 0.000221233748, {41.161566, -194.2579}, false},
    {"tube dipole, Omega 15, 0.5 wavelengths", 0.5, 0.000276542185, {82.489048, 46.981384}, false},
    {"tube dipole, Omega 15, 0.8 wavelengths", 0.8, 0.000442467496, {1115.8721, 1001.3904}, true},
    {"tube dipole, Omega 15, 1 wavelengths", 1.0, 0.00055308437, {967.3657, -1304.1909}, true},
    {"tube dipole, Omega 15, 1.5 wavelengths", 1.5, 0.000829626555, {121.22407, 51.400673}, false},
    {"tube dipole, Omega 20, 0.4 wavelengths", 0.4, 1.81599719e-05, {40.763999, -294.0316}, false},
    {"tube dipole, Omega 20, 0.47 wavelengths", 0.47, 2.1337967e-05, {64.791525, -54.910345}, false},
    {"tube dipole, Omega 20, 0.6 wavelengths", 0.6, 2.72399579e-05, {154.00274, 400.46044}, false},
    {"tube dipole, Omega 20, 1 wavelengths", 1.0, 4.53999298e-05, {2471.7373, -2650.2326}, true},
    {"tube dipole, Omega 20, 1.25 wavelengths", 1.25, 5.67499122e-05, {141.43716, -767.4471}, false},
};

constexpr DipoleResonance dipole_resonances_table[] = {
    {"dipole resonance, length over diameter 25, gap 2a", 25.0, 0.0, 0.456405517, 73.9548178},
    {"dipole resonance, length over diameter 50, gap 2a", 50.0, 0.0, 0.462928421, 72.8062636},
    {"dipole resonance, length over diameter 50, gap L/41", 50.0, 1.0 / 41, 0.462676174, 72.6726188},
    {"dipole resonance, length over diameter 100, gap L/41", 100.0, 1.0 / 41, 0.468254151, 72.065791},
    {"dipole resonance, length over diameter 200, gap L/41", 200.0, 1.0 / 41, 0.47302152, 71.9079493},
    {"dipole resonance, length over diameter 500, gap 2a", 500.0, 0.0, 0.478089071, 71.9985463},
    {"dipole resonance, length over diameter 1000, gap 2a", 1000.0, 0.0, 0.48074185, 72.00403},
    {"dipole resonance, length over diameter 5000, gap 2a", 5000.0, 0.0, 0.485009589, 72.0902228},
    {"dipole resonance, length over diameter 5000, gap L/41", 5000.0, 1.0 / 41, 0.484917707, 72.0805165},
};

constexpr Loop loops_table[] = {
    {"wire loop, Omega 10, kb 0.05", 10.0, 0.05, 0.00795774715, 0.00033689735, {0.0012717164, 61.81719}, false},
    {"wire loop, Omega 10, kb 0.15", 10.0, 0.15, 0.0238732415, 0.00101069205, {0.13368935, 204.18263}, false},
    {"wire loop, Omega 10, kb 0.2", 10.0, 0.2, 0.0318309886, 0.0013475894, {0.54192602, 299.15608}, false},
    {"wire loop, Omega 10, kb 0.5", 10.0, 0.5, 0.0795774715, 0.0033689735, {368.09748, -2111.9535}, true},
    {"wire loop, Omega 10, kb 0.9", 10.0, 0.9, 0.143239449, 0.0060641523, {81.387113, -171.82545}, false},
    {"wire loop, Omega 10, kb 1", 10.0, 1.0, 0.159154943, 0.006737947, {102.57976, -95.480972}, false},
    {"wire loop, Omega 10, kb 1.1", 10.0, 1.1, 0.175070437, 0.0074117417, {138.75797, -30.548121}, false},
    {"wire loop, Omega 10, kb 1.3", 10.0, 1.3, 0.206901426, 0.0087593311, {306.02521, 46.258394}, true},
    {"wire loop, Omega 10, kb 1.5", 10.0, 1.5, 0.238732415, 0.0101069205, {438.009, -230.57653}, true},
    {"wire loop, Omega 10, kb 2", 10.0, 2.0, 0.318309886, 0.013475894, {120.25357, -107.80775}, true},
    {"wire loop, Omega 10, kb 2.3", 10.0, 2.3, 0.366056369, 0.0154972781, {226.55122, -52.166561}, true},
    {"wire loop, Omega 10, kb 2.5", 10.0, 2.5, 0.397887358, 0.0168448675, {261.32271, -154.17993}, true},
    {"wire loop, Omega 11, kb 0.1", 11.0, 0.1, 0.0159154943, 0.000408677144, {0.022343281, 147.50682}, false},
    {"wire loop, Omega 11, kb 0.2", 11.0, 0.2, 0.0318309886, 0.000817354288, {0.53776979, 343.42117}, false},
    {"wire loop, Omega 11, kb 0.3", 11.0, 0.3, 0.0477464829, 0.00122603143, {6.3508088, 720.2941}, false},
    {"wire loop, Omega 11, kb 0.8", 11.0, 0.8, 0.127323954, 0.00326941715, {73.354018, -311.26156}, false},
    {"wire loop, Omega 11, kb 1", 11.0, 1.0, 0.159154943, 0.00408677144, {107.41384, -95.582521}, false},
    {"wire loop, Omega 11, kb 1.05", 11.0, 1.05, 0.16711269, 0.00429111001, {124.88945, -51.938079}, false},
    {"wire loop, Omega 11, kb 1.2", 11.0, 1.2, 0.190985932, 0.00490412573, {224.19306, 72.035602}, false},
    {"wire loop, Omega 11, kb 1.5", 11.0, 1.5, 0.238732415, 0.00613015716, {606.17951, -325.256}, true},
    {"wire loop, Omega 11, kb 1.7", 11.0, 1.7, 0.270563403, 0.00694751145, {189.59842, -341.73079}, true},
    {"wire loop, Omega 11, kb 2.1", 11.0, 2.1, 0.33422538, 0.00858222002, {158.08672, -57.796496}, false},
    {"wire loop, Omega 11, kb 2.5", 11.0, 2.5, 0.397887358, 0.0102169286, {367.51882, -207.52263}, true},
    {"wire loop, Omega 12, kb 0.05", 12.0, 0.05, 0.00795774715, 0.000123937609, {0.001270671, 80.770903}, false},
    {"wire loop, Omega 12, kb 0.15", 12.0, 0.15, 0.0238732415, 0.000371812826, {0.13255791, 265.53106}, false},
    {"wire loop, Omega 12, kb 0.3", 12.0, 0.3, 0.0477464829, 0.000743625653, {6.1575007, 802.78599}, false},
    {"wire loop, Omega 12, kb 0.5", 12.0, 0.5, 0.0795774715, 0.00123937609, {544.46531, -3342.702}, true},
    {"wire loop, Omega 12, kb 0.9", 12.0, 0.9, 0.143239449, 0.00223087696, {87.769449, -210.81749}, false},
    {"wire loop, Omega 12, kb 1.05", 12.0, 1.05, 0.16711269, 0.00260268979, {130.08366, -41.2839}, false},
    {"wire loop, Omega 12, kb 1.1", 12.0, 1.1, 0.175070437, 0.00272662739, {155.41702, 12.780865}, false},
    {"wire loop, Omega 12, kb 1.3", 12.0, 1.3, 0.206901426, 0.00322237783, {427.91273, 224.49824}, false},
    {"wire loop, Omega 12, kb 1.7", 12.0, 1.7, 0.270563403, 0.0042138787, {205.80295, -417.68724}, false},
    {"wire loop, Omega 12, kb 2", 12.0, 2.0, 0.318309886, 0.00495750435, {136.12916, -114.02704}, false},
    {"wire loop, Omega 12, kb 2.3", 12.0, 2.3, 0.366056369, 0.00570113001, {369.65521, 46.397466}, false},
    {"wire loop, Omega 15, kb 0.05", 15.0, 0.05, 0.00795774715, 2.76542185e-05, {0.001269014, 109.23834}, false},
    {"wire loop, Omega 15, kb 0.1", 15.0, 0.1, 0.0159154943, 5.5308437e-05, {0.022179172, 225.30376}, false},
    {"wire loop, Omega 15, kb 0.2", 15.0, 0.2, 0.0318309886, 0.000110616874, {0.51913654, 516.50895}, false},
    {"wire loop, Omega 15, kb 0.5", 15.0, 0.5, 0.0795774715, 0.000276542185, {1134.4906, -6482.6161}, false},
    {"wire loop, Omega 15, kb 0.8", 15.0, 0.8, 0.127323954, 0.000442467496, {85.542956, -488.80967}, false},
    {"wire loop, Omega 15, kb 1", 15.0, 1.0, 0.159154943, 0.00055308437, {119.7205, -94.386381}, false},
    {"wire loop, Omega 15, kb 1.1", 15.0, 1.1, 0.175070437, 0.000608392807, {166.34331, 79.927844}, false},
    {"wire loop, Omega 15, kb 1.2", 15.0, 1.2, 0.190985932, 0.000663701244, {263.37784, 282.22332}, false},
    {"wire loop, Omega 15, kb 1.5", 15.0, 1.5, 0.238732415, 0.000829626555, {1752.0152, -808.5196}, false},
    {"wire loop, Omega 15, kb 2", 15.0, 2.0, 0.318309886, 0.00110616874, {153.20929, -116.25281}, false},
    {"wire loop, Omega 15, kb 2.1", 15.0, 2.1, 0.33422538, 0.00116147718, {198.62196, 26.256565}, false},
    {"wire loop, Omega 15, kb 2.5", 15.0, 2.5, 0.397887358, 0.00138271093, {1135.1362, -497.1113}, false},
};

constexpr LoopResonance loop_resonances_table[] = {
    {"wire loop resonance, Omega 10", 23.6206879, 1.15299566, 167.383816},
    {"wire loop resonance, Omega 12", 64.2076867, 1.08824236, 148.70973},
    {"wire loop resonance, Omega 15", 287.758888, 1.05501249, 141.506148},
    {"wire loop resonance, Omega 20", 3505.62091, 1.03435247, 137.873281},
};

constexpr Mutual mutuals_table[] = {
    {"half-wave dipoles side by side, x 0.1, z 0 wavelengths", 0.1, 0.0, {67.287033, 7.5325775}, 67.70734475473539},
    {"half-wave dipoles side by side, x 0.2, z 0 wavelengths", 0.2, 0.0, {51.361101, -19.158559}, 67.70734475473539},
    {"half-wave dipoles side by side, x 0.25, z 0 wavelengths", 0.25, 0.0, {40.757504, -28.32944}, 67.70734475473539},
    {"half-wave dipoles side by side, x 0.35, z 0 wavelengths", 0.35, 0.0, {17.491741, -37.390802}, 67.70734475473539},
    {"half-wave dipoles side by side, x 0.45, z 0 wavelengths", 0.45, 0.0, {-3.9703975, -34.760481}, 67.70734475473539},
    {"half-wave dipoles side by side, x 0.5, z 0 wavelengths", 0.5, 0.0, {-12.523407, -29.907936}, 67.70734475473539},
    {"half-wave dipoles side by side, x 0.6, z 0 wavelengths", 0.6, 0.0, {-23.296617, -15.861936}, 67.70734475473539},
    {"half-wave dipoles side by side, x 0.7, z 0 wavelengths", 0.7, 0.0, {-24.845357, -0.25466867}, 67.70734475473539},
    {"half-wave dipoles side by side, x 0.75, z 0 wavelengths", 0.75, 0.0, {-22.481244, 6.6276438}, 67.70734475473539},
    {"half-wave dipoles side by side, x 0.85, z 0 wavelengths", 0.85, 0.0, {-13.306844, 16.278684}, 67.70734475473539},
    {"half-wave dipoles side by side, x 0.95, z 0 wavelengths", 0.95, 0.0, {-1.5449381, 18.978506}, 67.70734475473539},
    {"half-wave dipoles side by side, x 1, z 0 wavelengths", 1.0, 0.0, {4.0088557, 17.729755}, 67.70734475473539},
    {"half-wave dipoles collinear, x 0, z 0.52 wavelengths", 0.0, 0.52, {23.894276, 9.9423366}, 25.880233434648066},
    {"half-wave dipoles collinear, x 0, z 0.6 wavelengths", 0.0, 0.6, {14.664104, -4.0115605}, 25.880233434648066},
    {"half-wave dipoles collinear, x 0, z 0.65 wavelengths", 0.0, 0.65, {9.702635, -7.0699684}, 25.880233434648066},
    {"half-wave dipoles collinear, x 0, z 0.75 wavelengths", 0.0, 0.75, {2.0442593, -7.9654549}, 25.880233434648066},
    {"half-wave dipoles collinear, x 0, z 0.9 wavelengths", 0.0, 0.9, {-3.6002121, -3.9023952}, 25.880233434648066},
    {"half-wave dipoles collinear, x 0, z 1 wavelengths", 0.0, 1.0, {-4.1159306, -0.72155418}, 25.880233434648066},
    {"half-wave dipoles collinear, x 0, z 1.5 wavelengths", 0.0, 1.5, {1.7333484, 0.19149861}, 25.880233434648066},
    {"half-wave dipoles in echelon, x 0.25, z 0.25 wavelengths", 0.25, 0.25, {30.876996, -18.390074}, 35.93861020837467},
    {"half-wave dipoles in echelon, x 0.3, z 0.6 wavelengths", 0.3, 0.6, {0.031594196, -11.082013}, 35.93861020837467},
    {"half-wave dipoles in echelon, x 0.5, z 0.25 wavelengths", 0.5, 0.25, {-12.887699, -22.128996}, 35.93861020837467},
};

constexpr Monopole monopoles_table[] = {
    {"monopole, 0.125 wavelengths", 0.125, 0.007022, 1.189, {5.6586987, -99.577987}},
    {"monopole, 0.25 wavelengths", 0.25, 0.007022, 1.189, {52.204654, 20.409749}},
    {"monopole, 0.3 wavelengths", 0.3, 0.007022, 1.189, {126.17534, 69.449254}},
    {"monopole, 0.5 wavelengths", 0.5, 0.007022, 1.189, {90.216734, -193.96202}},
};

constexpr Inductance inductances_table[] = {
    {"ring of round wire, b/a 1000", 1.0, 0.0, 0.001, 6.98719682},
    {"ring of round wire, b/a 10000", 1.0, 0.0, 0.0001, 9.28978191},
    {"square of round wire, side/a 1000", 1.0, 1.0, 0.001, 3.90486171},
    {"square of round wire, side/a 200", 1.0, 1.0, 0.005, 2.88026172},
    {"rectangle of round wire, 1 by 0.5, a 0.001", 1.0, 0.5, 0.001, 2.739568},
    {"rectangle of round wire, 2 by 1, a 0.005", 2.0, 1.0, 0.005, 4.6041428},
};

constexpr StepUp step_ups_table[] = {
    {"folded dipole, radii 1 and 1, spacing 10", 1.0, 1.0, 10.0, 4.0},
    {"folded dipole, radii 1 and 3, spacing 10", 1.0, 3.0, 10.0, 8.12388016},
    {"folded dipole, radii 2 and 1, spacing 10", 2.0, 1.0, 10.0, 2.91415967},
    {"folded dipole, radii 3 and 1, spacing 10", 3.0, 1.0, 10.0, 2.37304722},
    {"folded dipole, radii 1 and 5, spacing 12", 1.0, 5.0, 12.0, 13.279112},
};

constexpr Folded folded_dipoles_table[] = {
    {"folded dipole, 0.5 wavelengths", 0.5, 0.01, 0.0005, {385.96204, 200.47921}},
    {"folded dipole, 0.47 wavelengths", 0.47, 0.02, 0.001, {322.34427, 48.4715}},
    {"folded dipole, 0.45 wavelengths", 0.45, 0.02, 0.001, {272.30924, -42.122271}},
};

constexpr Capacitance capacitances_table[] = {
    {"square plate", -1.0, 0.366788},
    {"annulus, radii 0.2 and 1", 0.2, 0.635920224},
    {"annulus, radii 0.5 and 1", 0.5, 0.62453539},
    {"annulus, radii 0.6 and 1", 0.6, 0.614383999},
    {"annulus, radii 0.8 and 1", 0.8, 0.571440289},
    {"annulus, radii 0.95 and 1", 0.95, 0.476079894},
};

constexpr FlatRing flat_rings_table[] = {
    {"flat ring, width 0.02 of its radius", 0.02, 5.3771371},
    {"flat ring, width 0.1 of its radius", 0.1, 3.75912836},
    {"flat ring, width 0.15 of its radius", 0.15, 3.34518868},
    {"flat ring, width 0.3 of its radius", 0.3, 2.61741976},
    {"flat ring, width 0.6 of its radius", 0.6, 1.82917035},
};

}  // namespace

std::span<const Dipole> dipoles() {
    return dipoles_table;
}
std::span<const DipoleResonance> dipole_resonances() {
    return dipole_resonances_table;
}
std::span<const Loop> loops() {
    return loops_table;
}
std::span<const LoopResonance> loop_resonances() {
    return loop_resonances_table;
}
std::span<const Mutual> mutuals() {
    return mutuals_table;
}
std::span<const Monopole> monopoles() {
    return monopoles_table;
}
std::span<const Inductance> inductances() {
    return inductances_table;
}
std::span<const StepUp> step_ups() {
    return step_ups_table;
}
std::span<const Folded> folded_dipoles() {
    return folded_dipoles_table;
}
std::span<const Capacitance> capacitances() {
    return capacitances_table;
}
std::span<const FlatRing> flat_rings() {
    return flat_rings_table;
}

}  // namespace annulet::references
