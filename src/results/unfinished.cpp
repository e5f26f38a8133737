// SPDX-License-Identifier: Apache-2.0
// Written whole under another name, synced, renamed: a full disk or a kill leaves the old file whole.
#include "results/unfinished.hpp"

#include <fcntl.h>
#include <fmt/format.h>
#include <sys/stat.h>
#include <unistd.h>

#include <cerrno>
#include <cstring>

#include "wellwright/diagnostics.hpp"

namespace wellwright {
namespace {

// What the new file may be read by: as the old one, else as the user's mask says.
mode_t mode_for(const std::filesystem::path& target) {
  struct stat old {};
  if (::stat(target.c_str(), &old) == 0) return old.st_mode & 0777;
  const mode_t mask = umask(0);
  umask(mask);
  return 0666 & ~mask;
}

}  // namespace

Unfinished::Unfinished(const std::filesystem::path& target, std::string shown)
    : target_(target), shown_(std::move(shown)), name_(target.string() + ".unfinished-XXXXXX") {
  file_ = mkostemp(name_.data(), O_CLOEXEC);
  if (file_ < 0) fail("cannot be written");
  fchmod(file_, mode_for(target_));
}

Unfinished::~Unfinished() {
  if (file_ >= 0) ::close(file_);
  if (!done_) ::unlink(name_.c_str());
}

void Unfinished::fail(const char* what) const {
  throw FileTrouble(fmt::format("{}: {}: {}", shown_, what, std::strerror(errno)));
}

void Unfinished::write(std::string_view text) {
  while (!text.empty()) {
    const ssize_t written = ::write(file_, text.data(), text.size());
    if (written < 0 && errno == EINTR) continue;
    if (written < 0) fail("cannot be written");
    text.remove_prefix(static_cast<std::size_t>(written));
  }
}

void Unfinished::put_in_place() {
  if (::fsync(file_) != 0) fail("cannot be written");
  if (::rename(name_.c_str(), target_.c_str()) != 0) fail("cannot be put in place");
  done_ = true;
}

void sync_folder(const std::filesystem::path& folder) {
  const int file = ::open(folder.c_str(), O_RDONLY | O_DIRECTORY | O_CLOEXEC);
  if (file < 0) return;
  ::fsync(file);
  ::close(file);
}

}  // namespace wellwright
