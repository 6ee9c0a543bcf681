// The same function for every index, on a few threads; results go where their index says.
#pragma once

#include <atomic>
#include <cstddef>
#include <thread>
#include <vector>

namespace steelyard::stressing {

/// Calls `work(i)` once for each i below `count`. `keep_going()` is asked before each; when it says no, what
/// is left is skipped. Returns whether all was done.
template <class Work, class KeepGoing>
bool for_each_index(std::size_t count, unsigned threads, Work work, KeepGoing keep_going) {
  std::atomic<std::size_t> next{0};
  std::atomic<bool> going{true};
  const auto run = [&] {
    for (std::size_t i = next++; i < count && going; i = next++) {
      if (!keep_going()) {
        going = false;
        return;
      }
      work(i);
    }
  };
  std::vector<std::jthread> others;
  for (unsigned t = 1; t < threads && t < count; ++t) others.emplace_back(run);
  run();
  others.clear();
  return going;
}

}  // namespace steelyard::stressing
