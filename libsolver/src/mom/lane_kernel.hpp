// The inner loop of the fill: one test cell against many source cells, vectorised over the source cells.
#pragma once

#include "mom/local_table.hpp"

#include <array>
#include <vector>

namespace annulet {

inline constexpr int lane_chunk = 64;  ///< source cells handled at a time

inline constexpr int most_slots = 5;  ///< local functions of one element

/// One element copied out of a table.
struct TestCell {
    int points = 0;
    int slots = 0;
    bool carries_charge = true;
    std::array<std::array<bool, 3>, 5> active{};
    double radius2 = 0;
    std::array<std::array<double, 3>, 9> position{};
    std::array<std::array<std::array<double, 3>, 9>, 5> field{};
    std::array<double, 9> charge{};
};

TestCell test_cell(const LocalTable& table, int lane);

/// Local matrices of the test cell with up to `lane_chunk` source cells.
struct LaneResult {
    alignas(64) double vector_re[most_slots * most_slots][lane_chunk];  ///< [test slot * most_slots + source slot], m
    alignas(64) double vector_im[most_slots * most_slots][lane_chunk];
    alignas(64) double scalar_re[lane_chunk];  ///< 1/m
    alignas(64) double scalar_im[lane_chunk];
};

enum class KernelPart {
    whole,      ///< exp(-jkR) / (4 pi R)
    remainder,  ///< (exp(-jkR) - 1) / (4 pi R), finite at R = 0
};

/// Product rule of both tables over lanes first ... first + count - 1 of `source`, count <= lane_chunk;
/// k in 1/m. The sign of an image is included.
void interact(const TestCell& test, const LocalTable& source, int first, int count, double k, KernelPart part,
              LaneResult& result);

/// exp(-jkR) / (4 pi R) for `count` distances: the loop that bounds the speed of the fill (benchmark).
void kernel_only(const double* squared_distance, int count, double k, double* re, double* im);

}  // namespace annulet
