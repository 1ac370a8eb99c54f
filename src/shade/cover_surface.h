#pragma once
// One surface of a sheet, between air and the sheet's medium, for both polarisations: Snell and Fresnel, and
// for a coated surface the sum of the waves in the coating. Without loss, so what is not reflected passes,
// and the same for light from within as from outside along the same path.

#include <optional>

#include "sunfall/covers.h"

namespace sunfall {

struct SurfaceLight {
  double through = 0.0;
  double reflected = 0.0;
};
struct Surface {
  SurfaceLight s;  // electric field across the plane of incidence
  SurfaceLight p;  // within it
};

// The cosine within a medium for a direction of that cosine in air; Snell's law.
double cosine_within(double index, double cosine_in_air);

// `cosine` of the incidence in air, above 0 to 1; `wavelength_nm` in air matters to coated surfaces only.
Surface surface_at(double index, const std::optional<CoverCoating>& coating, double cosine,
                   double wavelength_nm);

}  // namespace sunfall
