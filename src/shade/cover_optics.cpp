#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <numbers>
#include <utility>

#include "shade/cover_curve.h"
#include "shade/cover_stack.h"
#include "shade/simpson.h"
#include "sunfall/covers.h"
#include "sunfall/error.h"

namespace sunfall {
namespace {

// Over an evenly bright hemisphere the mean is the integral of T over sin² of the incidence, so of
// 2 sin cos T over the angle; tests/shade holds it against twice the steps and against another rule.
constexpr int kAngleSteps = 360;

template <typename... Case>
struct Cases : Case... {
  using Case::operator()...;
};
template <typename... Case>
Cases(Case...) -> Cases<Case...>;

using Optics = std::variant<CoverStack, CoverCurve>;

Optics optics_of(const Cover& cover) {
  if (const auto fault = fault_of(cover)) {
    throw Error(ErrorKind::plan, {fault->key + " " + fault->what, "cover \"" + cover.name + "\"",
                                  fault->found, fault->remedy});
  }
  return std::visit(Cases{[](const CoverSheets& sheets) -> Optics { return CoverStack(sheets); },
                          [](const CoverReadings& readings) -> Optics { return CoverCurve(readings); }},
                    cover.made_of);
}

double product_of(const std::vector<CoverFactor>& factors) {
  double product = 1.0;
  for (const CoverFactor& factor : factors) {
    if (!(factor.value > 0.0 && factor.value <= 1.0)) {
      throw Error(ErrorKind::plan, {"must be above 0 and at most 1", "factor \"" + factor.name + "\"",
                                    fmt::format("{:g}", factor.value), "Give the share that is left, 0.95"});
    }
    product *= factor.value;
  }
  return product;
}

}  // namespace

struct CoverOptics::Source {
  Optics optics;
};

CoverOptics::CoverOptics(const Cover& cover, const std::vector<CoverFactor>& factors)
    : source_(std::make_shared<Source>(Source{optics_of(cover)})), factor_(product_of(factors)) {
  for (int i = 1; i < kAngleSteps; ++i) {  // both ends weigh nothing
    const Angle incidence = Angle::radians(i * std::numbers::pi / 2.0 / kAngleSteps);
    const double weight =
        std::numbers::pi / 2.0 * std::sin(2.0 * incidence.radians()) * simpson_weight(i, kAngleSteps);
    const CoverPassage passage = at(incidence);
    hemispherical_.regular += passage.regular * weight;
    hemispherical_.scattered += passage.scattered * weight;
  }
}

CoverPassage CoverOptics::at(Angle incidence) const {
  const double angle_rad = std::abs(incidence.radians());
  if (!(angle_rad < std::numbers::pi / 2.0)) return {};
  const CoverPassage passage = std::visit(
      Cases{[&](const CoverStack& stack) {
              const StackLight light = stack.at(std::cos(angle_rad));
              return CoverPassage{light.regular, light.scattered};
            },
            [&](const CoverCurve& curve) { return curve.at(Angle::radians(angle_rad).degrees()); }},
      source_->optics);
  return {passage.regular * factor_, passage.scattered * factor_};
}

}  // namespace sunfall
