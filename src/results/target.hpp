// SPDX-License-Identifier: Apache-2.0
// Where a file is written: onto what a name stands for, and only where a regular file is or can be; private
// to the room.
#pragma once

#include <filesystem>
#include <string>

namespace wellwright {

/// The file that `path` stands for, there or not: a symbolic link is followed to its end, so that writing
/// keeps the link. Throws FileTrouble where a folder, a named pipe, a device or a socket is, where links run
/// in a circle, and where the file there must not be written.
std::filesystem::path writable_file(const std::string& path);

/// "." for a bare name.
std::filesystem::path folder_of(const std::filesystem::path& path);

}  // namespace wellwright
