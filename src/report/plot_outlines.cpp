#include "report/plot_outlines.h"

#include <algorithm>
#include <cmath>

namespace sunfall {
namespace {

using Ring = std::vector<Point>;

double signed_area(const Ring& ring) {
  double twice = 0.0;
  for (std::size_t i = 0; i < ring.size(); ++i) {
    const Point& a = ring[i];
    const Point& b = ring[(i + 1) % ring.size()];
    twice += a.x * b.y - b.x * a.y;
  }
  return 0.5 * twice;
}

Box bounds_of(const Ring& ring) {
  double west = ring.front().x;
  double east = west;
  double top = ring.front().y;
  double foot = top;
  for (const Point& point : ring) {
    west = std::min(west, point.x);
    east = std::max(east, point.x);
    top = std::min(top, point.y);
    foot = std::max(foot, point.y);
  }
  return {west, top, east - west, foot - top};
}

// Even-odd rule over all rings of a plot.
bool holds(const std::vector<Ring>& rings, Point point) {
  bool inside = false;
  for (const Ring& ring : rings) {
    for (std::size_t i = 0; i < ring.size(); ++i) {
      const Point& a = ring[i];
      const Point& b = ring[(i + 1) % ring.size()];
      if ((a.y > point.y) == (b.y > point.y)) continue;
      if (point.x < a.x + (point.y - a.y) / (b.y - a.y) * (b.x - a.x)) inside = !inside;
    }
  }
  return inside;
}

// The middle of the longest stretch inside the plot on the level line through its largest ring's
// middle: unlike a centroid it cannot fall outside a bent plot.
Point label_place(const std::vector<Ring>& rings, const Box& bounds) {
  constexpr int kSamples = 128;
  const double y = bounds.middle().y;
  int best_length = 0;
  int best_end = kSamples / 2;
  int length = 0;
  for (int i = 0; i < kSamples; ++i) {
    const bool inside = holds(rings, {bounds.x + (i + 0.5) / kSamples * bounds.width, y});
    length = inside ? length + 1 : 0;
    if (length > best_length) {
      best_length = length;
      best_end = i + 1;
    }
  }
  return {bounds.x + (best_end - 0.5 * best_length) / kSamples * bounds.width, y};
}

// The ink that stands out from most of the map, and a rim of the other for the rest.
struct Inks {
  Colour line;
  Colour rim;
};
Inks inks_on(const Colour& ground) {
  const bool dark = contrast(ink::kText, ground) > contrast(ink::kPaper, ground);
  return dark ? Inks{ink::kText, ink::kPaper} : Inks{ink::kPaper, ink::kText};
}

void write_id(Canvas& canvas, const Box& map, const std::vector<Ring>& rings, const std::string& id,
              const Inks& inks) {
  const auto larger = [](const Ring& a, const Ring& b) {
    return std::abs(signed_area(a)) < std::abs(signed_area(b));
  };
  const Box bounds = bounds_of(*std::max_element(rings.begin(), rings.end(), larger));
  const double size = std::clamp(map.width / 50.0, 16.0, 26.0);
  const TextStyle style{size, true, inks.line, Align::centre, inks.rim};
  const Point place = label_place(rings, bounds);
  const Point baseline{place.x, place.y + 0.36 * style.size};
  const Box label = canvas.measure(baseline, id, style);
  const bool fits = label.width <= 0.85 * bounds.width && label.height <= 0.8 * bounds.height;
  if (fits && map.holds(label) && canvas.is_free(label.grown(2.0))) canvas.text(baseline, id, style);
}

}  // namespace

void draw_plot_outlines(Canvas& canvas, const Box& box, const GridFrame& frame,
                        const std::vector<PlotOutline>& plots, const Colour& ground) {
  const Inks inks = inks_on(ground);
  const double units_per_metre = box.width / (frame.columns * frame.cell_m);
  std::vector<std::vector<Ring>> drawn;
  for (const PlotOutline& plot : plots) {
    std::vector<Ring>& rings = drawn.emplace_back();
    for (const std::vector<MapPoint>& ring : plot.rings) {
      if (ring.empty()) continue;
      Ring& points = rings.emplace_back();
      for (const MapPoint& point : ring) {
        points.push_back({box.x + (point.east - frame.west) * units_per_metre,
                          box.y + (frame.north - point.north) * units_per_metre});
      }
    }
  }
  {
    for (const std::vector<Ring>& rings : drawn) {
      canvas.outline_rings(rings, {3.4, inks.rim, 0.35});
      canvas.outline_rings(rings, {1.4, inks.line});
    }
  }
  for (std::size_t i = 0; i < plots.size(); ++i) {
    if (!drawn[i].empty()) write_id(canvas, box, drawn[i], plots[i].id, inks);
  }
}

}  // namespace sunfall
