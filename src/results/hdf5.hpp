// SPDX-License-Identifier: Apache-2.0
// HDF5 groups with their own axes, attributes and datasets, laid out so that netCDF-4 readers take them;
// private to the room.
#pragma once

#include <H5Ipublic.h>

#include <Eigen/Core>
#include <map>
#include <memory>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace wellwright::hdf5 {

/// Anything that HDF5 refuses; turned into FileTrouble with the path by the writer.
struct Trouble {
  std::string doing;
};

/// An HDF5 identifier that closes itself.
class Handle {
 public:
  Handle(hid_t id, herr_t (*closer)(hid_t), const char* doing);
  Handle(Handle&& other) noexcept;
  Handle(const Handle&) = delete;
  Handle& operator=(const Handle&) = delete;
  ~Handle();
  hid_t id() const { return id_; }
  /// Closes now and reports what closing says.
  void close(const char* doing);

 private:
  hid_t id_;
  herr_t (*close_)(hid_t);
};

/// How a dataset is described.
struct Words {
  std::string units, long_name, comment = {};
};

struct Tools;  // what a file being written shares, see tools.hpp
struct Axis;

using RowMatrix = Eigen::Matrix<double, Eigen::Dynamic, Eigen::Dynamic, Eigen::RowMajor>;

/// A group whose axes are one-dimensional datasets of its own, attached to every dataset made after them.
class Group {
 public:
  Group(Handle handle, Tools& tools) : handle_(std::move(handle)), tools_(&tools) {}
  Group child(const std::string& name) const;

  void attribute(const char* name, const std::string& text) const;
  void attribute(const char* name, const std::vector<std::string>& texts) const;
  void attribute(const char* name, double value) const;
  void attribute(const char* name, int value) const;

  /// An axis that counts 1, 2, 3, ...
  void count_axis(const std::string& name, std::size_t length, const std::string& long_name);
  void axis(const std::string& name, const Eigen::VectorXd& values, const Words& words);

  /// Datasets over axes made before, in row-major order.
  void write(const std::string& name, const std::vector<std::string>& axes, const double* values,
             const Words& words);
  void write(const std::string& name, const std::vector<std::string>& axes, const std::vector<int>& values,
             const Words& words);
  void write(const std::string& name, const std::vector<std::string>& axes,
             const std::vector<std::string>& values, const Words& words);
  void vector(const std::string& name, const std::string& axis, const Eigen::VectorXd& values,
              const Words& words);
  /// Rows along the first axis.
  void matrix(const std::string& name, const std::string& rows, const std::string& columns,
              const Eigen::MatrixXd& values, const Words& words);
  /// A matrix that arrives in blocks: made empty here, filled by write_block.
  void begin_blocks(const std::string& name, const std::string& rows, const std::string& columns,
                    const Words& words);
  void write_block(const std::string& name, Eigen::Index row, Eigen::Index column, const RowMatrix& block);

 private:
  Handle make(const std::string& name, const std::vector<std::string>& axes, hid_t type, const Words& words);
  void make_axis(const std::string& name, std::size_t length, hid_t type, const void* values,
                 const Words& words);
  Handle create(const std::string& name, const std::vector<hsize_t>& shape, hid_t type) const;
  std::vector<hsize_t> shape_of(const std::vector<std::string>& axes) const;

  Handle handle_;
  Tools* tools_;
  std::map<std::string, Axis*> axes_;
  std::map<std::string, Handle> open_;
};

/// A file being written to `path`. Groups do not outlive it; close() writes what is still to write.
class File {
 public:
  explicit File(const std::string& path);
  ~File();
  Group root() const;
  void close();

 private:
  Handle handle_;
  std::unique_ptr<Tools> tools_;
};

/// The text attribute `name` of the root of the HDF5 file at `path`; nothing when it is no such file or has
/// no such text. Throws Trouble when it begins as one but cannot be read.
std::optional<std::string> root_attribute(const std::string& path, const char* name);

}  // namespace wellwright::hdf5
