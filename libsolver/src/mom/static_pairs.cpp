#include "mom/static_pairs.hpp"

#include "mom/outer_rule.hpp"

namespace annulet {

namespace {

/// The vertical flux that a layer has on top of its edges: along z, the thickness times a unit charge density;
/// mirrored it points down.
void add_vertical_flux(const Element& test, const Element& source, bool image, PairMoments& m) {
    const auto a = static_cast<std::size_t>(test.corners()), b = static_cast<std::size_t>(source.corners());
    m.vector[a][b] = (image ? -1 : 1) * test.thickness_m * source.thickness_m * m.scalar;
}

/// What the role of a flat element leaves of its moments with a wire, those of a unit charge moving along z among them.
void fit_role(const Element& flat, double upward, PairMoments& m) {
    const auto n = static_cast<std::size_t>(flat.corners());
    if (flat.role == ElementRole::panel) m.vector = {};
    for (auto& row : m.vector) row[n] *= flat.role == ElementRole::layer ? upward * flat.thickness_m : 0;
}

}  // namespace

StaticPairs::StaticPairs(const std::vector<Element>& elements, std::optional<double> ground_plane_m)
    : elements_(elements) {
    for (const Element& element : elements) {
        const bool planar = element.kind != CellKind::segment;
        planar_.push_back(planar ? planar_element(element) : PlanarElement{});
        wire_.push_back(planar ? WireElement{} : wire_element(element));
        if (!ground_plane_m) continue;
        planar_image_.push_back(planar ? planar_.back().mirrored(*ground_plane_m) : PlanarElement{});
        wire_image_.push_back(wire_.back().mirrored(*ground_plane_m));
    }
}

PairMoments StaticPairs::wire_moments(std::size_t test, std::size_t source, bool image) const {
    const WireElement& source_wire = (image ? wire_image_ : wire_)[source];
    if (is_wire(test) && is_wire(source)) return static_wire_pair(wire_[test], source_wire);
    if (is_wire(source)) {
        PairMoments m = static_wire_and_surface(source_wire, planar_[test]);
        fit_role(elements_[test], 1, m);
        return transposed(m);
    }
    PairMoments m = static_wire_and_surface(wire_[test], (image ? planar_image_ : planar_)[source]);
    fit_role(elements_[source], image ? -1 : 1, m);
    return m;
}

PairMoments StaticPairs::moments(int test, int source, bool image) const {
    const auto i = static_cast<std::size_t>(test), j = static_cast<std::size_t>(source);
    if (is_wire(i) || is_wire(j)) return wire_moments(i, j, image);
    const PlanarElement& t = planar_[i];
    const PlanarElement& s = (image ? planar_image_ : planar_)[j];
    const bool panel = elements_[i].role == ElementRole::panel || elements_[j].role == ElementRole::panel;
    const bool close = distance(t, s) < 0.5 * t.diameter();
    PairMoments m;
    if (panel) {
        m.scalar = static_scalar(t, s, close);
        return m;
    }
    m = static_pair(t, s, close);
    if (elements_[i].role == ElementRole::layer && elements_[j].role == ElementRole::layer)
        add_vertical_flux(elements_[i], elements_[j], image, m);
    return m;
}

}  // namespace annulet
