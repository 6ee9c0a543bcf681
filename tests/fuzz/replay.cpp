// Feeds every file of the corpus to every fuzz target, so that whatever once crashed is tried for ever.
#include <algorithm>
#include <cstddef>
#include <cstdint>
#include <cstdio>
#include <filesystem>
#include <fstream>
#include <iterator>
#include <vector>

#define STEELYARD_FUZZ_TARGET(name) extern "C" int fuzz_##name(const std::uint8_t* data, std::size_t size);
#include "fuzz_targets.inc"
#undef STEELYARD_FUZZ_TARGET

namespace {

struct Target {
  const char* name;
  int (*run)(const std::uint8_t* data, std::size_t size);
};

constexpr Target targets[] = {
#define STEELYARD_FUZZ_TARGET(name) {#name, fuzz_##name},
#include "fuzz_targets.inc"
#undef STEELYARD_FUZZ_TARGET
};

std::vector<std::filesystem::path> files_below(const std::filesystem::path& folder) {
  std::vector<std::filesystem::path> files;
  for (const auto& entry : std::filesystem::recursive_directory_iterator(folder)) {
    if (entry.is_regular_file()) files.push_back(entry.path());
  }
  std::sort(files.begin(), files.end());
  return files;
}

}  // namespace

int main(int argc, char** argv) {
  if (argc != 2) return 2;
  const auto files = files_below(argv[1]);
  for (const auto& file : files) {
    std::ifstream stream(file, std::ios::binary);
    const std::vector<char> bytes{std::istreambuf_iterator<char>(stream), {}};
    for (const Target& target : targets) {
      std::printf("%s < %s\n", target.name, file.c_str());
      std::fflush(stdout);  // the last line names the culprit
      target.run(reinterpret_cast<const std::uint8_t*>(bytes.data()), bytes.size());
    }
  }
  std::printf("%zu files, %zu targets\n", files.size(), std::size(targets));
  return files.empty() ? 1 : 0;
}
