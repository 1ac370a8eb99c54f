#include "shade/cover_transfer.h"

namespace sunfall {
namespace {

Transfer operator+(const Transfer& a, const Transfer& b) {
  return {a.s + b.s, a.p + b.p, a.s_scattered + b.s_scattered, a.p_scattered + b.p_scattered,
          a.scattered + b.scattered};
}

// What is absorbed of the light that `m` makes.
StreamLight after(const StreamLight& absorbed, const Transfer& m) {
  return {absorbed.s * m.s + absorbed.scattered * m.s_scattered,
          absorbed.p * m.p + absorbed.scattered * m.p_scattered, absorbed.scattered * m.scattered};
}
StreamLight sum(const StreamLight& a, const StreamLight& b) {
  return {a.s + b.s, a.p + b.p, a.scattered + b.scattered};
}

// 1 + m + m² + …, the inverse of 1 - m.
Transfer all_rounds(const Transfer& m) {
  const double s = 1.0 / (1.0 - m.s);
  const double p = 1.0 / (1.0 - m.p);
  const double scattered = 1.0 / (1.0 - m.scattered);
  return {s, p, s * m.s_scattered * scattered, p * m.p_scattered * scattered, scattered};
}

// Light falls on `first`; the net flux down and up in the gap follows from all rounds between the two
// (Stokes 1862, in the form of the adding method).
LayerSide seen_from(const Layer& first, const LayerSide& second) {
  const Transfer down = all_rounds(first.inner.reflected * second.reflected) * first.outer.through;
  const Transfer up = second.reflected * down;
  return {second.through * down, first.outer.reflected + first.inner.through * up,
          sum(first.outer.absorbed, sum(after(first.inner.absorbed, up), after(second.absorbed, down)))};
}

}  // namespace

StreamLight operator*(const Transfer& m, const StreamLight& in) {
  return {m.s * in.s, m.p * in.p, m.s_scattered * in.s + m.p_scattered * in.p + m.scattered * in.scattered};
}

Transfer operator*(const Transfer& second, const Transfer& first) {
  return {second.s * first.s, second.p * first.p,
          second.s_scattered * first.s + second.scattered * first.s_scattered,
          second.p_scattered * first.p + second.scattered * first.p_scattered,
          second.scattered * first.scattered};
}

Layer stacked(const Layer& upper, const Layer& lower) {
  const Layer lower_turned{lower.inner, lower.outer};
  return {seen_from(upper, lower.outer), seen_from(lower_turned, upper.inner)};
}

}  // namespace sunfall
