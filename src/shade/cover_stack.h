#pragma once
// Sheets with air between them, and every reflection to and fro, summed exactly as intensities: polarisation
// by polarisation, with what one sheet scatters followed through the others.

#include <vector>

#include "sunfall/covers.h"

namespace sunfall {

// Shares of the light that falls on one side. They add up to 1.
struct StackLight {
  double regular = 0.0;
  double scattered = 0.0;
  double reflected = 0.0;  // regular and scattered
  double absorbed = 0.0;
};

// What a sheet does to scattered light, even over the hemisphere on either side of it.
struct EvenLight {
  double through = 0.0;
  double reflected_outside = 0.0;
  double reflected_inside = 0.0;
  double absorbed_outside = 0.0;
  double absorbed_inside = 0.0;
};

enum class CoverSide { outer, inner };

class CoverStack {
 public:
  // Sheets must be such as fault_of lets pass.
  explicit CoverStack(CoverSheets sheets);

  // Unpolarised light of that cosine of incidence; at 0 or below all is reflected.
  StackLight at(double cosine, CoverSide from = CoverSide::outer) const;
  // Scattered light, even over the hemisphere.
  StackLight scattered_light(CoverSide from = CoverSide::outer) const;

 private:
  StackLight at_wavelength(double cosine, CoverSide from, std::size_t wavelength) const;

  CoverSheets sheets_;
  std::vector<double> wavelengths_nm_;
  std::vector<double> weights_;                    // of the wavelengths, sum 1
  std::vector<std::vector<EvenLight>> scattered_;  // [wavelength][sheet]
};

}  // namespace sunfall
