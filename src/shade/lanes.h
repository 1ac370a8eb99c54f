#pragma once
// Several sweep lines side by side in one register: the few operations that the horizon kernel
// needs, once per instruction set. All variants round alike (no fused multiply-add), so they give
// the same bits. Included only by the kernel's own translation units, which are compiled for one
// instruction set each; therefore nothing here may come from the standard library.

#include <cstdint>

#if defined(__AVX2__)
#include <immintrin.h>
#endif

namespace sunfall {
namespace {

#if defined(SUNFALL_LANES_AVX512)

struct Lanes {
  using Float = __m512;
  using Int = __m512i;
  using Mask = __mmask16;
  static constexpr int kWidth = 16;

  static Float set(float a) { return _mm512_set1_ps(a); }
  static Int set(std::int32_t a) { return _mm512_set1_epi32(a); }
  static Int count() { return _mm512_setr_epi32(0, 1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12, 13, 14, 15); }
  static Float load(const float* p) { return _mm512_loadu_ps(p); }
  static Int load(const std::int32_t* p) { return _mm512_loadu_si512(p); }
  static void store(float* p, Float a) { _mm512_storeu_ps(p, a); }
  static void store(std::int32_t* p, Int a) { _mm512_storeu_si512(p, a); }
  static Float add(Float a, Float b) { return _mm512_add_ps(a, b); }
  static Float sub(Float a, Float b) { return _mm512_sub_ps(a, b); }
  static Float mul(Float a, Float b) { return _mm512_mul_ps(a, b); }
  static Float div(Float a, Float b) { return _mm512_div_ps(a, b); }
  static Float max(Float a, Float b) { return _mm512_max_ps(a, b); }
  static Float floor(Float a) { return _mm512_roundscale_ps(a, 0x09); }
  static Int add(Int a, Int b) { return _mm512_add_epi32(a, b); }
  static Int bit_and(Int a, Int b) { return _mm512_and_si512(a, b); }
  template <int kBits>
  static Int shift_left(Int a) {
    return _mm512_slli_epi32(a, kBits);
  }
  template <int kBits>
  static Int shift_right(Int a) {
    return _mm512_srai_epi32(a, kBits);
  }
  static Float to_float(Int a) { return _mm512_cvtepi32_ps(a); }
  static Int to_int(Float a) { return _mm512_cvttps_epi32(a); }
  static Mask greater(Float a, Float b) { return _mm512_cmp_ps_mask(a, b, _CMP_GT_OQ); }
  static Mask inside(Int a, std::int32_t count) {
    return _mm512_cmplt_epu32_mask(a, _mm512_set1_epi32(count));
  }
  static Mask both(Mask a, Mask b) { return static_cast<Mask>(a & b); }
  static bool any(Mask a) { return a != 0; }
  static Float choose(Mask m, Float yes, Float no) { return _mm512_mask_mov_ps(no, m, yes); }
  static Int choose(Mask m, Int yes, Int no) { return _mm512_mask_mov_epi32(no, m, yes); }
  // values[offset] for each lane; offsets below kWidth.
  static Float pick(Float values, Int offset) { return _mm512_permutexvar_ps(offset, values); }
  static Float gather(const float* base, Int index, Mask m, Float otherwise) {
    return _mm512_mask_i32gather_ps(otherwise, m, index, base, 4);
  }
  static Int gather(const std::int32_t* base, Int index, Mask m, Int otherwise) {
    return _mm512_mask_i32gather_epi32(otherwise, m, index, base, 4);
  }
};

#elif defined(SUNFALL_LANES_AVX2)

struct Lanes {
  using Float = __m256;
  using Int = __m256i;
  using Mask = __m256;  // all bits of a lane set or none
  static constexpr int kWidth = 8;

  static Float set(float a) { return _mm256_set1_ps(a); }
  static Int set(std::int32_t a) { return _mm256_set1_epi32(a); }
  static Int count() { return _mm256_setr_epi32(0, 1, 2, 3, 4, 5, 6, 7); }
  static Float load(const float* p) { return _mm256_loadu_ps(p); }
  static Int load(const std::int32_t* p) { return _mm256_loadu_si256(reinterpret_cast<const __m256i*>(p)); }
  static void store(float* p, Float a) { _mm256_storeu_ps(p, a); }
  static void store(std::int32_t* p, Int a) { _mm256_storeu_si256(reinterpret_cast<__m256i*>(p), a); }
  static Float add(Float a, Float b) { return _mm256_add_ps(a, b); }
  static Float sub(Float a, Float b) { return _mm256_sub_ps(a, b); }
  static Float mul(Float a, Float b) { return _mm256_mul_ps(a, b); }
  static Float div(Float a, Float b) { return _mm256_div_ps(a, b); }
  static Float max(Float a, Float b) { return _mm256_max_ps(a, b); }
  static Float floor(Float a) { return _mm256_floor_ps(a); }
  static Int add(Int a, Int b) { return _mm256_add_epi32(a, b); }
  static Int bit_and(Int a, Int b) { return _mm256_and_si256(a, b); }
  template <int kBits>
  static Int shift_left(Int a) {
    return _mm256_slli_epi32(a, kBits);
  }
  template <int kBits>
  static Int shift_right(Int a) {
    return _mm256_srai_epi32(a, kBits);
  }
  static Float to_float(Int a) { return _mm256_cvtepi32_ps(a); }
  static Int to_int(Float a) { return _mm256_cvttps_epi32(a); }
  static Mask greater(Float a, Float b) { return _mm256_cmp_ps(a, b, _CMP_GT_OQ); }
  static Mask inside(Int a, std::int32_t count) {
    const __m256i low = _mm256_cmpgt_epi32(a, _mm256_set1_epi32(-1));
    const __m256i high = _mm256_cmpgt_epi32(_mm256_set1_epi32(count), a);
    return _mm256_castsi256_ps(_mm256_and_si256(low, high));
  }
  static Mask both(Mask a, Mask b) { return _mm256_and_ps(a, b); }
  static bool any(Mask a) { return _mm256_movemask_ps(a) != 0; }
  static Float choose(Mask m, Float yes, Float no) { return _mm256_blendv_ps(no, yes, m); }
  static Int choose(Mask m, Int yes, Int no) { return _mm256_blendv_epi8(no, yes, _mm256_castps_si256(m)); }
  static Float pick(Float values, Int offset) { return _mm256_permutevar8x32_ps(values, offset); }
  static Float gather(const float* base, Int index, Mask m, Float otherwise) {
    return _mm256_mask_i32gather_ps(otherwise, base, index, m, 4);
  }
  static Int gather(const std::int32_t* base, Int index, Mask m, Int otherwise) {
    return _mm256_mask_i32gather_epi32(otherwise, base, index, _mm256_castps_si256(m), 4);
  }
};

#else

// Plain C++: eight lanes in arrays.
struct Lanes {
  static constexpr int kWidth = 8;
  struct Float {
    float lane[kWidth];
  };
  struct Int {
    std::int32_t lane[kWidth];
  };
  struct Mask {
    bool lane[kWidth];
  };

  template <typename Result, typename Function>
  static Result each(Function function) {
    Result result;
    for (int i = 0; i < kWidth; ++i) result.lane[i] = function(i);
    return result;
  }
  static Float set(float a) {
    return each<Float>([&](int) { return a; });
  }
  static Int set(std::int32_t a) {
    return each<Int>([&](int) { return a; });
  }
  static Int count() {
    return each<Int>([&](int i) { return i; });
  }
  static Float load(const float* p) {
    return each<Float>([&](int i) { return p[i]; });
  }
  static Int load(const std::int32_t* p) {
    return each<Int>([&](int i) { return p[i]; });
  }
  static void store(float* p, const Float& a) {
    for (int i = 0; i < kWidth; ++i) p[i] = a.lane[i];
  }
  static void store(std::int32_t* p, const Int& a) {
    for (int i = 0; i < kWidth; ++i) p[i] = a.lane[i];
  }
  static Float add(const Float& a, const Float& b) {
    return each<Float>([&](int i) { return a.lane[i] + b.lane[i]; });
  }
  static Float sub(const Float& a, const Float& b) {
    return each<Float>([&](int i) { return a.lane[i] - b.lane[i]; });
  }
  static Float mul(const Float& a, const Float& b) {
    return each<Float>([&](int i) { return a.lane[i] * b.lane[i]; });
  }
  static Float div(const Float& a, const Float& b) {
    return each<Float>([&](int i) { return a.lane[i] / b.lane[i]; });
  }
  static Float max(const Float& a, const Float& b) {
    return each<Float>([&](int i) { return a.lane[i] > b.lane[i] ? a.lane[i] : b.lane[i]; });
  }
  static Float floor(const Float& a) {
    return each<Float>([&](int i) { return __builtin_floorf(a.lane[i]); });
  }
  static Int add(const Int& a, const Int& b) {
    return each<Int>([&](int i) { return a.lane[i] + b.lane[i]; });
  }
  static Int bit_and(const Int& a, const Int& b) {
    return each<Int>([&](int i) { return a.lane[i] & b.lane[i]; });
  }
  template <int kBits>
  static Int shift_left(const Int& a) {
    return each<Int>(
        [&](int i) { return static_cast<std::int32_t>(static_cast<std::uint32_t>(a.lane[i]) << kBits); });
  }
  template <int kBits>
  static Int shift_right(const Int& a) {
    return each<Int>([&](int i) { return a.lane[i] >> kBits; });
  }
  static Float to_float(const Int& a) {
    return each<Float>([&](int i) { return static_cast<float>(a.lane[i]); });
  }
  static Int to_int(const Float& a) {
    return each<Int>([&](int i) { return static_cast<std::int32_t>(a.lane[i]); });
  }
  static Mask greater(const Float& a, const Float& b) {
    return each<Mask>([&](int i) { return a.lane[i] > b.lane[i]; });
  }
  static Mask inside(const Int& a, std::int32_t count) {
    return each<Mask>([&](int i) { return a.lane[i] >= 0 && a.lane[i] < count; });
  }
  static Mask both(const Mask& a, const Mask& b) {
    return each<Mask>([&](int i) { return a.lane[i] && b.lane[i]; });
  }
  static bool any(const Mask& a) {
    bool result = false;
    for (int i = 0; i < kWidth; ++i) result = result || a.lane[i];
    return result;
  }
  static Float choose(const Mask& m, const Float& yes, const Float& no) {
    return each<Float>([&](int i) { return m.lane[i] ? yes.lane[i] : no.lane[i]; });
  }
  static Int choose(const Mask& m, const Int& yes, const Int& no) {
    return each<Int>([&](int i) { return m.lane[i] ? yes.lane[i] : no.lane[i]; });
  }
  static Float pick(const Float& values, const Int& offset) {
    return each<Float>([&](int i) { return values.lane[offset.lane[i]]; });
  }
  static Float gather(const float* base, const Int& index, const Mask& m, const Float& otherwise) {
    return each<Float>([&](int i) { return m.lane[i] ? base[index.lane[i]] : otherwise.lane[i]; });
  }
  static Int gather(const std::int32_t* base, const Int& index, const Mask& m, const Int& otherwise) {
    return each<Int>([&](int i) { return m.lane[i] ? base[index.lane[i]] : otherwise.lane[i]; });
  }
};

#endif

}  // namespace
}  // namespace sunfall
