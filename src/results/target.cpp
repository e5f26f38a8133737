// SPDX-License-Identifier: Apache-2.0
// Names that a result may be written to: asked before any work is done, and never by opening a pipe.
#include "results/target.hpp"

#include <fcntl.h>
#include <fmt/format.h>
#include <sys/file.h>  // for flock
#include <unistd.h>

#include <cerrno>
#include <cstring>
#include <optional>

#include "results/hdf5.hpp"
#include "results/names.hpp"
#include "wellwright/results.hpp"

namespace wellwright {
namespace {

namespace fs = std::filesystem;
constexpr int most_links = 40;  // as many as Linux follows
constexpr const char* left = "and is left as it is; choose another name with -o";

std::string why() {
  return std::strerror(errno);
}

// Empty for a regular file.
const char* kind_of(fs::file_type type) {
  switch (type) {
    case fs::file_type::directory:
      return "a folder";
    case fs::file_type::fifo:
      return "a named pipe";
    case fs::file_type::character:
    case fs::file_type::block:
      return "a device";
    case fs::file_type::socket:
      return "a socket";
    default:
      return "";
  }
}

// A regular file that is there: ours, or FileTrouble that says why not.
void check_ours(const std::string& path) {
  const int file = ::open(path.c_str(), O_RDONLY | O_CLOEXEC);
  if (file < 0)
    throw FileTrouble(fmt::format("{}: the file there cannot be read to see whether it is a result ({}) {}",
                                  path, why(), left));
  // HDF5 locks what it writes; a file that is locked cannot be opened.
  const bool locked = ::flock(file, LOCK_SH | LOCK_NB) != 0 && errno == EWOULDBLOCK;
  ::close(file);
  if (locked)
    throw FileTrouble(fmt::format(
        "{}: another program is writing this file; it is left as it is; choose another name with -o", path));
  std::optional<std::string> format;
  try {
    format = hdf5::root_attribute(path, "format");
  } catch (const hdf5::Trouble&) {
    throw FileTrouble(fmt::format("{}: the HDF5 file there is damaged {}", path, left));
  }
  if (format != format_name)
    throw FileTrouble(fmt::format("{}: this file was not written by wellwright {}", path, left));
}

}  // namespace

fs::path folder_of(const fs::path& path) {
  const fs::path folder = path.parent_path();
  return folder.empty() ? fs::path(".") : folder;
}

fs::path writable_file(const std::string& path) {
  std::error_code none;
  const char* kind = kind_of(fs::status(path, none).type());
  if (*kind != 0) throw FileTrouble(fmt::format("{}: this is {}", path, kind));
  fs::path end = path;
  for (int links = 0; fs::is_symlink(end, none); ++links) {
    if (links == most_links) throw FileTrouble(fmt::format("{}: its symbolic links lead nowhere", path));
    const fs::path next = fs::read_symlink(end, none);
    end = next.is_absolute() ? next : end.parent_path() / next;
  }
  if (fs::exists(end, none) && ::access(end.c_str(), W_OK) != 0)
    throw FileTrouble(fmt::format("{}: the file there cannot be written to: {}", path, why()));
  return end;
}

void check_target(const std::string& path) {
  if (path.empty()) throw FileTrouble("the result file has no name");
  const fs::path end = writable_file(path);
  const fs::path folder = folder_of(end);
  std::error_code none;
  if (!fs::is_directory(folder, none))
    throw FileTrouble(fmt::format("{}: there is no folder {}", path, folder.string()));
  if (::access(folder.c_str(), W_OK) != 0)
    throw FileTrouble(fmt::format("{}: the folder cannot be written to: {}", path, why()));
  if (fs::exists(end, none)) check_ours(path);
}

}  // namespace wellwright
