#pragma once
// The one adapter between GDAL's way of failing and ours. GDAL reports to a handler and goes on;
// we throw one Error. Handlers are per thread and must not throw, so the guard only collects.

#include <string>

#include "sunfall/error.h"

namespace sunfall {

// While it lives, what GDAL and OGR say on this thread is kept here instead of being printed.
class GdalGuard {
 public:
  GdalGuard();
  ~GdalGuard();
  GdalGuard(const GdalGuard&) = delete;
  GdalGuard& operator=(const GdalGuard&) = delete;

  // True once GDAL reported a failure, even where the call itself claimed success.
  bool failed() const { return failed_; }
  // The first failure, else the first warning, else an empty text.
  const std::string& message() const { return message_; }
  void clear();

  // Throws an Error whose `found` is GDAL's message.
  [[noreturn]] void fail(ErrorKind kind, std::string what, std::string where, std::string remedy) const;

  // Called by GDAL's handler.
  void take(bool failure, const char* message) noexcept;

 private:
  bool failed_ = false;
  std::string message_;
};

}  // namespace sunfall
