#pragma once
// The one error type of Sunfall. It is thrown where outside input enters (files, plans, libraries)
// and caught once, in main. A person who reads it learns what is wrong, where, what was found
// there, and what to do about it.

#include <exception>
#include <string>

namespace sunfall {

enum class ErrorKind {
  plan,         // the command line or the plan is wrong
  data,         // an input file holds what it must not
  io,           // reading or writing failed: disk, permission, library
  interrupted,  // stopped by the user; can be run again
  internal,     // a fault of ours
};

// Exit status of the program for each kind: plan 2, data 3, io 4, interrupted 5, internal 1.
int exit_status(ErrorKind kind) noexcept;

class Error : public std::exception {
 public:
  struct Parts {
    std::string what;    // the fault, one clause: "the raster is in degrees"
    std::string where;   // file, table, key, line or cell: "ground.tif", "farm.toml:12 site.clock"
    std::string found;   // the value met, may be empty: "EPSG:4326"
    std::string remedy;  // what to do, one clause, may be empty
  };

  Error(ErrorKind kind, Parts parts);

  ErrorKind kind() const noexcept { return kind_; }
  const Parts& parts() const noexcept { return parts_; }
  // "where: what (found: value). remedy." on one line.
  const char* what() const noexcept override { return message_.c_str(); }

 private:
  ErrorKind kind_;
  Parts parts_;
  std::string message_;
};

}  // namespace sunfall
