#include "files.hpp"

#include <fcntl.h>
#include <fmt/format.h>
#include <sys/stat.h>
#include <unistd.h>

#include <array>
#include <cerrno>
#include <climits>
#include <cstdio>
#include <cstdlib>
#include <cstring>
#include <memory>
#include <utility>

#include "signals.hpp"

namespace steelyard::cli {

namespace {

// What the system says, in the words of this program; numbers are the same in every locale.
std::string reason(int error) {
  switch (error) {
    case ENOENT:
      return "there is no such file or folder";
    case EACCES:
    case EPERM:
      return "you have no permission";
    case EISDIR:
      return "it is a folder";
    case ENOTDIR:
      return "a part of its path is not a folder";
    case ENOSPC:
    case EDQUOT:
      return "no space is left on the device";
    case EROFS:
      return "the file system is read-only";
    case ENAMETOOLONG:
      return "the name is too long";
    case ELOOP:
      return "its symbolic links go round in a circle";
    case EFBIG:
      return "it would be larger than allowed";
    default:
      return fmt::format("the system says: {}", std::strerror(error));
  }
}

// Writes all bytes; 0 or the error.
int write_all(int descriptor, std::string_view bytes) {
  while (!bytes.empty()) {
    const ssize_t written = ::write(descriptor, bytes.data(), bytes.size());
    if (written < 0) {
      if (errno == EINTR) continue;
      return errno;
    }
    bytes.remove_prefix(static_cast<std::size_t>(written));
  }
  return 0;
}

// Reads to the end; 0 or the error.
int read_all(int descriptor, std::string& text) {
  struct stat status {};
  if (fstat(descriptor, &status) == 0 && S_ISREG(status.st_mode) && status.st_size > 0) {
    text.reserve(static_cast<std::size_t>(status.st_size) + 1);
  }
  std::array<char, 1 << 16> block{};
  for (;;) {
    const ssize_t got = ::read(descriptor, block.data(), block.size());
    if (got < 0 && errno == EINTR) continue;
    if (got < 0) return errno;
    if (got == 0) return 0;
    text.append(block.data(), static_cast<std::size_t>(got));
  }
}

std::string folder_of(const std::string& path) {
  const std::size_t slash = path.rfind('/');
  if (slash == std::string::npos) return ".";
  return slash == 0 ? "/" : path.substr(0, slash);
}

// The file that is meant, behind symbolic links; the name itself when it does not exist yet.
std::string behind_links(const std::string& name) {
  struct PathFree {
    void operator()(char* path) const { std::free(path); }
  };
  const std::unique_ptr<char, PathFree> real(realpath(name.c_str(), nullptr));
  return real ? std::string(real.get()) : name;
}

}  // namespace

FileText read_file(const std::string& name) {
  FileText file;
  const bool standard = name == "-";
  const std::string shown = standard ? "Standard input" : fmt::format("\"{}\"", name);
  const int descriptor = standard ? STDIN_FILENO : ::open(name.c_str(), O_RDONLY | O_CLOEXEC);
  if (descriptor < 0) {
    file.problem = fmt::format("{} can't be read: {}.", shown, reason(errno));
    return file;
  }
  struct stat status {};
  if (fstat(descriptor, &status) == 0 && S_ISDIR(status.st_mode)) {
    file.problem = fmt::format("{} is a folder. Give the name of a file, or - for standard input.", shown);
  } else if (const int error = read_all(descriptor, file.text); error != 0) {
    file.problem = fmt::format("{} can't be read: {}.", shown, reason(error));
  }
  if (!standard) ::close(descriptor);
  return file;
}

OutputFile::OutputFile(const std::string& name) : name_(name) {
  if (name_.empty()) return;
  if (name_ == "-") {
    descriptor_ = STDOUT_FILENO;
    return;
  }
  target_ = behind_links(name_);
  struct stat status {};
  const bool exists = stat(target_.c_str(), &status) == 0;
  if (exists && S_ISDIR(status.st_mode)) {
    fail("written", EISDIR);
  } else if (exists && !S_ISREG(status.st_mode)) {
    descriptor_ = ::open(target_.c_str(), O_WRONLY | O_CLOEXEC);
    if (descriptor_ < 0) fail("written", errno);
  } else if (exists && access(target_.c_str(), W_OK) != 0) {
    fail("written", errno);  // a file that was protected on purpose is not replaced
  } else {
    open_beside();
  }
}

void OutputFile::open_beside() {
  const std::size_t slash = target_.rfind('/');
  const std::string base = slash == std::string::npos ? target_ : target_.substr(slash + 1);
  if (base.empty()) return fail("written", EISDIR);
  for (int attempt = 0; attempt < 100; ++attempt) {
    const std::string name =
        fmt::format("{}/.{:.100}.{}-{}.part", folder_of(target_), base, static_cast<long>(getpid()), attempt);
    if (!remember_unfinished(name)) return fail("written", ENAMETOOLONG);
    descriptor_ = ::open(name.c_str(), O_WRONLY | O_CREAT | O_EXCL | O_CLOEXEC, 0666);
    if (descriptor_ >= 0) {
      temporary_ = name;
      return;
    }
    const int error = errno;
    forget_unfinished(name);
    if (error != EEXIST) return fail("written", error);
  }
  fail("written", EEXIST);
}

OutputFile::~OutputFile() {
  if (descriptor_ >= 0 && descriptor_ != STDOUT_FILENO) ::close(descriptor_);
  if (!temporary_.empty()) {
    ::unlink(temporary_.c_str());
    forget_unfinished(temporary_);
  }
}

void OutputFile::fail(const char* action, int error) {
  if (!problem_.empty()) return;
  problem_ = name_ == "-" ? fmt::format("Standard output can't be {}: {}.", action, reason(error))
                          : fmt::format("\"{}\" can't be {}: {}.", name_, action, reason(error));
}

void OutputFile::write(std::string_view bytes) {
  if (!problem_.empty() || descriptor_ < 0) return;
  const int error = write_all(descriptor_, bytes);
  if (error == EPIPE && name_ == "-") {
    descriptor_ = -1;  // the reader has seen enough
  } else if (error != 0) {
    fail("written", error);
  }
}

void OutputFile::commit() {
  if (!problem_.empty() || temporary_.empty()) return;
  struct stat status {};
  if (stat(target_.c_str(), &status) == 0) fchmod(descriptor_, status.st_mode & 07777);
  // Some file systems say only now that they are full.
  const int closed = ::close(std::exchange(descriptor_, -1));
  if (closed != 0) return fail("written", errno);
  if (std::rename(temporary_.c_str(), target_.c_str()) != 0) return fail("written", errno);
  forget_unfinished(temporary_);
  temporary_.clear();
}

std::string write_standard_output(std::string_view text) {
  OutputFile out("-");
  out.write(text);
  return out.problem();
}

bool same_file(const std::string& a, const std::string& b) {
  struct stat first {};
  struct stat second {};
  return stat(a.c_str(), &first) == 0 && stat(b.c_str(), &second) == 0 && first.st_dev == second.st_dev &&
         first.st_ino == second.st_ino;
}

}  // namespace steelyard::cli
