// Whole files: what is left behind, what is preserved, and which exit code a failure leads to.
#include "compiler/base/files.hpp"

#include <doctest/doctest.h>
#include <fcntl.h>
#include <sys/resource.h>
#include <sys/stat.h>
#include <sys/wait.h>
#include <unistd.h>

#include <csignal>
#include <filesystem>
#include <fstream>
#include <iterator>
#include <string>
#include <thread>

using namespace farrier;
using namespace farrier::base;
namespace fs = std::filesystem;

namespace {

struct Folder {
  Folder() {
    std::string name = (fs::temp_directory_path() / "farrier-files-XXXXXX").string();
    REQUIRE(::mkdtemp(name.data()) != nullptr);
    path = name;
  }
  Folder(const Folder&) = delete;
  Folder& operator=(const Folder&) = delete;
  ~Folder() { fs::remove_all(path); }
  [[nodiscard]] std::string operator/(const std::string& name) const {
    return (path / name).string();
  }
  [[nodiscard]] std::ptrdiff_t entries() const {
    return std::distance(fs::directory_iterator(path), fs::directory_iterator());
  }
  fs::path path;
};

template <typename Action>
int exit_code(const Action& action) {
  try {
    action();
  } catch (const UserError& error) {
    return static_cast<int>(error.code());
  }
  return 0;
}

void plant(const std::string& path, const std::string& content) {
  std::ofstream(path, std::ios::binary) << content;
}

}  // namespace

TEST_CASE("files come back as they were written") {
  const Folder folder;
  std::string content("line\r\n\0tail", 11);
  content += std::string(200'000, 'x');
  write_file(folder / "a", content);
  CHECK(read_file(folder / "a") == content);
  write_file(folder / "a", "");
  CHECK(read_file(folder / "a").empty());
  CHECK(folder.entries() == 1);
}

TEST_CASE("files that do not open are no input") {
  const Folder folder;
  CHECK(exit_code([&] { read_file(folder / "absent"); }) == 66);
  CHECK(exit_code([&] { read_file(folder.path.string()); }) == 66);
  try {
    read_file(folder / "absent");
  } catch (const UserError& error) {
    CHECK(error.diagnostics().at(0).file == folder / "absent");
    CHECK(std::string(error.what()) == "cannot be opened: No such file or directory");
  }
}

TEST_CASE("files in the kernel that report no size are read to their end") {
  CHECK(read_file("/proc/self/status").find("Name:") == 0);
}

TEST_CASE("a new file has the mode that the umask leaves") {
  const Folder folder;
  const mode_t former = ::umask(027);
  write_file(folder / "a", "x");
  ::umask(former);
  struct stat facts {};
  REQUIRE(::stat((folder / "a").c_str(), &facts) == 0);
  CHECK((facts.st_mode & 07777U) == 0640U);
}

TEST_CASE("an existing file keeps its mode") {
  const Folder folder;
  plant(folder / "a", "old");
  REQUIRE(::chmod((folder / "a").c_str(), 0751) == 0);
  write_file(folder / "a", "new");
  struct stat facts {};
  REQUIRE(::stat((folder / "a").c_str(), &facts) == 0);
  CHECK((facts.st_mode & 07777U) == 0751U);
  CHECK(read_file(folder / "a") == "new");
}

TEST_CASE("symbolic links are followed and stay links") {
  const Folder folder;
  fs::create_directory(folder.path / "deep");
  plant(folder / "deep/target", "old");
  fs::create_symlink("deep/target", folder / "link");
  fs::create_symlink(folder / "link", folder / "outer");
  write_file(folder / "outer", "new");
  CHECK(fs::is_symlink(folder / "outer"));
  CHECK(fs::is_symlink(folder / "link"));
  CHECK(read_file(folder / "deep/target") == "new");
  fs::create_symlink("deep/fresh", folder / "dangling");
  write_file(folder / "dangling", "made");
  CHECK(fs::is_symlink(folder / "dangling"));
  CHECK(read_file(folder / "deep/fresh") == "made");
}

TEST_CASE("outputs that cannot be created say so and leave nothing") {
  const Folder folder;
  CHECK(exit_code([&] { write_file(folder / "no/such/folder", "x"); }) == 73);
  CHECK(exit_code([&] { write_file(folder.path.string(), "x"); }) == 73);
  CHECK(exit_code([&] { write_file("", "x"); }) == 73);
  CHECK(exit_code([&] { write_file(folder / std::string(300, 'n'), "x"); }) == 73);
  fs::create_symlink("loop", folder / "loop");
  CHECK(exit_code([&] { write_file(folder / "loop", "x"); }) == 73);
  CHECK(folder.entries() == 1);
}

TEST_CASE("a full device is a failed write") {
  CHECK(exit_code([] { write_file("/dev/full", "x"); }) == 74);
  CHECK(exit_code([] { write_file("/dev/null", "x"); }) == 0);
  CHECK(fs::is_character_file("/dev/null"));
}

TEST_CASE("a write that fails half way keeps the old content and leaves nothing") {
  const Folder folder;
  plant(folder / "a", "old");
  struct rlimit former {};
  REQUIRE(::getrlimit(RLIMIT_FSIZE, &former) == 0);
  const auto handler = std::signal(SIGXFSZ, SIG_IGN);
  struct rlimit small = former;
  small.rlim_cur = 100'000;
  REQUIRE(::setrlimit(RLIMIT_FSIZE, &small) == 0);
  const int code = exit_code([&] { write_file(folder / "a", std::string(1'000'000, 'x')); });
  REQUIRE(::setrlimit(RLIMIT_FSIZE, &former) == 0);
  std::signal(SIGXFSZ, handler);
  CHECK(code == 74);
  CHECK(read_file(folder / "a") == "old");
  CHECK(folder.entries() == 1);
}

TEST_CASE("a FIFO is written directly") {
  const Folder folder;
  const std::string pipe = folder / "pipe";
  REQUIRE(::mkfifo(pipe.c_str(), 0600) == 0);
  const std::string content(300'000, 'y');
  std::string got;
  std::thread reader([&] { got = read_file(pipe); });
  write_file(pipe, content);
  reader.join();
  CHECK(got == content);
  CHECK(fs::is_fifo(pipe));
}

TEST_CASE("discarding with nothing to discard does nothing") {
  const Folder folder;
  write_file(folder / "a", "x");
  discard_temporary();
  CHECK(read_file(folder / "a") == "x");
}

TEST_CASE("a signal handler can remove the temporary") {
  const Folder folder;
  const std::string path = folder / "a";
  const std::string content(1'000'000, 'x');
  const pid_t child = ::fork();
  REQUIRE(child >= 0);
  if (child == 0) {
    std::signal(SIGXFSZ, [](int) {
      discard_temporary();
      ::_exit(7);
    });
    struct rlimit small {};
    small.rlim_cur = 100'000;
    small.rlim_max = 100'000;
    ::setrlimit(RLIMIT_FSIZE, &small);
    try {
      write_file(path, content);
    } catch (const UserError&) {
    }
    ::_exit(0);
  }
  int status = 0;
  REQUIRE(::waitpid(child, &status, 0) == child);
  CHECK(WEXITSTATUS(status) == 7);
  CHECK(folder.entries() == 0);
}
