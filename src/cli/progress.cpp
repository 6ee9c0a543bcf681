#include "progress.hpp"

#include <fmt/format.h>
#include <unistd.h>

#include <chrono>
#include <condition_variable>
#include <mutex>
#include <string_view>
#include <thread>
#include <utility>

namespace steelyard::cli {

namespace {

void show(std::string_view text) {
  if (::write(STDERR_FILENO, text.data(), text.size()) < 0) return;  // a lost line of progress is no loss
}

}  // namespace

struct Progress::Watch {
  std::mutex mutex;
  std::condition_variable ended;
  bool end = false;
  std::thread thread;

  void run(const std::string& what) {
    std::unique_lock lock(mutex);
    bool shown = false;
    for (int seconds = 1; !ended.wait_for(lock, std::chrono::seconds(1), [this] { return end; }); ++seconds) {
      show(fmt::format("\r{}: {} s ", what, seconds));
      shown = true;
    }
    if (shown) show("\r" + std::string(what.size() + 12, ' ') + "\r");
  }
};

Progress::Progress(std::string what) {
  if (isatty(STDERR_FILENO) == 0) return;
  watch_ = std::make_unique<Watch>();
  watch_->thread = std::thread([watch = watch_.get(), what = std::move(what)] { watch->run(what); });
}

Progress::~Progress() {
  if (!watch_) return;
  {
    const std::lock_guard lock(watch_->mutex);
    watch_->end = true;
  }
  watch_->ended.notify_one();
  watch_->thread.join();
}

}  // namespace steelyard::cli
