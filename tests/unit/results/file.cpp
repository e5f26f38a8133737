// SPDX-License-Identifier: Apache-2.0
// The result file read back with the HDF5 library alone: numbers, units and texts are those of the answer.
#include <hdf5.h>
#include <hdf5_hl.h>

#include <catch2/catch.hpp>

#include "small_answer.hpp"
#include "support/scratch_folder.hpp"

using namespace wellwright;
using support::ScratchFolder;

namespace {

// A file that closes itself.
class Reader {
 public:
  explicit Reader(const std::string& path) : file_(H5Fopen(path.c_str(), H5F_ACC_RDONLY, H5P_DEFAULT)) {
    REQUIRE(file_ >= 0);
  }
  Reader(const Reader&) = delete;
  Reader& operator=(const Reader&) = delete;
  ~Reader() { H5Fclose(file_); }

  std::vector<hsize_t> shape(const std::string& name) const {
    int rank = 0;
    REQUIRE(H5LTget_dataset_ndims(file_, name.c_str(), &rank) >= 0);
    std::vector<hsize_t> out(static_cast<std::size_t>(rank));
    REQUIRE(H5LTget_dataset_info(file_, name.c_str(), out.data(), nullptr, nullptr) >= 0);
    return out;
  }

  // Row-major, as a matrix of the first axis by the others.
  Eigen::MatrixXd values(const std::string& name) const {
    const auto dims = shape(name);
    Eigen::Index columns = 1;
    for (std::size_t i = 1; i < dims.size(); ++i) columns *= static_cast<Eigen::Index>(dims[i]);
    Eigen::Matrix<double, Eigen::Dynamic, Eigen::Dynamic, Eigen::RowMajor> out(
        static_cast<Eigen::Index>(dims.at(0)), columns);
    if (out.size() > 0) REQUIRE(H5LTread_dataset_double(file_, name.c_str(), out.data()) >= 0);
    return out;
  }

  std::string text(const std::string& object, const char* name) const {
    char* value = nullptr;
    if (H5LTget_attribute_string(file_, object.c_str(), name, reinterpret_cast<char*>(&value)) < 0)
      return "(none)";
    std::string out = value;
    H5free_memory(value);
    return out;
  }

  double number(const std::string& object, const char* name) const {
    double value = 0;
    REQUIRE(H5LTget_attribute_double(file_, object.c_str(), name, &value) >= 0);
    return value;
  }

 private:
  hid_t file_;
};

bool same(const Eigen::MatrixXd& a, const Eigen::MatrixXd& b) {
  return a.rows() == b.rows() && a.cols() == b.cols() &&
         ((a.array() == b.array()) || (a.array().isNaN() && b.array().isNaN())).all();
}

}  // namespace

TEST_CASE("Levels, transitions and what they rest on come back digit by digit") {
  const ScratchFolder folder;
  const Answer a = small_answer("field: 20 kV/cm\nmodel: {levels: 3}\n");
  write_result(a, folder / "out.h5");
  const Reader file(folder / "out.h5");
  CHECK(file.text("/", "format") == "wellwright result");
  CHECK(file.text("/", "format_version") == "1.0");
  CHECK(file.text("/", "version") == version());
  CHECK(file.text("/", "study") == a.study.text);
  CHECK(file.text("/", "default") == "/levels");
  CHECK(file.number("/", "converged") == 1);
  const Levels& levels = a.carriers[0].levels;
  CHECK(same(file.values("/levels/level"), Eigen::Vector3d(1, 2, 3)));
  CHECK(same(file.values("/levels/energy"), levels.energy));
  CHECK(same(file.values("/levels/mean_position"), levels.mean_position));
  CHECK(same(file.values("/levels/layer_probability"), levels.layer_probability));
  CHECK(file.text("/levels/energy", "units") == "eV");
  CHECK(file.text("/levels/mean_position", "units") == "nm");
  CHECK(file.text("/levels/probability_density", "units") == "nm-1");
  CHECK(file.number("/levels", "window_top") == levels.certificate.window_top);
  const Transitions& t = a.carriers[0].transitions;
  CHECK(same(file.values("/transitions/energy"), t.energy));
  CHECK(same(file.values("/transitions/dipole"), t.dipole));
  CHECK(same(file.values("/transitions/beat_period"), t.beat_period));
  // The envelopes stand on a strictly increasing z, with weights that integrate them to one.
  const Eigen::MatrixXd z = file.values("/levels/z"), weight = file.values("/levels/weight");
  CHECK((z.bottomRows(z.rows() - 1) - z.topRows(z.rows() - 1)).minCoeff() > 0);
  const Eigen::MatrixXd norm = file.values("/levels/probability_density") * weight;
  CHECK((norm.array() - 1).abs().maxCoeff() < 1e-12);  // sums of some 200 terms of order one
  CHECK(file.shape("/levels/companion_envelope") ==
        std::vector<hsize_t>{levels.companion.size(), 3, static_cast<hsize_t>(z.rows())});
}

TEST_CASE("Motion comes back: amplitudes, populations, beats and the map") {
  const ScratchFolder folder;
  const Answer a = small_answer(two_levels_move);
  write_result(a, folder / "out.h5");
  const Reader file(folder / "out.h5");
  const Dynamics& d = *a.dynamics;
  const Eigen::MatrixXcd c = amplitudes_in_time(a.carriers[0].levels, d);
  CHECK(file.text("/", "default") == "/dynamics");
  CHECK(same(file.values("/dynamics/time"), d.time));
  CHECK(same(file.values("/dynamics/amplitude_real"), c.real()));
  CHECK(same(file.values("/dynamics/amplitude_imag"), c.imag()));
  CHECK(same(file.values("/dynamics/population"), c.cwiseAbs2()));
  CHECK(same(file.values("/dynamics/mean_position"), d.mean_position));
  CHECK(same(file.values("/dynamics/layer_probability"), d.layer_probability));
  CHECK(file.number("/dynamics", "captured_norm") == d.captured_norm);
  REQUIRE(d.beats.size() == 1);
  CHECK(file.values("/beats/period")(0, 0) == d.beats[0].period);
  CHECK(file.text("/beats/period", "units") == "ps");
  Eigen::MatrixXd map(d.time.size(), static_cast<Eigen::Index>(d.density_z.size()));
  density_map(a.carriers[0].levels, d,
              [&](int first, const Eigen::MatrixXd& rows) { map.middleRows(first, rows.rows()) = rows; });
  CHECK(same(file.values("/dynamics/density/probability_density"), map));
}

TEST_CASE("The library itself finds every axis attached to what stands over it") {
  const ScratchFolder folder;
  write_result(small_answer(two_levels_move), folder / "out.h5");
  const hid_t file = H5Fopen((folder / "out.h5").c_str(), H5F_ACC_RDONLY, H5P_DEFAULT);
  const auto attached = [&](const std::string& name, unsigned dimension, const std::string& axis) {
    const hid_t dataset = H5Dopen2(file, name.c_str(), H5P_DEFAULT),
                scale = H5Dopen2(file, axis.c_str(), H5P_DEFAULT);
    const bool out = H5DSis_scale(scale) > 0 && H5DSis_attached(dataset, scale, dimension) > 0;
    H5Dclose(dataset);
    H5Dclose(scale);
    return out;
  };
  CHECK(attached("/levels/energy", 0, "/levels/level"));
  CHECK(attached("/levels/companion_envelope", 0, "/levels/component"));
  CHECK(attached("/levels/companion_envelope", 1, "/levels/level"));
  CHECK(attached("/levels/companion_envelope", 2, "/levels/z"));
  CHECK(attached("/transitions/energy", 1, "/transitions/final"));
  CHECK(attached("/dynamics/density/probability_density", 0, "/dynamics/density/time"));
  CHECK(attached("/beats/period", 0, "/beats/beat"));
  CHECK_FALSE(attached("/transitions/energy", 0, "/transitions/final"));
  CHECK_FALSE(attached("/levels/energy", 0, "/levels/z"));
  H5Fclose(file);
}

TEST_CASE("Amplitudes at very many times come back from the blocks they were written in") {
  const ScratchFolder folder;
  const Answer a = small_answer(
      "model: {levels: 3}\n"
      "dynamics: {start: {mix: [{level: 1, amplitude: 1}, {level: 2, amplitude: 0.5}]}, duration: 9 ps, "
      "samples: 300001, density_map: off}\n");
  write_result(a, folder / "out.h5");
  const Reader file(folder / "out.h5");
  const Eigen::MatrixXcd c = amplitudes_in_time(a.carriers[0].levels, *a.dynamics);
  REQUIRE(c.cols() == 300001);
  CHECK(same(file.values("/dynamics/amplitude_real"), c.real()));
  CHECK(same(file.values("/dynamics/amplitude_imag"), c.imag()));
  CHECK(same(file.values("/dynamics/population"), c.cwiseAbs2()));
  CHECK(same(file.values("/dynamics/layer_probability"), a.dynamics->layer_probability));
}

TEST_CASE("An answer without levels is a file with axes of length zero") {
  const ScratchFolder folder;
  write_result(small_answer("model: {levels: {above: 5 meV, below: 10 meV}}\n"), folder / "out.h5");
  const Reader file(folder / "out.h5");
  CHECK(file.shape("/levels/level") == std::vector<hsize_t>{0});
  CHECK(file.shape("/levels/envelope").at(0) == 0);
  CHECK(file.shape("/transitions/energy") == std::vector<hsize_t>{0, 0});
}
