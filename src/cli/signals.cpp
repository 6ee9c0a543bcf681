#include "signals.hpp"

#include <unistd.h>

#include <array>
#include <atomic>
#include <csignal>
#include <cstddef>
#include <cstring>

#include "files.hpp"

namespace steelyard::cli {

namespace {

// Fixed memory: a signal handler may touch nothing else.
struct Slot {
  std::atomic<bool> used = false;
  std::array<char, 4096> name{};
};
std::array<Slot, 8> slots;
static_assert(std::atomic<bool>::is_always_lock_free);

void remove_and_end(int signal) {
  for (Slot& slot : slots) {
    if (slot.used.load()) unlink(slot.name.data());
  }
  std::signal(signal, SIG_DFL);
  std::raise(signal);
}

}  // namespace

bool remember_unfinished(const std::string& name) {
  for (Slot& slot : slots) {
    if (slot.used.load() || name.size() >= slot.name.size()) continue;
    std::memcpy(slot.name.data(), name.c_str(), name.size() + 1);
    slot.used.store(true);
    return true;
  }
  return false;
}

void forget_unfinished(const std::string& name) {
  for (Slot& slot : slots) {
    if (slot.used.load() && name == slot.name.data()) slot.used.store(false);
  }
}

void watch_signals() {
  struct sigaction action {};
  action.sa_handler = remove_and_end;
  sigemptyset(&action.sa_mask);
  for (const int signal : {SIGINT, SIGTERM, SIGHUP, SIGXFSZ}) {
    struct sigaction before {};
    sigaction(signal, nullptr, &before);
    if (before.sa_handler != SIG_IGN) sigaction(signal, &action, nullptr);  // nohup stays in force
  }
  std::signal(SIGPIPE, SIG_IGN);
}

}  // namespace steelyard::cli
