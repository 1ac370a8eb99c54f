#pragma once
// Horizons in 512 steps. A step is a stretch of the tangent of elevation, fine near the horizon and
// even in ratio higher up (0.11 degrees wide at 0, 0.2 at 20 and 60, nowhere more than the 0.50 just
// above 41 degrees), found without a division or root: the leading bits of (tangent + 1/8) read as an
// integer.

#include <algorithm>
#include <bit>
#include <cstdint>

namespace sunfall {

inline constexpr int kHorizonSteps = 512;

namespace detail {
inline constexpr float kStepOffset = 0.125F;
inline constexpr int kStepShift = 17;  // leaves six bits of the mantissa: 64 steps an octave
inline constexpr std::int32_t kFirstBits = std::bit_cast<std::int32_t>(kStepOffset);
}  // namespace detail

// The step nearest to a horizon. Step 0 is the open horizon: every tangent below 0.00097 falls in it.
inline std::uint16_t horizon_step(float tangent) {
  const float clamped = std::min(std::max(0.0F, tangent), 30.0F);  // a NaN is an open horizon
  const std::int32_t bits = std::bit_cast<std::int32_t>(clamped + detail::kStepOffset);
  return static_cast<std::uint16_t>((bits - detail::kFirstBits + (1 << (detail::kStepShift - 1))) >>
                                    detail::kStepShift);
}

// The tangent at the middle of a step.
inline float step_tangent(int step) {
  return std::bit_cast<float>(detail::kFirstBits + (step << detail::kStepShift)) - detail::kStepOffset;
}

}  // namespace sunfall
