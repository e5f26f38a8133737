// SPDX-License-Identifier: Apache-2.0
// What stands in a result file, and writing it.
#include <fmt/format.h>

#include <cerrno>
#include <cstring>
#include <ctime>

#include "results/groups.hpp"
#include "results/names.hpp"
#include "results/target.hpp"
#include "results/unfinished.hpp"
#include "wellwright/results.hpp"

namespace wellwright {
namespace {

std::string now_utc() {
  const std::time_t now = std::time(nullptr);
  std::tm parts{};
  gmtime_r(&now, &parts);
  char text[32];
  std::strftime(text, sizeof text, "%Y-%m-%dT%H:%M:%SZ", &parts);
  return text;
}

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
  if (answer.charge) write_charge(root, *answer.charge);
  for (const CarrierAnswer& part : answer.carriers) write_carrier(root, part);
  for (const Interband& pairs : answer.interband) write_interband(root, pairs);
  if (!answer.dynamics) return;
  const CarrierAnswer* electrons = answer.find(Carrier::electron);
  write_dynamics(root, electrons ? electrons->levels : answer.carriers.front().levels, *answer.dynamics);
}

}  // namespace

void write_result(const Answer& answer, const std::string& path) {
  check_target(path);
  const std::filesystem::path target = writable_file(path);
  Unfinished unfinished(target, path);
  try {
    hdf5::File file(unfinished.name());
    write_all(file, answer);
    file.close();
  } catch (const hdf5::Trouble& trouble) {
    throw FileTrouble(fmt::format("{}: cannot be written: {} failed{}", path, trouble.doing,
                                  errno != 0 ? fmt::format(" ({})", std::strerror(errno)) : ""));
  }
  unfinished.put_in_place();
  sync_folder(folder_of(target));
}

std::string_view version() {
  return WELLWRIGHT_VERSION;
}

}  // namespace wellwright
