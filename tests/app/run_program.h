#pragma once
// Runs the real program as a user would: arguments in, exit status and both streams out.

#include <sys/types.h>

#include <cstdint>
#include <filesystem>
#include <initializer_list>
#include <optional>
#include <string>
#include <vector>

namespace sunfall::test {

struct RunOptions {
  std::filesystem::path folder;                     // where it is started; empty: here
  std::optional<std::uint64_t> largest_file_bytes;  // ulimit -f
  std::optional<std::uint64_t> most_memory_bytes;   // ulimit -v
  std::filesystem::path errors_to;                  // standard error goes there instead of Outcome::err
  std::filesystem::path output_to;                  // standard output goes there instead of Outcome::out
  double patience_s = 180.0;                        // the machine may be busy; a run that takes longer hangs
};

struct Outcome {
  int status = -1;  // exit status; -1 where a signal ended it
  int signal = 0;
  std::string out;
  std::string err;
  double seconds = 0.0;
  double peak_mib = 0.0;  // of resident memory
};

// A program that is running. Killed at the end of its scope, if it is still there.
class RunningProgram {
 public:
  // `words` is the command line, the program's path first.
  explicit RunningProgram(const std::vector<std::string>& words, const RunOptions& options = {});
  ~RunningProgram();
  RunningProgram(const RunningProgram&) = delete;
  RunningProgram& operator=(const RunningProgram&) = delete;

  // Whether standard error has come to hold `text` while the program is running.
  bool tells(const std::string& text);
  void send(int signal);
  // Waits for its end; one that does not come in time fails the test.
  Outcome wait();

 private:
  bool ended();

  RunOptions options_;
  pid_t process_ = -1;
  int out_ = -1;
  int err_ = -1;
  bool ended_ = false;
  double begin_s_ = 0.0;
  Outcome outcome_;
};

// sunfall with these arguments.
std::vector<std::string> sunfall_words(const std::vector<std::string>& arguments);
Outcome sunfall_run(const std::vector<std::string>& arguments, const RunOptions& options = {});

// Another program, which must succeed; its standard output.
std::string tool_output(const std::vector<std::string>& words);

}  // namespace sunfall::test
