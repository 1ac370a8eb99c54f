#include "app/run_program.h"

#include <fcntl.h>
#include <gtest/gtest.h>
#include <sys/mman.h>
#include <sys/resource.h>
#include <sys/wait.h>
#include <unistd.h>

#include <chrono>
#include <csignal>
#include <stdexcept>
#include <thread>

namespace sunfall::test {
namespace {

constexpr auto kBetweenLooks = std::chrono::milliseconds(5);

double now_s() {
  return std::chrono::duration<double>(std::chrono::steady_clock::now().time_since_epoch()).count();
}

// A file without a name, which the program writes and the test reads.
int nameless_file() {
  const int descriptor = memfd_create("sunfall-test", MFD_CLOEXEC);
  if (descriptor < 0) throw std::runtime_error("no nameless file");
  return descriptor;
}

std::string content_of_descriptor(int descriptor) {
  std::string content;
  char piece[4096];
  for (;;) {
    const ssize_t count = pread(descriptor, piece, sizeof piece, static_cast<off_t>(content.size()));
    if (count <= 0) return content;
    content.append(piece, static_cast<std::size_t>(count));
  }
}

void limit(decltype(RLIMIT_FSIZE) what, const std::optional<std::uint64_t>& bytes) {
  if (!bytes) return;
  const rlimit value{*bytes, *bytes};
  if (setrlimit(what, &value) != 0) _exit(126);
}

}  // namespace

RunningProgram::RunningProgram(const std::vector<std::string>& words, const RunOptions& options)
    : options_(options), out_(nameless_file()), err_(nameless_file()), begin_s_(now_s()) {
  std::vector<char*> arguments;
  for (const std::string& word : words) arguments.push_back(const_cast<char*>(word.c_str()));
  arguments.push_back(nullptr);
  process_ = fork();
  if (process_ < 0) throw std::runtime_error("no fork");
  if (process_ > 0) return;
  if (!options.folder.empty() && chdir(options.folder.c_str()) != 0) _exit(126);
  const int out = options.output_to.empty() ? out_ : open(options.output_to.c_str(), O_WRONLY);
  const int err = options.errors_to.empty() ? err_ : open(options.errors_to.c_str(), O_WRONLY);
  const int in = open("/dev/null", O_RDONLY);
  if (dup2(in, 0) < 0 || dup2(out, 1) < 0 || dup2(err, 2) < 0) _exit(126);
  limit(RLIMIT_FSIZE, options.largest_file_bytes);
  limit(RLIMIT_AS, options.most_memory_bytes);
  execvp(arguments[0], arguments.data());
  _exit(127);
}

RunningProgram::~RunningProgram() {
  if (!ended_) {
    kill(process_, SIGKILL);
    waitpid(process_, nullptr, 0);
  }
  close(out_);
  close(err_);
}

bool RunningProgram::ended() {
  if (ended_) return true;
  int state = 0;
  rusage used{};
  if (wait4(process_, &state, WNOHANG, &used) != process_) return false;
  ended_ = true;
  if (WIFEXITED(state)) outcome_.status = WEXITSTATUS(state);
  if (WIFSIGNALED(state)) outcome_.signal = WTERMSIG(state);
  outcome_.seconds = now_s() - begin_s_;
  outcome_.peak_mib = static_cast<double>(used.ru_maxrss) / 1024.0;
  return true;
}

bool RunningProgram::tells(const std::string& text) {
  while (now_s() - begin_s_ < options_.patience_s) {
    const bool last_look = ended();
    if (content_of_descriptor(err_).find(text) != std::string::npos) return !last_look;
    if (last_look) return false;
    std::this_thread::sleep_for(kBetweenLooks);
  }
  return false;
}

void RunningProgram::send(int signal) { kill(process_, signal); }

Outcome RunningProgram::wait() {
  while (!ended() && now_s() - begin_s_ < options_.patience_s) std::this_thread::sleep_for(kBetweenLooks);
  if (!ended_) ADD_FAILURE() << "the program does not end";
  outcome_.out = content_of_descriptor(out_);
  outcome_.err = content_of_descriptor(err_);
  return outcome_;
}

std::vector<std::string> sunfall_words(const std::vector<std::string>& arguments) {
  std::vector<std::string> words{SUNFALL_PROGRAM};
  words.insert(words.end(), arguments.begin(), arguments.end());
  return words;
}

Outcome sunfall_run(const std::vector<std::string>& arguments, const RunOptions& options) {
  return RunningProgram(sunfall_words(arguments), options).wait();
}

std::string tool_output(const std::vector<std::string>& words) {
  const Outcome outcome = RunningProgram(words).wait();
  EXPECT_EQ(outcome.status, 0) << words.front() << ": " << outcome.err;
  return outcome.out;
}

}  // namespace sunfall::test
