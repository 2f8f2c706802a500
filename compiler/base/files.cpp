// Whole files by POSIX calls: what fails is known by its errno, and nothing is left behind.
#include "compiler/base/files.hpp"

#include <fcntl.h>
#include <sys/stat.h>
#include <unistd.h>

#include <algorithm>
#include <array>
#include <atomic>
#include <cerrno>
#include <climits>
#include <cstddef>
#include <string>
#include <system_error>

namespace farrier::base {
namespace {

/// The path of the temporary, where a signal handler can read it.
std::array<char, PATH_MAX> temporary_path{};
std::atomic<bool> temporary_exists{false};
static_assert(std::atomic<bool>::is_always_lock_free);

[[noreturn]] void fail(ExitCode code, const std::string& path, const std::string& what, int error) {
  Diagnostic diagnostic;
  diagnostic.file = path;
  diagnostic.message = what + ": " + std::generic_category().message(error);
  throw UserError(code, diagnostic);
}

/// A descriptor that is closed on every way out; close() reports what the kernel says.
class Descriptor {
 public:
  explicit Descriptor(int number) : number_(number) {}
  Descriptor(const Descriptor&) = delete;
  Descriptor& operator=(const Descriptor&) = delete;
  ~Descriptor() {
    if (number_ >= 0) ::close(number_);
  }

  [[nodiscard]] int number() const { return number_; }
  [[nodiscard]] bool close() {
    const int number = number_;
    number_ = -1;
    // Linux has released the descriptor even where a signal came in between.
    return ::close(number) == 0 || errno == EINTR;
  }

 private:
  int number_;
};

int open_again(const char* path, int flags, mode_t mode = 0) {
  int number = -1;
  do {
    number = ::open(path, flags | O_CLOEXEC, mode);
  } while (number < 0 && errno == EINTR);
  return number;
}

std::string read_descriptor(int number, const std::string& name) {
  struct stat facts {};
  if (::fstat(number, &facts) != 0) fail(ExitCode::no_input, name, "cannot be opened", errno);
  if (S_ISDIR(facts.st_mode)) fail(ExitCode::no_input, name, "cannot be opened", EISDIR);
  constexpr std::size_t least = 65536;
  std::string content;
  std::size_t filled = 0;
  std::size_t room = facts.st_size > 0 ? static_cast<std::size_t>(facts.st_size) + 1 : least;
  while (true) {
    if (filled == content.size()) content.resize(filled + std::max(room, filled / 2));
    room = least;
    const ssize_t got = ::read(number, content.data() + filled, content.size() - filled);
    if (got < 0 && errno == EINTR) continue;
    if (got < 0) fail(ExitCode::io_failed, name, "cannot be read", errno);
    if (got == 0) break;
    filled += static_cast<std::size_t>(got);
  }
  content.resize(filled);
  return content;
}

/// 0, or the errno of the failure.
int write_descriptor(int number, std::string_view content) {
  while (!content.empty()) {
    const ssize_t done = ::write(number, content.data(), content.size());
    if (done < 0 && errno == EINTR) continue;
    if (done < 0) return errno;
    content.remove_prefix(static_cast<std::size_t>(done));
  }
  return 0;
}

void write_direct(const std::string& path, std::string_view content) {
  Descriptor file(open_again(path.c_str(), O_WRONLY | O_NOCTTY));
  if (file.number() < 0) fail(ExitCode::cannot_create, path, "cannot be opened to write", errno);
  if (const int error = write_descriptor(file.number(), content); error != 0) {
    fail(ExitCode::io_failed, path, "cannot be written", error);
  }
  if (!file.close()) fail(ExitCode::io_failed, path, "cannot be written", errno);
}

/// The name behind a chain of symbolic links, the last of which may name a file that is yet to be.
std::string follow_links(const std::string& path) {
  std::string target = path;
  for (int hops = 0; hops < 40; ++hops) {
    std::array<char, PATH_MAX> link{};
    const ssize_t length = ::readlink(target.c_str(), link.data(), link.size());
    if (length < 0) return target;
    const std::string next(link.data(), static_cast<std::size_t>(length));
    const std::size_t slash = target.rfind('/');
    const bool relative = next.empty() || next.front() != '/';
    target = relative && slash != std::string::npos ? target.substr(0, slash + 1) + next : next;
  }
  fail(ExitCode::cannot_create, path, "cannot be created", ELOOP);
}

/// Creates a new file beside `target` and makes it known to discard_temporary().
int create_neighbour(const std::string& target, const std::string& path) {
  const std::size_t slash = target.rfind('/');
  const std::string folder = slash == std::string::npos ? "" : target.substr(0, slash + 1);
  const std::string stem = folder + ".farrier-" + std::to_string(::getpid()) + "-";
  int error = EEXIST;
  for (unsigned k = 0; k < 1000 && error == EEXIST; ++k) {
    const std::string name = stem + std::to_string(k) + ".tmp";
    if (name.size() >= temporary_path.size()) {
      fail(ExitCode::cannot_create, path, "cannot be created", ENAMETOOLONG);
    }
    *std::copy(name.begin(), name.end(), temporary_path.begin()) = '\0';
    // Known before it exists, so that a signal in between leaves nothing behind either.
    temporary_exists = true;
    const int number = open_again(name.c_str(), O_WRONLY | O_CREAT | O_EXCL, 0666);
    if (number >= 0) return number;
    error = errno;
    temporary_exists = false;
  }
  fail(ExitCode::cannot_create, path, "cannot be created", error);
}

void write_replacing(const std::string& path, const std::string& target, std::string_view content,
                     const struct stat* former) {
  struct Guard {
    ~Guard() { discard_temporary(); }
  } guard;
  Descriptor file(create_neighbour(target, path));
  if (former != nullptr && ::fchmod(file.number(), former->st_mode & 07777U) != 0) {
    fail(ExitCode::cannot_create, path, "cannot be created", errno);
  }
  if (const int error = write_descriptor(file.number(), content); error != 0) {
    fail(ExitCode::io_failed, path, "cannot be written", error);
  }
  if (!file.close()) fail(ExitCode::io_failed, path, "cannot be written", errno);
  if (::rename(temporary_path.data(), target.c_str()) != 0) {
    fail(ExitCode::cannot_create, path, "cannot be created", errno);
  }
  temporary_exists = false;
}

}  // namespace

std::string read_file(const std::string& path) {
  if (path == "-") return read_descriptor(STDIN_FILENO, "<standard input>");
  const Descriptor file(open_again(path.c_str(), O_RDONLY | O_NOCTTY));
  if (file.number() < 0) fail(ExitCode::no_input, path, "cannot be opened", errno);
  return read_descriptor(file.number(), path);
}

void write_file(const std::string& path, std::string_view content) {
  if (path == "-" || path == "/dev/stdout") {
    if (const int error = write_descriptor(STDOUT_FILENO, content); error != 0) {
      fail(ExitCode::io_failed, "<standard output>", "cannot be written", error);
    }
    return;
  }
  struct stat facts {};
  const bool exists = ::stat(path.c_str(), &facts) == 0;
  if (exists && S_ISDIR(facts.st_mode)) {
    fail(ExitCode::cannot_create, path, "cannot be created", EISDIR);
  }
  if (exists && !S_ISREG(facts.st_mode)) return write_direct(path, content);
  // A rename would replace a read-only file without asking.
  if (exists && ::faccessat(AT_FDCWD, path.c_str(), W_OK, AT_EACCESS) != 0) {
    fail(ExitCode::cannot_create, path, "cannot be opened to write", errno);
  }
  write_replacing(path, follow_links(path), content, exists ? &facts : nullptr);
}

void discard_temporary() noexcept {
  if (!temporary_exists.exchange(false)) return;
  const int error = errno;
  ::unlink(temporary_path.data());
  errno = error;
}

}  // namespace farrier::base
