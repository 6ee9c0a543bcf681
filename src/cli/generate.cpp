// Not installed: writes what is made from the tables at build time (man pages and completions), and
// with --docs what is kept in the tree and checked by the tests (schemas and reference pages).
#include <fmt/format.h>
#include <filesystem>
#include <fstream>
#include <iostream>
#include <string>

#include "manual.hpp"
#include "reference.hpp"
#include "steelyard/json.hpp"

namespace {

using namespace steelyard;
namespace fs = std::filesystem;

void write(const fs::path& path, const std::string& text) {
  fs::create_directories(path.parent_path());
  std::ofstream(path, std::ios::binary) << text;
}

void write_native(const fs::path& folder) {
  write(folder / "man" / "steelyard.1", cli::manual());
  for (const cli::CommandInfo& command : cli::command_table()) {
    write(folder / "man" / fmt::format("steelyard-{}.1", command.name), cli::manual(command));
  }
  write(folder / "bash" / "steelyard", cli::bash_completion());
  write(folder / "zsh" / "_steelyard", cli::zsh_completion());
  write(folder / "fish" / "steelyard.fish", cli::fish_completion());
}

}  // namespace

int main(int argc, char** argv) {
  const std::string first = argc > 1 ? argv[1] : "";
  if (argc == 3 && first == "--docs") {
    for (const cli::Page& page : cli::reference_pages()) write(fs::path(argv[2]) / page.path, page.text);
    return 0;
  }
  if (argc == 2) {
    write_native(first);
    return 0;
  }
  std::cerr << "usage: steelyard_generate FOLDER | steelyard_generate --docs DOCS\n";
  return 2;
}
