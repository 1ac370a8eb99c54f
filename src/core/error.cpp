#include "sunfall/error.h"

#include <utility>

namespace sunfall {

int exit_status(ErrorKind kind) noexcept {
  switch (kind) {
    case ErrorKind::plan: return 2;
    case ErrorKind::data: return 3;
    case ErrorKind::io: return 4;
    case ErrorKind::interrupted: return 5;
    case ErrorKind::internal: return 1;
  }
  return 1;
}

namespace {

// With a capital at its beginning, as it follows a full stop.
std::string sentence(std::string clause) {
  if (clause.front() >= 'a' && clause.front() <= 'z')
    clause.front() = static_cast<char>(clause.front() - 'a' + 'A');
  return clause;
}

std::string one_line(const Error::Parts& parts) {
  std::string line = parts.where;
  if (!line.empty()) line.append(": ");
  line.append(parts.what);
  if (!parts.found.empty()) line.append(" (found: ").append(parts.found).append(")");
  if (!parts.remedy.empty()) line.append(". ").append(sentence(parts.remedy));
  if (line.empty() || line.back() != '.') line.push_back('.');
  return line;
}

}  // namespace

Error::Error(ErrorKind kind, Parts parts)
    : kind_(kind), parts_(std::move(parts)), message_(one_line(parts_)) {}

}  // namespace sunfall
