#pragma once
// The skies of long records: instead of one sky per step, the light of all steps is laid on a lattice of
// sky states, and each state's sky is drawn once.

#include <cstddef>
#include <vector>

#include "dome/perez_kernel.h"
#include "dome/sky_radiance.h"
#include "sunfall/dome.h"

namespace sunfall {

// A state is a clearness class, a brightness and the sun's place. A step's light is shared bilinearly among
// the states around its own: 12 gaps of brightness over a class's sound range, 2 degrees of zenith, 1 degree
// of azimuth. A sky drawn with the sun due north serves all azimuths, for the dome's sectors are whole
// degrees wide (they must be). Linear sharing over a gap h errs by h²/8 of the second derivative: the glow,
// whose steepest fall is to 1/e in 10 degrees, by 0.5 % at its middle.
class SkyLattice {
 public:
  explicit SkyLattice(const Dome& dome);

  // `sun` as in SkyPatches::perez.
  void add(const SkyIndices& indices, Angle sun_zenith, const SkyDirection& sun, double mol);
  // Adds all that was given to `sums`, [sector][band], and begins anew.
  void settle(std::vector<double>& sums);

 private:
  void settle_node(std::size_t node, std::vector<double>& sums);

  int sectors_;
  int bands_;
  int width_deg_;
  PatchDirections half_;  // azimuths 0 to 180 degrees off the sun, whole degrees
  std::vector<std::vector<double>>
      light_;                    // [state][azimuth of the sun]; without elements where there is none
  std::vector<float> radiance_;  // [degree off the sun][band]
};

// Whether a dome can have one: the sectors are whole degrees wide.
bool fits_lattice(const Dome& dome);

}  // namespace sunfall
