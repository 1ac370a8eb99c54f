#pragma once
// How much shadow leaves throw: Campbell's (1986, Agricultural and Forest Meteorology 36, 317-321)
// ellipsoidal distribution of leaf angles, leaves turned every way about the plumb line.

namespace sunfall {

class LeafAngles {
 public:
  // `x` is the ratio of the ellipsoid's horizontal to its vertical axis, above 0: 1 is the sphere.
  explicit LeafAngles(double x);

  // G: shadow on a plane that faces the light, per leaf area (one side); `sine` of the light's elevation.
  double projection(double sine) const;
  // K: the same on level ground, G / sine.
  double extinction(double sine) const { return projection(sine) / sine; }

 private:
  double x_squared_;
  double normal_;  // Λ
};

}  // namespace sunfall
