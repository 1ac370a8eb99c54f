#include "shade/cover_stack.h"

#include <algorithm>
#include <cmath>
#include <utility>

#include "shade/cover_surface.h"
#include "shade/cover_transfer.h"
#include "shade/simpson.h"

namespace sunfall {
namespace {

// Steps in the cosine; the transmittance is smooth in it, and Simpson's error with 128 is below 1e-6.
constexpr int kCosineSteps = 128;
// Coatings work by interference, so they are looked at every 25 nm of 400 to 700, each the same photons.
constexpr int kWavelengthSteps = 12;
constexpr double kLeastWavelength_nm = 400.0;
constexpr double kWavelengthStep_nm = 25.0;
constexpr double kAnyWavelength_nm = 550.0;

struct Slab {
  double through = 0.0;
  double reflected = 0.0;
  double absorbed = 0.0;
};

// A slab with surfaces a, where the light falls, and b: the sum over all inner reflections (Duffie and
// Beckman, Solar Engineering of Thermal Processes, eqs. 5.3.1 to 5.3.3, for two unlike surfaces).
Slab slab(const SurfaceLight& a, const SurfaceLight& b, double depth) {
  const double passed = std::exp(-depth);
  const double lost = -std::expm1(-depth);
  // 1 - a b passed², without taking nearly equal numbers from each other.
  const double divisor =
      (a.through + b.through - a.through * b.through) * passed * passed + lost * (1.0 + passed);
  const double entered = a.through / divisor;
  return {entered * passed * b.through, a.reflected + entered * passed * passed * b.reflected * a.through,
          entered * lost * (1.0 + b.reflected * passed)};
}

struct SheetSide {
  Slab s;
  Slab p;
};
struct BothSides {
  SheetSide outer;
  SheetSide inner;
};

Slab with_opaque(Slab slab, double opaque) {
  const double clear = 1.0 - opaque;
  return {slab.through * clear, slab.reflected * clear, slab.absorbed * clear + opaque};
}

BothSides sheet_at(const CoverSheet& sheet, double cosine, double wavelength_nm) {
  const Surface a = surface_at(sheet.index, sheet.outer_coating, cosine, wavelength_nm);
  const Surface b = surface_at(sheet.index, sheet.inner_coating, cosine, wavelength_nm);
  const double depth = sheet.absorption_per_m * sheet.thickness_m / cosine_within(sheet.index, cosine);
  const auto of = [&](const SurfaceLight& first, const SurfaceLight& second) {
    return with_opaque(slab(first, second, depth), sheet.opaque);
  };
  return {{of(a.s, b.s), of(a.p, b.p)}, {of(b.s, a.s), of(b.p, a.p)}};
}

// A part of what passes is scattered; it leaves by the same side as the rest.
LayerSide layer_side(const SheetSide& side, double haze) {
  const double kept = 1.0 - haze;
  return {{side.s.through * kept, side.p.through * kept, side.s.through * haze, side.p.through * haze, 0.0},
          {side.s.reflected, side.p.reflected, 0.0, 0.0, 0.0},
          {side.s.absorbed, side.p.absorbed, 0.0}};
}

EvenLight operator+(const EvenLight& a, const EvenLight& b) {
  return {a.through + b.through, a.reflected_outside + b.reflected_outside,
          a.reflected_inside + b.reflected_inside, a.absorbed_outside + b.absorbed_outside,
          a.absorbed_inside + b.absorbed_inside};
}
EvenLight operator*(const EvenLight& a, double f) {
  return {a.through * f, a.reflected_outside * f, a.reflected_inside * f, a.absorbed_outside * f,
          a.absorbed_inside * f};
}

// Light that is even over the hemisphere falls with the weight 2 cosine on the plane, half of it in each
// polarisation.
EvenLight even_light(const CoverSheet& sheet, double wavelength_nm) {
  EvenLight sum;
  for (int i = 1; i <= kCosineSteps; ++i) {  // nothing falls along the plane
    const double cosine = static_cast<double>(i) / kCosineSteps;
    const BothSides both = sheet_at(sheet, cosine, wavelength_nm);
    const SheetSide& a = both.outer;
    const SheetSide& b = both.inner;
    const EvenLight light{a.s.through + a.p.through, a.s.reflected + a.p.reflected,
                          b.s.reflected + b.p.reflected, a.s.absorbed + a.p.absorbed,
                          b.s.absorbed + b.p.absorbed};
    sum = sum + light * (cosine * simpson_weight(i, kCosineSteps));
  }
  return sum;
}

StackLight as_light(const LayerSide& side, const StreamLight& in) {
  const StreamLight through = side.through * in;
  const StreamLight back = side.reflected * in;
  return {through.s + through.p, through.scattered, back.s + back.p + back.scattered,
          side.absorbed.s * in.s + side.absorbed.p * in.p + side.absorbed.scattered * in.scattered};
}

void add(StackLight& sum, const StackLight& light, double weight) {
  sum.regular += light.regular * weight;
  sum.scattered += light.scattered * weight;
  sum.reflected += light.reflected * weight;
  sum.absorbed += light.absorbed * weight;
}

}  // namespace

CoverStack::CoverStack(CoverSheets sheets) : sheets_(std::move(sheets)) {
  const bool coated = std::any_of(sheets_.begin(), sheets_.end(), [](const CoverSheet& sheet) {
    return sheet.outer_coating || sheet.inner_coating;
  });
  if (coated) {
    for (int i = 0; i <= kWavelengthSteps; ++i) {
      wavelengths_nm_.push_back(kLeastWavelength_nm + i * kWavelengthStep_nm);
      weights_.push_back(simpson_weight(i, kWavelengthSteps));
    }
  } else {
    wavelengths_nm_ = {kAnyWavelength_nm};
    weights_ = {1.0};
  }
  for (const double wavelength_nm : wavelengths_nm_) {
    std::vector<EvenLight>& of_sheets = scattered_.emplace_back();
    for (const CoverSheet& sheet : sheets_) of_sheets.push_back(even_light(sheet, wavelength_nm));
  }
}

StackLight CoverStack::at_wavelength(double cosine, CoverSide from, std::size_t wavelength) const {
  Layer all;
  for (std::size_t i = 0; i < sheets_.size(); ++i) {
    const EvenLight& even = scattered_[wavelength][i];
    Layer layer;
    if (cosine > 0.0) {
      const BothSides both = sheet_at(sheets_[i], cosine, wavelengths_nm_[wavelength]);
      layer = {layer_side(both.outer, sheets_[i].haze), layer_side(both.inner, sheets_[i].haze)};
    }
    layer.outer.through.scattered = layer.inner.through.scattered = even.through;
    layer.outer.reflected.scattered = even.reflected_outside;
    layer.inner.reflected.scattered = even.reflected_inside;
    layer.outer.absorbed.scattered = even.absorbed_outside;
    layer.inner.absorbed.scattered = even.absorbed_inside;
    all = i == 0 ? layer : stacked(all, layer);
  }
  const LayerSide& side = from == CoverSide::outer ? all.outer : all.inner;
  return as_light(side, cosine > 0.0 ? StreamLight{0.5, 0.5, 0.0} : StreamLight{0.0, 0.0, 1.0});
}

StackLight CoverStack::at(double cosine, CoverSide from) const {
  if (!(cosine > 0.0)) return {0.0, 0.0, 1.0, 0.0};
  StackLight sum;
  for (std::size_t w = 0; w < weights_.size(); ++w) {
    add(sum, at_wavelength(std::min(cosine, 1.0), from, w), weights_[w]);
  }
  return sum;
}

StackLight CoverStack::scattered_light(CoverSide from) const {
  StackLight sum;
  for (std::size_t w = 0; w < weights_.size(); ++w) add(sum, at_wavelength(0.0, from, w), weights_[w]);
  return sum;
}

}  // namespace sunfall
