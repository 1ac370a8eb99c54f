#include "app/interrupt.h"

#include <unistd.h>

#include <csignal>
#include <initializer_list>

namespace sunfall {
namespace {

volatile std::sig_atomic_t asked_to_stop = 0;

extern "C" void on_signal(int) {
  if (asked_to_stop != 0) _exit(5);
  asked_to_stop = 1;
}

}  // namespace

void watch_for_interrupts() {
  struct sigaction action {};
  action.sa_handler = on_signal;
  sigemptyset(&action.sa_mask);
  for (const int number : {SIGINT, SIGTERM, SIGHUP}) {
    struct sigaction former {};
    sigaction(number, nullptr, &former);
    // Under nohup, or in the background of a script, the signal is not for us.
    if (former.sa_handler != SIG_IGN) sigaction(number, &action, nullptr);
  }
  // A file-size limit and a closed pipe must come back as errors of the write, not end the process.
  std::signal(SIGXFSZ, SIG_IGN);
  std::signal(SIGPIPE, SIG_IGN);
}

bool interrupted() { return asked_to_stop != 0; }

}  // namespace sunfall
