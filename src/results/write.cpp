// SPDX-License-Identifier: Apache-2.0
// The result file, written whole under another name and put in place by renaming.
#include <fcntl.h>
#include <fmt/format.h>
#include <sys/stat.h>
#include <unistd.h>

#include <cerrno>
#include <cstring>
#include <ctime>
#include <filesystem>

#include "results/groups.hpp"
#include "results/names.hpp"
#include "wellwright/results.hpp"

namespace wellwright {
namespace {

namespace fs = std::filesystem;
constexpr double largest_in_memory = 64e6;  // bytes; larger files go to disk as they grow

std::string why() {
  return std::strerror(errno);
}

std::string now_utc() {
  const std::time_t now = std::time(nullptr);
  std::tm parts{};
  gmtime_r(&now, &parts);
  char text[32];
  std::strftime(text, sizeof text, "%Y-%m-%dT%H:%M:%SZ", &parts);
  return text;
}

fs::path folder_of(const std::string& path) {
  const fs::path folder = fs::path(path).parent_path();
  return folder.empty() ? fs::path(".") : folder;
}

// A name beside the target that no other run has, removed unless it is put in place.
class Unfinished {
 public:
  explicit Unfinished(std::string target) : target_(std::move(target)) {
    name_ = fmt::format("{}.unfinished-XXXXXX", target_);
    const int file = mkstemp(name_.data());
    if (file < 0) throw FileTrouble(fmt::format("{}: cannot be written: {}", target_, why()));
    const mode_t mask = umask(0);
    umask(mask);
    fchmod(file, 0666 & ~mask);
    ::close(file);
  }
  ~Unfinished() {
    if (!done_) ::unlink(name_.c_str());
  }
  const std::string& name() const { return name_; }

  void put_in_place() {
    const int file = ::open(name_.c_str(), O_RDWR);
    const bool safe = file >= 0 && ::fsync(file) == 0;
    const std::string trouble = why();
    if (file >= 0) ::close(file);
    if (!safe) throw FileTrouble(fmt::format("{}: cannot be written: {}", target_, trouble));
    if (::rename(name_.c_str(), target_.c_str()) != 0)
      throw FileTrouble(fmt::format("{}: cannot be put in place: {}", target_, why()));
    done_ = true;
    const int folder = ::open(folder_of(target_).c_str(), O_RDONLY | O_DIRECTORY);
    if (folder >= 0) {
      ::fsync(folder);
      ::close(folder);
    }
  }

 private:
  std::string target_, name_;
  bool done_ = false;
};

std::string materials_of(const Study& study) {
  if (!study.stack.table) return {};
  std::vector<Alloy> alloys;
  for (const Layer& layer : study.stack.layers) {
    alloys.push_back(layer.material);
    if (layer.grading) alloys.push_back(layer.grading->to);
  }
  if (study.stack.environment.substrate) alloys.push_back(*study.stack.environment.substrate);
  return fmt::format("# material table {}\n", study.stack.table->hash()) +
         study.stack.table->used_entries(alloys);
}

void write_all(hdf5::File& file, const Answer& answer) {
  const hdf5::Group root = file.root();
  root.attribute("title", answer.study.title);
  root.attribute("program", std::string("wellwright"));
  root.attribute("version", std::string(version()));
  root.attribute("format", std::string(format_name));
  root.attribute("format_version", std::string(format_version));
  root.attribute("created", now_utc());
  root.attribute("study", answer.study.text);
  root.attribute("settings", answer.study.settings);
  root.attribute("materials", materials_of(answer.study));
  root.attribute("assumptions", answer.notes.assumptions());
  root.attribute("warnings", answer.notes.warnings());
  root.attribute("converged", answer.converged ? 1 : 0);
  const Carrier first =
      answer.carriers.empty() ? Carrier::electron : answer.carriers.front().levels.profile.carrier;
  root.attribute("default", "/" + (answer.dynamics ? std::string("dynamics") : group_of("levels", first)));
  write_layers(root, answer);
  write_profile(root, answer);
  for (const CarrierAnswer& part : answer.carriers) write_carrier(root, part);
  for (const Interband& pairs : answer.interband) write_interband(root, pairs);
  if (!answer.dynamics) return;
  const CarrierAnswer* electrons = answer.find(Carrier::electron);
  write_dynamics(root, electrons ? electrons->levels : answer.carriers.front().levels, *answer.dynamics);
}

double bytes_of(const Answer& answer) {
  double numbers = 1e5;
  for (const CarrierAnswer& part : answer.carriers)
    numbers += static_cast<double>(part.levels.envelope.size()) *
               (2.0 + static_cast<double>(part.levels.companion.size()));
  if (answer.dynamics) {
    const auto times = static_cast<double>(answer.dynamics->time.size());
    numbers += times * (static_cast<double>(answer.dynamics->density_z.size()) +
                        3.0 * static_cast<double>(answer.dynamics->amplitude.size()) +
                        static_cast<double>(answer.dynamics->layer_probability.rows()));
  }
  return 8 * numbers;
}

}  // namespace

void check_target(const std::string& path) {
  std::error_code none;
  if (path.empty()) throw FileTrouble("the result file has no name");
  if (fs::is_directory(path, none)) throw FileTrouble(fmt::format("{}: this is a folder", path));
  const fs::path folder = folder_of(path);
  if (!fs::is_directory(folder, none))
    throw FileTrouble(fmt::format("{}: there is no folder {}", path, folder.string()));
  if (::access(folder.c_str(), W_OK) != 0)
    throw FileTrouble(fmt::format("{}: the folder cannot be written to: {}", path, why()));
  if (!fs::exists(path, none)) return;
  if (hdf5::root_attribute(path, "format") != format_name)
    throw FileTrouble(fmt::format(
        "{}: this file was not written by wellwright and is left as it is; choose another name with -o",
        path));
}

void write_result(const Answer& answer, const std::string& path) {
  check_target(path);
  Unfinished unfinished(path);
  try {
    hdf5::File file(unfinished.name(), bytes_of(answer) < largest_in_memory);
    write_all(file, answer);
    file.close();
  } catch (const hdf5::Trouble& trouble) {
    throw FileTrouble(fmt::format("{}: cannot be written: {} failed{}", path, trouble.doing,
                                  errno != 0 ? " (" + why() + ")" : ""));
  }
  unfinished.put_in_place();
}

std::string_view version() {
  return WELLWRIGHT_VERSION;
}

}  // namespace wellwright
