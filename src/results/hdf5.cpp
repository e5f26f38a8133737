// SPDX-License-Identifier: Apache-2.0
// HDF5 groups, axes and datasets through the C library.
//
// What netCDF needs: creation order tracked for links and attributes, every dimension a dimension scale of
// the same group, attached to all axes of a dataset. Source: The NetCDF Users Guide, "NetCDF-4 file format".
#include "results/hdf5.hpp"

#include <hdf5.h>
#include <hdf5_hl.h>

namespace wellwright::hdf5 {
namespace {

hid_t checked(hid_t id, const char* doing) {
  if (id < 0) throw Trouble{doing};
  return id;
}
void check(herr_t code, const char* doing) {
  if (code < 0) throw Trouble{doing};
}

Handle text_type() {
  Handle type(H5Tcopy(H5T_C_S1), H5Tclose, "making a text type");
  check(H5Tset_size(type.id(), H5T_VARIABLE), "making a text type");
  check(H5Tset_cset(type.id(), H5T_CSET_UTF8), "making a text type");
  return type;
}

Handle ordered(hid_t kind) {
  Handle plist(H5Pcreate(kind), H5Pclose, "making properties");
  constexpr unsigned order = H5P_CRT_ORDER_TRACKED | H5P_CRT_ORDER_INDEXED;
  check(H5Pset_attr_creation_order(plist.id(), order), "tracking the order of attributes");
  if (kind != H5P_DATASET_CREATE)
    check(H5Pset_link_creation_order(plist.id(), order), "tracking the order of groups");
  return plist;
}

Handle space_of(const std::vector<hsize_t>& shape) {
  if (shape.empty()) return {H5Screate(H5S_SCALAR), H5Sclose, "making a space"};
  // An axis of length 0 is an extendible one that holds nothing so far, as netCDF wants it.
  std::vector<hsize_t> most = shape;
  for (hsize_t& n : most)
    if (n == 0) n = H5S_UNLIMITED;
  return {H5Screate_simple(static_cast<int>(shape.size()), shape.data(), most.data()), H5Sclose,
          "making a space"};
}

void write_attribute(hid_t object, const char* name, hid_t type, const Handle& space, const void* value) {
  const Handle attribute(H5Acreate2(object, name, type, space.id(), H5P_DEFAULT, H5P_DEFAULT), H5Aclose,
                         "writing an attribute");
  if (value) check(H5Awrite(attribute.id(), type, value), "writing an attribute");
}

void write_text(hid_t object, const char* name, const std::string& text) {
  const char* value = text.c_str();
  write_attribute(object, name, text_type().id(), space_of({}), &value);
}

void describe(hid_t dataset, const Words& words) {
  write_text(dataset, "long_name", words.long_name);
  if (!words.units.empty()) write_text(dataset, "units", words.units);
  if (!words.comment.empty()) write_text(dataset, "comment", words.comment);
}

}  // namespace

Handle::Handle(hid_t id, herr_t (*closer)(hid_t), const char* doing)
    : id_(checked(id, doing)), close_(closer) {}
Handle::Handle(Handle&& other) noexcept : id_(other.id_), close_(other.close_) {
  other.id_ = -1;
}
Handle::~Handle() {
  if (id_ >= 0) close_(id_);
}
void Handle::close(const char* doing) {
  const hid_t id = id_;
  id_ = -1;
  if (id >= 0) check(close_(id), doing);
}

Group Group::child(const std::string& name) const {
  const Handle plist = ordered(H5P_GROUP_CREATE);
  return Group({H5Gcreate2(handle_.id(), name.c_str(), H5P_DEFAULT, plist.id(), H5P_DEFAULT), H5Gclose,
                "making a group"});
}

void Group::attribute(const char* name, const std::string& text) const {
  write_text(handle_.id(), name, text);
}

void Group::attribute(const char* name, const std::vector<std::string>& texts) const {
  std::vector<const char*> values;
  for (const std::string& text : texts) values.push_back(text.c_str());
  const hsize_t length = values.size();
  const Handle space(H5Screate_simple(1, &length, nullptr), H5Sclose, "making a space");
  write_attribute(handle_.id(), name, text_type().id(), space, values.empty() ? nullptr : values.data());
}

void Group::attribute(const char* name, double value) const {
  write_attribute(handle_.id(), name, H5T_NATIVE_DOUBLE, space_of({}), &value);
}
void Group::attribute(const char* name, int value) const {
  write_attribute(handle_.id(), name, H5T_NATIVE_INT, space_of({}), &value);
}

std::vector<hsize_t> Group::shape_of(const std::vector<std::string>& axes) const {
  std::vector<hsize_t> shape;
  for (const std::string& name : axes) shape.push_back(axes_.at(name).length);
  return shape;
}

Handle Group::make(const std::string& name, const std::vector<std::string>& axes, hid_t type,
                   const Words& words) {
  const auto shape = shape_of(axes);
  const Handle plist = ordered(H5P_DATASET_CREATE);
  bool empty = false;
  std::vector<hsize_t> chunk;
  for (const hsize_t n : shape) {
    empty = empty || n == 0;
    chunk.push_back(std::max<hsize_t>(1, std::min<hsize_t>(n, 64)));
  }
  if (empty)
    check(H5Pset_chunk(plist.id(), static_cast<int>(chunk.size()), chunk.data()), "making a dataset");
  Handle dataset(H5Dcreate2(handle_.id(), name.c_str(), type, space_of(shape).id(), H5P_DEFAULT, plist.id(),
                            H5P_DEFAULT),
                 H5Dclose, "making a dataset");
  describe(dataset.id(), words);
  for (std::size_t i = 0; i < axes.size(); ++i)
    check(H5DSattach_scale(dataset.id(), axes_.at(axes[i]).dataset.id(), static_cast<unsigned>(i)),
          "attaching an axis");
  return dataset;
}

void Group::make_axis(const std::string& name, std::size_t length, hid_t type, const void* values,
                      const Words& words) {
  const Handle plist = ordered(H5P_DATASET_CREATE);
  const hsize_t one = 64;
  if (length == 0) check(H5Pset_chunk(plist.id(), 1, &one), "making an axis");
  Handle dataset(H5Dcreate2(handle_.id(), name.c_str(), type, space_of({length}).id(), H5P_DEFAULT,
                            plist.id(), H5P_DEFAULT),
                 H5Dclose, "making an axis");
  if (length > 0)
    check(H5Dwrite(dataset.id(), type, H5S_ALL, H5S_ALL, H5P_DEFAULT, values), "writing an axis");
  check(H5DSset_scale(dataset.id(), name.c_str()), "making an axis");
  describe(dataset.id(), words);
  axes_.emplace(name, Axis{length, std::move(dataset)});
}

void Group::count_axis(const std::string& name, std::size_t length, const std::string& long_name) {
  std::vector<int> values(length);
  for (std::size_t i = 0; i < length; ++i) values[i] = static_cast<int>(i) + 1;
  make_axis(name, length, H5T_NATIVE_INT, values.data(), {"1", long_name});
}

void Group::axis(const std::string& name, const Eigen::VectorXd& values, const Words& words) {
  make_axis(name, static_cast<std::size_t>(values.size()), H5T_NATIVE_DOUBLE, values.data(), words);
}

void Group::write(const std::string& name, const std::vector<std::string>& axes, const double* values,
                  const Words& words) {
  const Handle dataset = make(name, axes, H5T_NATIVE_DOUBLE, words);
  for (const hsize_t n : shape_of(axes))
    if (n == 0) return;
  check(H5Dwrite(dataset.id(), H5T_NATIVE_DOUBLE, H5S_ALL, H5S_ALL, H5P_DEFAULT, values),
        "writing a dataset");
}

void Group::write(const std::string& name, const std::vector<std::string>& axes,
                  const std::vector<int>& values, const Words& words) {
  const Handle dataset = make(name, axes, H5T_NATIVE_INT, words);
  if (values.empty()) return;
  check(H5Dwrite(dataset.id(), H5T_NATIVE_INT, H5S_ALL, H5S_ALL, H5P_DEFAULT, values.data()),
        "writing a dataset");
}

void Group::write(const std::string& name, const std::vector<std::string>& axes,
                  const std::vector<std::string>& values, const Words& words) {
  const Handle type = text_type();
  const Handle dataset = make(name, axes, type.id(), words);
  std::vector<const char*> texts;
  for (const std::string& value : values) texts.push_back(value.c_str());
  if (texts.empty()) return;
  check(H5Dwrite(dataset.id(), type.id(), H5S_ALL, H5S_ALL, H5P_DEFAULT, texts.data()), "writing a dataset");
}

void Group::vector(const std::string& name, const std::string& axis, const Eigen::VectorXd& values,
                   const Words& words) {
  write(name, {axis}, values.data(), words);
}

void Group::matrix(const std::string& name, const std::string& rows, const std::string& columns,
                   const Eigen::MatrixXd& values, const Words& words) {
  const RowMatrix turned = values;
  write(name, {rows, columns}, turned.data(), words);
}

void Group::begin_blocks(const std::string& name, const std::string& rows, const std::string& columns,
                         const Words& words) {
  open_.emplace(name, make(name, {rows, columns}, H5T_NATIVE_DOUBLE, words));
}

void Group::write_block(const std::string& name, Eigen::Index row, Eigen::Index column,
                        const RowMatrix& block) {
  const Handle& dataset = open_.at(name);
  const hsize_t start[2] = {static_cast<hsize_t>(row), static_cast<hsize_t>(column)};
  const hsize_t count[2] = {static_cast<hsize_t>(block.rows()), static_cast<hsize_t>(block.cols())};
  const Handle file_space(H5Dget_space(dataset.id()), H5Sclose, "writing a dataset");
  check(H5Sselect_hyperslab(file_space.id(), H5S_SELECT_SET, start, nullptr, count, nullptr),
        "writing a dataset");
  const Handle memory(H5Screate_simple(2, count, nullptr), H5Sclose, "writing a dataset");
  check(H5Dwrite(dataset.id(), H5T_NATIVE_DOUBLE, memory.id(), file_space.id(), H5P_DEFAULT, block.data()),
        "writing a dataset");
}

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

Handle create(const std::string& path, bool in_memory) {
  begin();
  const Handle access(H5Pcreate(H5P_FILE_ACCESS), H5Pclose, "making properties");
  constexpr std::size_t growth = 1 << 20;
  if (in_memory) check(H5Pset_fapl_core(access.id(), growth, true), "making properties");
  check(H5Pset_libver_bounds(access.id(), H5F_LIBVER_V18, H5F_LIBVER_V18), "making properties");
  const Handle plist = ordered(H5P_FILE_CREATE);
  return {H5Fcreate(path.c_str(), H5F_ACC_TRUNC, plist.id(), access.id()), H5Fclose, "creating the file"};
}

}  // namespace

File::File(const std::string& path, bool in_memory) : handle_(create(path, in_memory)) {}

Group File::root() const {
  return Group({H5Gopen2(handle_.id(), "/", H5P_DEFAULT), H5Gclose, "opening the root"});
}

void File::close() {
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
