// SPDX-License-Identifier: Apache-2.0
// A file being written beside its target and put in place when whole; private to the room.
#pragma once

#include <filesystem>
#include <string>
#include <string_view>

namespace wellwright {

/// A file beside `target`, under a name that no other run has; removed unless it is put in place. Throws
/// FileTrouble, whose messages name `shown`, the target in the user's words.
class Unfinished {
 public:
  Unfinished(const std::filesystem::path& target, std::string shown);
  Unfinished(const Unfinished&) = delete;
  Unfinished& operator=(const Unfinished&) = delete;
  ~Unfinished();
  const std::string& name() const { return name_; }

  void write(std::string_view text);
  /// On the disk, then renamed.
  void put_in_place();

 private:
  [[noreturn]] void fail(const char* what) const;

  std::filesystem::path target_;
  std::string shown_, name_;
  int file_ = -1;
  bool done_ = false;
};

/// Names put into the folder outlast a crash from here on; a file system that cannot promise it is not asked
/// twice.
void sync_folder(const std::filesystem::path& folder);

}  // namespace wellwright
