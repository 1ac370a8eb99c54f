#pragma once
// Light of two polarisations and scattered light, and what a layer makes of them. A polarisation stays itself
// or is scattered; scattered light stays so.

namespace sunfall {

// out = M in, with (s, p, scattered) in and out.
struct Transfer {
  double s = 0.0;
  double p = 0.0;
  double s_scattered = 0.0;  // scattered light out of s
  double p_scattered = 0.0;
  double scattered = 0.0;
};
struct StreamLight {
  double s = 0.0;
  double p = 0.0;
  double scattered = 0.0;
};

// Seen from one side: what passes, returns, and stays, for light that falls on that side.
struct LayerSide {
  Transfer through;
  Transfer reflected;
  StreamLight absorbed;  // per light of each kind
};
struct Layer {
  LayerSide outer;
  LayerSide inner;
};

StreamLight operator*(const Transfer& m, const StreamLight& in);
Transfer operator*(const Transfer& second, const Transfer& first);

// The two as one, with all reflections between them.
Layer stacked(const Layer& upper, const Layer& lower);

}  // namespace sunfall
