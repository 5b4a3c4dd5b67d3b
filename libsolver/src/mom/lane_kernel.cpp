// This file alone is compiled with -ffast-math: the loops below contain no NaN, infinity or signed zero that
// matters, and sine and cosine vectorise only so. Both are taken as sine: the compiler would fuse a sine and a
// cosine of one argument into a scalar call.
#include "mom/lane_kernel.hpp"

#include <annulet/core/constants.hpp>

#include <cmath>
#include <cstring>

#if defined(__GNUC__) && !defined(__clang__) && defined(__x86_64__) && !defined(__SANITIZE_ADDRESS__)
#define ANNULET_CLONES __attribute__((target_clones("arch=x86-64-v4", "arch=x86-64-v3", "default")))
#else
#define ANNULET_CLONES
#endif

namespace annulet {

namespace {

constexpr double inverse_4pi = 1 / (4 * constants::pi);
constexpr double half_pi = constants::pi / 2;

struct Buffers {
    alignas(64) double re[9][lane_chunk];
    alignas(64) double im[9][lane_chunk];
};

ANNULET_CLONES void green_whole(const double* __restrict x, const double* __restrict y, const double* __restrict z,
                                const double* __restrict radius2, const double* at, double test_radius2, double k,
                                int count, double* __restrict re, double* __restrict im) {
    for (int e = 0; e < count; ++e) {
        const double dx = x[e] - at[0], dy = y[e] - at[1], dz = z[e] - at[2];
        // Coincident points occur only for near pairs, whose result here is discarded.
        const double r = std::sqrt(dx * dx + dy * dy + dz * dz + radius2[e] + test_radius2 + 1e-60);
        const double g = inverse_4pi / r, phase = k * r;
        re[e] = g * std::sin(half_pi - phase);
        im[e] = -g * std::sin(phase);
    }
}

ANNULET_CLONES void green_remainder(const double* __restrict x, const double* __restrict y, const double* __restrict z,
                                    const double* __restrict radius2, const double* at, double test_radius2, double k,
                                    int count, double* __restrict re, double* __restrict im) {
    for (int e = 0; e < count; ++e) {
        const double dx = x[e] - at[0], dy = y[e] - at[1], dz = z[e] - at[2];
        const double r = std::sqrt(dx * dx + dy * dy + dz * dz + radius2[e] + test_radius2 + 1e-60);
        // (exp(-jkR) - 1)/R = -(2 sin^2(kR/2) + j sin(kR))/R, free of cancellation and finite at R -> 0.
        const double g = inverse_4pi / r, half = std::sin(0.5 * k * r);
        re[e] = -2 * g * half * half;
        im[e] = -g * std::sin(k * r);
    }
}

/// acc += f * green over the lanes, complex.
ANNULET_CLONES void contract_source(const double* __restrict f, std::size_t stride, int points, const Buffers& g,
                                    int count, double* __restrict re, double* __restrict im) {
    for (int e = 0; e < count; ++e) re[e] = im[e] = 0;
    for (int j = 0; j < points; ++j) {
        const double* fj = f + static_cast<std::size_t>(j) * stride;
        for (int e = 0; e < count; ++e) {
            re[e] += fj[e] * g.re[j][e];
            im[e] += fj[e] * g.im[j][e];
        }
    }
}

/// One pass over four source points at once keeps the accumulators in registers.
ANNULET_CLONES void contract_source4(const double* __restrict f, std::size_t stride, const Buffers& g, int count,
                                     double* __restrict re, double* __restrict im) {
    const double *f0 = f, *f1 = f + stride, *f2 = f + 2 * stride, *f3 = f + 3 * stride;
    for (int e = 0; e < count; ++e) {
        re[e] = f0[e] * g.re[0][e] + f1[e] * g.re[1][e] + f2[e] * g.re[2][e] + f3[e] * g.re[3][e];
        im[e] = f0[e] * g.im[0][e] + f1[e] * g.im[1][e] + f2[e] * g.im[2][e] + f3[e] * g.im[3][e];
    }
}

ANNULET_CLONES void add_scaled(double scale, const double* __restrict re, const double* __restrict im, int count,
                               double* __restrict out_re, double* __restrict out_im) {
    for (int e = 0; e < count; ++e) {
        out_re[e] += scale * re[e];
        out_im[e] += scale * im[e];
    }
}

/// out[a][b] += sum over axes of the test field at one point times the contracted source fields (two axes).
ANNULET_CLONES void add_level(double fx, double fy, const double* __restrict xr, const double* __restrict xi,
                              const double* __restrict yr, const double* __restrict yi, int count,
                              double* __restrict out_re, double* __restrict out_im) {
    for (int e = 0; e < count; ++e) {
        out_re[e] += fx * xr[e] + fy * yr[e];
        out_im[e] += fx * xi[e] + fy * yi[e];
    }
}

struct Contracted {
    alignas(64) double re[3][lane_chunk];
    alignas(64) double im[3][lane_chunk];
};

void add_slot(const TestCell& test, int point, int b, const std::array<bool, 3>& active, const Contracted& h, int count,
              LaneResult& out) {
    for (int a = 0; a < test.slots; ++a) {
        const auto slot = static_cast<std::size_t>(a);
        const auto& f = test.field[slot][static_cast<std::size_t>(point)];
        const auto& on = test.active[slot];
        double* re = out.vector_re[a * most_slots + b];
        double* im = out.vector_im[a * most_slots + b];
        const bool plane = active[0] && active[1] && (on[0] || on[1]);
        if (plane) add_level(f[0], f[1], h.re[0], h.im[0], h.re[1], h.im[1], count, re, im);
        for (std::size_t axis = plane ? 2 : 0; axis < 3; ++axis)
            if (active[axis] && on[axis]) add_scaled(f[axis], h.re[axis], h.im[axis], count, re, im);
    }
}

void contract(const double* __restrict f, std::size_t stride, int points, const Buffers& g, int count,
              double* __restrict re, double* __restrict im) {
    if (points == 4)
        contract_source4(f, stride, g, count, re, im);
    else
        contract_source(f, stride, points, g, count, re, im);
}

}  // namespace

TestCell test_cell(const LocalTable& table, int lane) {
    TestCell t;
    t.points = table.points;
    t.slots = table.slots;
    t.carries_charge = table.carries_charge();
    t.active = table.active;
    t.radius2 = table.radius2[static_cast<std::size_t>(lane)];
    for (int j = 0; j < table.points; ++j) {
        const auto p = static_cast<std::size_t>(j);
        t.charge[p] = table.charge_at(j, lane);
        for (int axis = 0; axis < 3; ++axis) {
            const auto c = static_cast<std::size_t>(axis);
            t.position[p][c] = table.position_at(j, axis, lane);
            for (int slot = 0; slot < table.slots; ++slot)
                t.field[static_cast<std::size_t>(slot)][p][c] = table.field_at(slot, j, axis, lane);
        }
    }
    return t;
}

void interact(const TestCell& test, const LocalTable& source, int first, int count, double k, KernelPart part,
              LaneResult& result) {
    std::memset(&result, 0, sizeof result);
    Buffers g;
    Contracted h;
    alignas(64) double charge_re[lane_chunk], charge_im[lane_chunk];
    const auto green = part == KernelPart::whole ? green_whole : green_remainder;
    const bool charges = test.carries_charge && source.carries_charge();
    const auto stride = static_cast<std::size_t>(source.lanes);
    for (int i = 0; i < test.points; ++i) {
        const auto p = static_cast<std::size_t>(i);
        for (int j = 0; j < source.points; ++j)
            green(&source.position[source.index(3 * j, first)], &source.position[source.index(3 * j + 1, first)],
                  &source.position[source.index(3 * j + 2, first)], &source.radius2[static_cast<std::size_t>(first)],
                  test.position[p].data(), test.radius2, k, count, g.re[j], g.im[j]);
        if (charges) {
            contract(&source.charge[source.index(0, first)], stride, source.points, g, count, charge_re, charge_im);
            add_scaled(source.sign * test.charge[p], charge_re, charge_im, count, result.scalar_re, result.scalar_im);
        }
        if (test.slots == 0) continue;
        for (int b = 0; b < source.slots; ++b) {
            const auto& active = source.active[static_cast<std::size_t>(b)];
            for (int axis = 0; axis < 3; ++axis)
                if (active[static_cast<std::size_t>(axis)])
                    contract(&source.field[source.index(b * source.points * 3 + axis, first)], 3 * stride,
                             source.points, g, count, h.re[axis], h.im[axis]);
            add_slot(test, i, b, active, h, count, result);
        }
    }
    if (source.sign < 0)
        for (auto* block : {&result.vector_re, &result.vector_im})
            for (auto& row : *block)
                for (double& x : row) x = -x;
}

void kernel_only(const double* squared_distance, int count, double k, double* re, double* im) {
    static constexpr double origin[3] = {0, 0, 0};
    alignas(64) static constexpr double zero[lane_chunk] = {};
    for (int first = 0; first < count; first += lane_chunk) {
        const int n = count - first < lane_chunk ? count - first : lane_chunk;
        green_whole(zero, zero, zero, squared_distance + first, origin, 0, k, n, re + first, im + first);
    }
}

}  // namespace annulet
