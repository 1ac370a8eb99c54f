#pragma once
// Arrays that begin at a cache line, for tables whose entries fill whole lines.

#include <cstddef>
#include <new>
#include <vector>

namespace sunfall {

inline constexpr std::size_t kCacheLine = 64;

template <typename T>
struct CacheLineAllocator {
  using value_type = T;
  CacheLineAllocator() = default;
  template <typename U>
  explicit CacheLineAllocator(const CacheLineAllocator<U>&) {}
  T* allocate(std::size_t count) {
    return static_cast<T*>(::operator new (count * sizeof(T), std::align_val_t{kCacheLine}));
  }
  void deallocate(T* place, std::size_t) { ::operator delete (place, std::align_val_t{kCacheLine}); }
  template <typename U>
  bool operator==(const CacheLineAllocator<U>&) const {
    return true;
  }
};

template <typename T>
using AlignedVector = std::vector<T, CacheLineAllocator<T>>;

}  // namespace sunfall
