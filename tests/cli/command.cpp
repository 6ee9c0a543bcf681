#include "cli/command.hpp"

#include <fcntl.h>
#include <sys/wait.h>
#include <unistd.h>

#include <algorithm>
#include <cstdlib>
#include <filesystem>
#include <fstream>
#include <iterator>
#include <stdexcept>

namespace steelyard::test {

namespace {

namespace fs = std::filesystem;

std::vector<char*> pointers(std::vector<std::string>& words) {
  std::vector<char*> list;
  for (std::string& word : words) list.push_back(word.data());
  list.push_back(nullptr);
  return list;
}

void put_on(int descriptor, const std::string& path, int flags) {
  const int file = open(path.c_str(), flags, 0600);
  if (file < 0 || dup2(file, descriptor) < 0) _exit(126);
  close(file);
}

Ran run(std::vector<std::string> words, const Setting& setting) {
  const Folder folder;
  folder.file("in", setting.input);
  std::vector<std::string> environment = {"PATH=/usr/bin:/bin", "STEELYARD=" STEELYARD_COMMAND};
  for (const auto& [name, value] : setting.environment) environment.push_back(name + "=" + value);
  const std::string in = folder.path("in");
  const std::string out = folder.path("out");
  const std::string err = folder.path("err");
  const auto arguments = pointers(words);
  const auto variables = pointers(environment);

  const pid_t child = fork();
  if (child < 0) throw std::runtime_error("fork");
  if (child == 0) {
    put_on(STDIN_FILENO, in, O_RDONLY);
    put_on(STDOUT_FILENO, out, O_WRONLY | O_CREAT);
    put_on(STDERR_FILENO, err, O_WRONLY | O_CREAT);
    execve(arguments[0], arguments.data(), variables.data());
    _exit(127);
  }
  int status = 0;
  if (waitpid(child, &status, 0) != child) throw std::runtime_error("waitpid");
  Ran ran;
  ran.status = WIFEXITED(status) ? WEXITSTATUS(status) : 128 + WTERMSIG(status);
  ran.out = bytes_of(out);
  ran.err = bytes_of(err);
  return ran;
}

}  // namespace

Folder::Folder() {
  std::string form = (fs::temp_directory_path() / "steelyard-test-XXXXXX").string();
  if (mkdtemp(form.data()) == nullptr) throw std::runtime_error("mkdtemp");
  path_ = form;
}

Folder::~Folder() {
  std::error_code ignored;
  fs::remove_all(path_, ignored);
}

std::string Folder::file(const std::string& name, const std::string& bytes) const {
  std::ofstream(path(name), std::ios::binary) << bytes;
  return path(name);
}

std::string Folder::read(const std::string& name) const { return bytes_of(path(name)); }

std::vector<std::string> Folder::names() const {
  std::vector<std::string> found;
  for (const auto& entry : fs::directory_iterator(path_)) found.push_back(entry.path().filename().string());
  std::sort(found.begin(), found.end());
  return found;
}

Ran run_command(const std::vector<std::string>& arguments, const Setting& setting) {
  std::vector<std::string> words = {STEELYARD_COMMAND};
  words.insert(words.end(), arguments.begin(), arguments.end());
  return run(std::move(words), setting);
}

Ran shell(const std::string& line, const Setting& setting) { return run({"/bin/sh", "-c", line}, setting); }

std::string bytes_of(const std::string& path) {
  std::ifstream file(path, std::ios::binary);
  return {std::istreambuf_iterator<char>(file), {}};
}

std::string dataset(const std::string& name) { return std::string(STEELYARD_DATASETS_DIR "/") + name; }

}  // namespace steelyard::test
