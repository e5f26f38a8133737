// SPDX-License-Identifier: Apache-2.0
// HDF5 files: one being written, and the look into one that is there.
#include "results/tools.hpp"

namespace wellwright::hdf5 {
namespace {

// HDF5 prints nothing by itself, and does not tidy up at exit: after a write that failed it would try again,
// and crash (1.10.8). Files are closed here.
void begin() {
  static const bool once = [] {
    H5dont_atexit();
    return H5Eset_auto2(H5E_DEFAULT, nullptr, nullptr) >= 0;
  }();
  (void)once;
}

Handle create(const std::string& path) {
  begin();
  const Handle access(H5Pcreate(H5P_FILE_ACCESS), H5Pclose, "making properties");
  check(H5Pset_libver_bounds(access.id(), H5F_LIBVER_V18, H5F_LIBVER_V18), "making properties");
  // Descriptions, and numbers of small datasets, gather in blocks that are written at once.
  check(H5Pset_meta_block_size(access.id(), 1 << 14), "making properties");
  check(H5Pset_small_data_block_size(access.id(), 1 << 14), "making properties");
  const Handle plist = ordered(H5P_FILE_CREATE);
  return {H5Fcreate(path.c_str(), H5F_ACC_TRUNC, plist.id(), access.id()), H5Fclose, "creating the file"};
}

}  // namespace

File::File(const std::string& path) : handle_(create(path)), tools_(std::make_unique<Tools>()) {}
File::~File() = default;

Group File::root() const {
  return Group({H5Gopen2(handle_.id(), "/", H5P_DEFAULT), H5Gclose, "opening the root"}, *tools_);
}

void File::close() {
  tools_->write_uses();
  check(H5Fflush(handle_.id(), H5F_SCOPE_GLOBAL), "writing the file");
  handle_.close("closing the file");
}

std::optional<std::string> root_attribute(const std::string& path, const char* name) {
  begin();
  if (H5Fis_hdf5(path.c_str()) <= 0) return {};
  const Handle file(H5Fopen(path.c_str(), H5F_ACC_RDONLY, H5P_DEFAULT), H5Fclose, "opening");
  const htri_t there = H5Aexists(file.id(), name);
  if (there < 0) throw Trouble{"reading"};
  if (there == 0) return {};
  const Handle attribute(H5Aopen(file.id(), name, H5P_DEFAULT), H5Aclose, "reading");
  const Handle type(H5Aget_type(attribute.id()), H5Tclose, "reading");
  const Handle space(H5Aget_space(attribute.id()), H5Sclose, "reading");
  if (H5Tis_variable_str(type.id()) <= 0 || H5Sget_simple_extent_npoints(space.id()) != 1) return {};
  char* text = nullptr;
  check(H5Aread(attribute.id(), type.id(), &text), "reading");
  if (!text) return {};
  std::string out = text;
  H5free_memory(text);
  return out;
}

}  // namespace wellwright::hdf5
