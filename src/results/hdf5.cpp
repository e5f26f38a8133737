// SPDX-License-Identifier: Apache-2.0
// Groups, axes and datasets.
//
// What netCDF needs: creation order tracked for links and attributes, every dimension a dimension scale of
// the same group, attached to all axes of a dataset. Source: The NetCDF Users Guide, "NetCDF-4 file format".
#include "results/hdf5.hpp"

#include <algorithm>

#include "results/tools.hpp"

namespace wellwright::hdf5 {
namespace {

// An axis of length 0 is an extendible one that holds nothing so far, as netCDF wants it.
Handle space_of(const std::vector<hsize_t>& shape) {
  std::vector<hsize_t> most = shape;
  for (hsize_t& n : most)
    if (n == 0) n = H5S_UNLIMITED;
  return {H5Screate_simple(static_cast<int>(shape.size()), shape.data(), most.data()), H5Sclose,
          "making a space"};
}

bool empty(const std::vector<hsize_t>& shape) {
  return std::find(shape.begin(), shape.end(), 0) != shape.end();
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
  return Group({H5Gcreate2(handle_.id(), name.c_str(), H5P_DEFAULT, tools_->group.id(), H5P_DEFAULT),
                H5Gclose, "making a group"},
               *tools_);
}

void Group::attribute(const char* name, const std::string& text) const {
  tools_->write_text(handle_.id(), name, text);
}

void Group::attribute(const char* name, const std::vector<std::string>& texts) const {
  std::vector<const char*> values;
  for (const std::string& text : texts) values.push_back(text.c_str());
  const hsize_t length = values.size();
  const Handle space(H5Screate_simple(1, &length, nullptr), H5Sclose, "making a space");
  tools_->write_attribute(handle_.id(), name, tools_->text.id(), space.id(),
                          values.empty() ? nullptr : values.data());
}

void Group::attribute(const char* name, double value) const {
  tools_->write_attribute(handle_.id(), name, H5T_NATIVE_DOUBLE, tools_->scalar.id(), &value);
}
void Group::attribute(const char* name, int value) const {
  tools_->write_attribute(handle_.id(), name, H5T_NATIVE_INT, tools_->scalar.id(), &value);
}

std::vector<hsize_t> Group::shape_of(const std::vector<std::string>& axes) const {
  std::vector<hsize_t> shape;
  for (const std::string& name : axes) shape.push_back(axes_.at(name)->length);
  return shape;
}

Handle Group::create(const std::string& name, const std::vector<hsize_t>& shape, hid_t type) const {
  const char* doing = "making a dataset";
  const Handle space = space_of(shape);
  const auto make = [&](const Handle& plist) {
    return Handle(
        H5Dcreate2(handle_.id(), name.c_str(), type, space.id(), H5P_DEFAULT, plist.id(), H5P_DEFAULT),
        H5Dclose, doing);
  };
  if (!empty(shape)) return make(tools_->dataset);
  const Handle plist = ordered(H5P_DATASET_CREATE);  // what may grow is kept in chunks
  std::vector<hsize_t> chunk;
  for (const hsize_t n : shape) chunk.push_back(n == 0 ? 64 : std::min<hsize_t>(n, 64));
  check(H5Pset_chunk(plist.id(), static_cast<int>(chunk.size()), chunk.data()), doing);
  return make(plist);
}

Handle Group::make(const std::string& name, const std::vector<std::string>& axes, hid_t type,
                   const Words& words) {
  Handle dataset = create(name, shape_of(axes), type);
  tools_->describe(dataset.id(), words);
  std::vector<Axis*> to;
  for (const std::string& axis : axes) to.push_back(axes_.at(axis));
  tools_->attach(dataset.id(), to);
  return dataset;
}

void Group::make_axis(const std::string& name, std::size_t length, hid_t type, const void* values,
                      const Words& words) {
  Handle dataset = create(name, {length}, type);
  if (length > 0)
    check(H5Dwrite(dataset.id(), type, H5S_ALL, H5S_ALL, H5P_DEFAULT, values), "writing an axis");
  tools_->make_scale(dataset.id(), name);
  tools_->describe(dataset.id(), words);
  const hobj_ref_t reference = reference_to(dataset.id());
  axes_[name] = &tools_->axes.emplace_back(Axis{length, std::move(dataset), reference, {}});
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
  if (empty(shape_of(axes))) return;
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
  const hid_t type = tools_->text.id();
  const Handle dataset = make(name, axes, type, words);
  std::vector<const char*> texts;
  for (const std::string& value : values) texts.push_back(value.c_str());
  if (texts.empty()) return;
  check(H5Dwrite(dataset.id(), type, H5S_ALL, H5S_ALL, tools_->small_buffer.id(), texts.data()),
        "writing a dataset");
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

}  // namespace wellwright::hdf5
