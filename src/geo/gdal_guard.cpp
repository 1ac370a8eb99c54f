#include "geo/gdal_guard.h"

#include <cpl_error.h>

#include <utility>

namespace sunfall {
namespace {

void CPL_STDCALL collect(CPLErr severity, CPLErrorNum, const char* message) {
  auto* guard = static_cast<GdalGuard*>(CPLGetErrorHandlerUserData());
  if (severity == CE_Debug || guard == nullptr) return;
  guard->take(severity >= CE_Failure, message);
}

}  // namespace

GdalGuard::GdalGuard() {
  CPLErrorReset();
  CPLPushErrorHandlerEx(collect, this);
}

GdalGuard::~GdalGuard() {
  CPLPopErrorHandler();
  CPLErrorReset();
}

void GdalGuard::clear() {
  failed_ = false;
  message_.clear();
  CPLErrorReset();
}

void GdalGuard::take(bool failure, const char* message) noexcept {
  const bool first_failure = failure && !failed_;
  failed_ = failed_ || failure;
  if (!first_failure && !message_.empty()) return;
  try {
    message_ = message;
  } catch (...) {
    // Out of memory for the text: the flag above still tells of the failure.
  }
}

void GdalGuard::fail(ErrorKind kind, std::string what, std::string where, std::string remedy) const {
  throw Error(kind, {std::move(what), std::move(where), message_, std::move(remedy)});
}

}  // namespace sunfall
