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

PairMoments StaticPairs::moments(int test, int source, bool image) const {
    const auto i = static_cast<std::size_t>(test), j = static_cast<std::size_t>(source);
    const PlanarElement& t = planar_[i];
    const PlanarElement& s = (image ? planar_image_ : planar_)[j];
    const WireElement& source_wire = (image ? wire_image_ : wire_)[j];
    if (is_wire(i) && is_wire(j)) return static_wire_pair(wire_[i], source_wire);
    const bool panel = elements_[i].role == ElementRole::panel || elements_[j].role == ElementRole::panel;
    if (is_wire(i) || is_wire(j)) {
        PairMoments m = is_wire(i) ? static_wire_and_surface(wire_[i], s)
                                   : transposed(static_wire_and_surface(source_wire, t));
        if (panel) m.vector = {};
        return m;
    }
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
