// SPDX-License-Identifier: Apache-2.0
// What a result may be written to, and the words where it may not.
#include <fcntl.h>
#include <sys/file.h>
#include <sys/socket.h>
#include <sys/stat.h>
#include <sys/un.h>
#include <sys/wait.h>
#include <unistd.h>

#include <catch2/catch.hpp>
#include <cstring>
#include <functional>

#include "small_answer.hpp"
#include "support/scratch_folder.hpp"

using namespace wellwright;
namespace fs = std::filesystem;
using Catch::Matchers::Contains;
using support::bytes_of;
using support::put;
using support::ScratchFolder;

namespace {

// What check_target says; empty where it has nothing against the name.
std::string words_of(const std::string& path) {
  try {
    check_target(path);
    return "";
  } catch (const FileTrouble& trouble) {
    return trouble.what();
  }
}

// The words for a user without rights of its own: root may read everything, so a child steps down.
std::string words_for_others(const std::string& path) {
  if (geteuid() != 0) return words_of(path);
  constexpr unsigned nobody = 65534;
  int ends[2];
  REQUIRE(pipe(ends) == 0);
  const pid_t child = fork();
  if (child == 0) {
    std::string words = "cannot step down";
    if (setgid(nobody) == 0 && setuid(nobody) == 0) words = words_of(path);
    const ssize_t written = write(ends[1], words.data(), words.size());
    _exit(written < 0);
  }
  close(ends[1]);
  std::string words;
  char part[256];
  for (ssize_t n = 0; (n = read(ends[0], part, sizeof part)) > 0;)
    words.append(part, static_cast<std::size_t>(n));
  close(ends[0]);
  waitpid(child, nullptr, 0);
  return words;
}

const Answer& answered() {
  static const Answer one = small_answer();
  return one;
}

}  // namespace

TEST_CASE("A name that is free, or a result of ours, is taken") {
  const ScratchFolder folder;
  CHECK(words_of(folder / "out.h5") == "");
  write_result(answered(), folder / "out.h5");
  CHECK(words_of(folder / "out.h5") == "");
  CHECK(folder.names() == std::vector<std::string>{"out.h5"});
}

TEST_CASE("Folders, pipes, devices and sockets are refused by their kind, and never waited for") {
  const ScratchFolder folder;
  fs::create_directory(folder / "kept");
  REQUIRE(mkfifo((folder / "pipe").c_str(), 0600) == 0);
  const int socket_file = socket(AF_UNIX, SOCK_STREAM, 0);
  sockaddr_un address{};
  address.sun_family = AF_UNIX;
  std::strncpy(address.sun_path, (folder / "socket").c_str(), sizeof address.sun_path - 1);
  REQUIRE(bind(socket_file, reinterpret_cast<const sockaddr*>(&address), sizeof address) == 0);
  close(socket_file);
  fs::create_symlink("pipe", folder / "link to pipe");
  const std::pair<std::string, std::string> cases[] = {{folder / "kept", "a folder"},
                                                       {folder / "pipe", "a named pipe"},
                                                       {folder / "link to pipe", "a named pipe"},
                                                       {"/dev/null", "a device"},
                                                       {folder / "socket", "a socket"}};
  for (const auto& [path, kind] : cases) CHECK(words_of(path) == path + ": this is " + kind);
  CHECK_THROWS_AS(write_result(answered(), folder / "pipe"), FileTrouble);
}

TEST_CASE("Writing to a symbolic link writes the file it points at and keeps the link") {
  const ScratchFolder folder;
  fs::create_directory(folder / "store");
  fs::create_symlink("store/out.h5", folder / "second");
  fs::create_symlink("second", folder / "first");
  write_result(answered(), folder / "first");  // the file is not there yet
  CHECK(fs::is_symlink(folder / "first"));
  CHECK(fs::is_symlink(folder / "second"));
  REQUIRE(fs::is_regular_file(folder / "store/out.h5"));
  const std::string before = bytes_of(folder / "store/out.h5");
  write_result(small_answer(two_levels_move), folder / "first");  // and now it is
  CHECK(fs::is_symlink(folder / "first"));
  CHECK(bytes_of(folder / "store/out.h5").size() > before.size());

  put(folder / "notes", "keep me");
  fs::create_symlink("notes", folder / "to notes");
  CHECK_THAT(words_of(folder / "to notes"), Contains("to notes: this file was not written by wellwright"));
  fs::create_symlink("circle", folder / "circle");
  CHECK_THAT(words_of(folder / "circle"), Contains("circle: its symbolic links lead nowhere"));
  fs::create_symlink("nowhere/out.h5", folder / "astray");
  CHECK_THAT(words_of(folder / "astray"), Contains("astray: there is no folder"));
}

TEST_CASE("A file that is not ours is left as it is") {
  const ScratchFolder folder;
  for (const std::string content : {"", "measured by hand", "\x89HDF"}) {
    put(folder / "notes.h5", content);
    CHECK_THAT(words_of(folder / "notes.h5"), Contains("not written by wellwright"));
    CHECK(bytes_of(folder / "notes.h5") == content);
  }
}

TEST_CASE("A result that is damaged is said to be damaged") {
  const ScratchFolder folder;
  write_result(answered(), folder / "out.h5");
  const std::string whole = bytes_of(folder / "out.h5");
  // Cut short, and with the text of its attributes overwritten: the superblock still tells what it was.
  std::string scratched = whole;
  for (std::size_t at = scratched.find("wellwright result"); at != std::string::npos;
       at = scratched.find("wellwright result"))
    scratched.replace(at, 17, 17, '#');
  std::string heapless = whole;  // global heaps hold the texts
  for (std::size_t at = heapless.find("GCOL"); at != std::string::npos; at = heapless.find("GCOL"))
    heapless.replace(at, 4, "gone");
  for (const std::string& content : {whole.substr(0, whole.size() / 2), whole.substr(0, 60), heapless}) {
    put(folder / "out.h5", content);
    CHECK_THAT(words_of(folder / "out.h5"), Contains("the HDF5 file there is damaged"));
    CHECK_THROWS_AS(write_result(answered(), folder / "out.h5"), FileTrouble);
    CHECK(bytes_of(folder / "out.h5") == content);
  }
  put(folder / "out.h5", scratched);
  CHECK_THAT(words_of(folder / "out.h5"), Contains("not written by wellwright"));
}

TEST_CASE("A result that may not be read, not be written or is being written is refused in those words") {
  const ScratchFolder folder;
  const std::string out = folder / "out.h5";
  write_result(answered(), out);
  fs::permissions(fs::path(out).parent_path(), fs::perms::all);
  chmod(out.c_str(), 0222);
  CHECK_THAT(words_for_others(out), Contains("cannot be read") && Contains("Permission denied"));
  chmod(out.c_str(), 0444);
  CHECK_THAT(words_for_others(out), Contains("cannot be written to: Permission denied"));
  chmod(out.c_str(), 0644);
  const int writer = open(out.c_str(), O_RDWR);
  REQUIRE(flock(writer, LOCK_EX) == 0);
  CHECK_THAT(words_of(out), Contains("another program is writing this file"));
  close(writer);
  CHECK(words_of(out) == "");
}

TEST_CASE("A result that is replaced keeps who may read it") {
  const ScratchFolder folder;
  write_result(answered(), folder / "out.h5");
  chmod((folder / "out.h5").c_str(), 0600);
  write_result(answered(), folder / "out.h5");
  CHECK(fs::status(folder / "out.h5").permissions() == (fs::perms::owner_read | fs::perms::owner_write));
}
