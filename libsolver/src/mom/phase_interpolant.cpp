#include "mom/phase_interpolant.hpp"

#include <algorithm>
#include <cmath>
#include <utility>

namespace annulet {

using Complex = std::complex<double>;

namespace {

constexpr Complex j{0, 1};

double distance(const Eigen::Matrix3Xd& centre, Eigen::Index m, Eigen::Index n) {
    return (centre.col(m) - centre.col(n)).norm();
}

Eigen::VectorXd as_vector(const std::vector<double>& values) {
    return Eigen::Map<const Eigen::VectorXd>(values.data(), static_cast<Eigen::Index>(values.size()));
}

}  // namespace

Eigen::VectorXcd lagrange(const Eigen::VectorXd& node, Complex z) {
    const Eigen::Index n = node.size();
    Eigen::VectorXcd value(n);
    Complex before = 1;  // product of z - node over the nodes before q, then over those after
    for (Eigen::Index q = 0; q < n; before *= z - node[q], ++q) value[q] = before;
    Complex after = 1;
    for (Eigen::Index q = n - 1; q >= 0; after *= z - node[q], --q) {
        double scale = 1;
        for (Eigen::Index i = 0; i < n; ++i)
            if (i != q) scale *= node[q] - node[i];
        value[q] *= after / scale;
    }
    return value;
}

Eigen::VectorXcd lagrange_derivative(const Eigen::VectorXd& node, Complex z) {
    Eigen::VectorXcd sum = Eigen::VectorXcd::Zero(node.size());
    for (Eigen::Index q = 0; q < node.size(); ++q)
        for (Eigen::Index left_out = 0; left_out < node.size(); ++left_out) {
            if (left_out == q) continue;
            Complex product = 1 / (node[q] - node[left_out]);
            for (Eigen::Index i = 0; i < node.size(); ++i)
                if (i != q && i != left_out) product *= (z - node[i]) / (node[q] - node[i]);
            sum[q] += product;
        }
    return sum;
}

std::vector<double> leja_points(int count) {
    constexpr int candidates = 2000;
    std::vector<double> points;
    std::vector<double> product(candidates + 1, 0.0);  // log of the product of distances
    for (int n = 0; n < count; ++n) {
        const auto best = n == 0 ? candidates : std::max_element(product.begin(), product.end()) - product.begin();
        const double chosen = static_cast<double>(best) / candidates;
        points.push_back(chosen);
        for (int c = 0; c <= candidates; ++c)
            product[static_cast<std::size_t>(c)] += std::log(std::abs(static_cast<double>(c) / candidates - chosen));
    }
    return points;
}

void PhaseInterpolant::add(double k_per_m, const Eigen::MatrixXcd& matrix) {
    const Eigen::Index n = centre_.cols();
    Eigen::VectorXcd packed(packed_size(n));
#pragma omp parallel for schedule(dynamic, 16)
    for (Eigen::Index c = 0; c < n; ++c) {
        Complex* column = packed.data() + packed_column(n, c);
        for (Eigen::Index r = c; r < n; ++r)
            column[r - c] = matrix(r, c) * std::polar(1.0, k_per_m * distance(centre_, r, c));
    }
    node_.push_back(k_per_m);
    value_.push_back(std::move(packed));
}

double PhaseInterpolant::relative_difference(double k_per_m, const Eigen::MatrixXcd& matrix) const {
    const Eigen::VectorXcd packed = value(k_per_m);
    const Eigen::Index n = centre_.cols();
    double difference = 0, size = 0;
    for (Eigen::Index c = 0; c < n; ++c)
        for (Eigen::Index r = c; r < n; ++r) {
            const double weight = r == c ? 1 : 2;
            difference += weight * std::norm(matrix(r, c) - packed[packed_column(n, c) + r - c]);
            size += weight * std::norm(matrix(r, c));
        }
    return std::sqrt(difference / size);
}

// Sum over the nodes of factor times value, times exp(-jkR); with `slope` the derivative of that product.
Eigen::VectorXcd PhaseInterpolant::sum(Complex k, const Eigen::VectorXcd& factor, const Eigen::VectorXcd* slope) const {
    const Eigen::Index n = centre_.cols(), count = static_cast<Eigen::Index>(value_.size());
    Eigen::VectorXcd packed(packed_size(n));
#pragma omp parallel for schedule(dynamic, 16)
    for (Eigen::Index c = 0; c < n; ++c) {
        const Eigen::Index first = packed_column(n, c), length = n - c;
        auto column = packed.segment(first, length);
        Eigen::ArrayXd away(length);
        for (Eigen::Index r = c; r < n; ++r) away[r - c] = distance(centre_, r, c);
        Eigen::ArrayXcd total = Eigen::ArrayXcd::Zero(length);
        const auto add_values = [&](const Eigen::VectorXcd& weight) {
            for (Eigen::Index q = 0; q < count; ++q) {
                const auto known = value_[static_cast<std::size_t>(q)].segment(first, length).array();
                if (weight[q].imag() == 0)
                    total += weight[q].real() * known;
                else
                    total += weight[q] * known;
            }
        };
        add_values(factor);
        if (slope != nullptr) {
            total *= -j * away;
            add_values(*slope);
        }
        for (Eigen::Index r = 0; r < length; ++r)
            column[r] = total[r] * std::polar(std::exp(k.imag() * away[r]), -k.real() * away[r]);
    }
    return packed;
}

Eigen::VectorXcd PhaseInterpolant::value(Complex k_per_m) const {
    return sum(k_per_m, lagrange(as_vector(node_), k_per_m), nullptr);
}

Eigen::VectorXcd PhaseInterpolant::derivative(Complex k_per_m) const {
    const Eigen::VectorXd node = as_vector(node_);
    const Eigen::VectorXcd slope = lagrange_derivative(node, k_per_m);
    return sum(k_per_m, lagrange(node, k_per_m), &slope);
}

std::size_t PhaseInterpolant::bytes() const {
    std::size_t total = 0;
    for (const auto& packed : value_) total += static_cast<std::size_t>(packed.size()) * sizeof(Complex);
    return total;
}

}  // namespace annulet
