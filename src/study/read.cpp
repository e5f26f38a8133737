// SPDX-License-Identifier: Apache-2.0
// The study file: settings applied, keys checked, parts read, contradictions refused.
#include "study/read.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace wellwright {
namespace {

constexpr double hard_face_reach = 5;  // donors nearer to a hard face than this are warned of [nm]

void check_periodic(const Node& root, const Study& study) {
  const Place& ends = root["model"]["ends"].place();
  const char* hint = "a periodic stack has no field and no outer faces; write ends: hard";
  for (const char* key : {"field", "bias"})
    if (root[key].present() && study.field != 0)
      throw InputError(fmt::format("`{}` stands with `ends: periodic`", key), root.key_place(key), ends,
                       hint);
  if (root["dynamics"].present())
    throw InputError("`dynamics` stands with `ends: periodic`", root.key_place("dynamics"), ends,
                     "beats are computed between hard ends; repeat the cell and write ends: hard");
}

void warn_of_faces(const Study& study, Notes& notes) {
  if (study.model.ends != Ends::hard) return;
  const auto faces = study.stack.faces();
  for (std::size_t i = 0; i < study.stack.layers.size(); ++i) {
    const Layer& layer = study.stack.layers[i];
    if (layer.donors == 0 && layer.acceptors == 0) continue;
    const auto warn = [&](const char* face) {
      notes.warn(fmt::format("layer {}: dopants lie within {:g} nm of the hard {} face",
                             layer.label(static_cast<int>(i) + 1), hard_face_reach, face));
    };
    if (faces[i] < hard_face_reach) warn("bottom");
    if (faces[i + 1] > faces.back() - hard_face_reach) warn("top");
  }
}

void say_charge(const Study& study, Notes& notes) {
  double donors = 0, acceptors = 0;
  bool polar = false;
  for (const Layer& layer : study.stack.layers) {
    donors += layer.donors;
    acceptors += layer.acceptors;
  }
  for (const BandParameters& bands : study.stack.bands)
    polar =
        polar || (study.model.polarization && bands.polarization != study.stack.bands.front().polarization);
  const bool doped = donors > 0 || acceptors > 0,
             pinned = study.model.bottom.pinned || study.model.top.pinned;
  if (study.model.self_consistent && !doped && !pinned && !polar)
    notes.warn("the stack holds no charge: no donors, acceptors, pinned faces or polarization");
}

}  // namespace

Study read_study(const std::string& text, const std::string& file, const MaterialTable& table,
                 const std::vector<std::string>& settings, Notes& notes) {
  Node root = read_yaml(text, file);
  if (!root.is_map())
    throw InputError(root.present() && root.kind() != Node::Kind::null ? "the study is not a map of keys"
                                                                       : "the study is empty",
                     root.place(),
                     "start with layers: and one line a layer: - {material: GaAs, thickness: 10 nm}");
  study_declarations().check(root, "");  // before the settings: the file's own mistakes come first
  apply_settings(root, settings, table);
  const auto& keys = study_declarations();
  keys.check(root, "");
  const Node& model = root["model"];
  if (model.present()) {
    if (!model.is_map()) throw InputError("`model` is not a map", model.place(), "write model: {bands: two}");
    keys.check(model, "model");
  }

  Study study;
  study.text = text;
  study.file = file;
  study.settings = settings;
  if (root["title"].present()) study.title = root["title"].string("title");
  study.stack = read_stack(root, table, notes);
  study.model = read_model(root, study.stack);

  const Node &field = root["field"], &bias = root["bias"];
  if (field.present() && bias.present())
    throw InputError("both `field` and `bias` are given", root.key_place("bias"), root.key_place("field"),
                     "the field follows from the bias and the length; keep one of them");
  study.field = keys.quantity(root, "field");
  if (bias.present()) {
    study.bias = bias.quantity("bias", Dimension::voltage);
    study.field = -*study.bias / study.stack.length();
  }
  if (study.model.ends == Ends::periodic) check_periodic(root, study);
  study.carrier_temperature = root["carrier_temperature"].present()
                                  ? keys.quantity(root, "carrier_temperature")
                                  : study.stack.environment.temperature;
  if (study.carrier_temperature < 0)
    throw InputError("`carrier_temperature` is below zero", root["carrier_temperature"].place(),
                     "0 K is the limit of filled and empty states");
  if (bias.present() && (study.model.bottom.pinned || study.model.top.pinned))
    throw InputError("both `bias` and a pinned face are given", root.key_place("bias"),
                     root["model"].key_place("faces"),
                     "each fixes the potential of a face; keep one of them");
  say_charge(study, notes);
  if (root["dynamics"].present()) study.dynamics = read_dynamics(root, study);
  check_media(root, study);
  warn_of_faces(study, notes);
  return study;
}

}  // namespace wellwright
