#pragma once
// Sky light of one moment, cut into the dome's sectors and bands.

#include <vector>

#include "dome/perez_kernel.h"
#include "dome/sky_radiance.h"
#include "sunfall/dome.h"
#include "sunfall/sun.h"

namespace sunfall {

// Evaluates one sky shape over a dome. The result is the fraction of the diffuse light on the level
// that arrives from each sector and band, [sector][band], adding up to 1; finite and never negative
// for any shape (negative radiance counts as none; a sky with none at all falls back to uniform).
class SkyPatches {
 public:
  explicit SkyPatches(const Dome& dome);
  // `sun` is the direction of the sun; below the horizon it is taken at the horizon.
  const std::vector<float>& perez(const SkyShape& shape, const SkyDirection& sun);
  const std::vector<float>& isotropic();
  const std::vector<float>& overcast();

 private:
  template <typename Radiance>
  const std::vector<float>& by_band(Radiance radiance);
  const std::vector<float>& normalised(double sum);

  PatchDirections patches_;
  std::vector<float> fraction_;
};

// The direction halfway between two.
SkyDirection middle_direction(const SkyDirection& a, const SkyDirection& b);

// The state of the sky over step i of a series; `middle` is where the sun then stands.
SkyState sky_state(const LightSeries& series, std::size_t step, const SkyDirection& middle);

// The sky of step i of a series, under the sky model of the plan.
const std::vector<float>& sky_fractions(SkyPatches& patches, SkyModel sky, const LightSeries& series,
                                        std::size_t step);

}  // namespace sunfall
