// SPDX-License-Identifier: Apache-2.0
// The keys of the study file that make the stack, declared once.
#include "wellwright/stack.hpp"

namespace wellwright {

const std::vector<KeyDeclaration>& stack_keys() {
  using enum Dimension;
  static const std::vector<KeyDeclaration> keys = {
      {.path = "substrate",
       .type = "text",
       .sentence = "The alloy that sets the in-plane lattice constant; absent, the layers are taken as "
                   "unstrained and "
                   "this is said."},
      {.path = "growth_plane",
       .type = "word",
       .allowed = {"(001)", "(0001)", "(000-1)"},
       .sentence =
           "Plane of growth: (001) for zinc blende and diamond, (0001) or (000-1) for wurtzite; absent, it "
           "follows from the layers."},
      {.path = "temperature",
       .type = "quantity",
       .dimensions = {temperature},
       .default_text = "300 K",
       .sentence = "Lattice temperature.",
       .other_names = {"T"}},
      {.path = "materials",
       .type = "map",
       .sentence = "Values that override the material table for this study, or media of its own, by name."},
      {.path = "layers",
       .type = "list",
       .sentence = "The layers from the bottom (substrate side) to the top.",
       .other_names = {"stack", "structure", "heterostructure", "regions"}},
      {.path = "layers[].material",
       .type = "text",
       .sentence = "The alloy of the layer, such as Al0.3Ga0.7As, or a medium of the study.",
       .other_names = {"alloy", "composition", "medium", "x"}},
      {.path = "layers[].graded",
       .type = "map",
       .sentence = "A layer that runs from one alloy to another; instead of `material`."},
      {.path = "layers[].graded.from", .type = "text", .sentence = "The alloy at the bottom face."},
      {.path = "layers[].graded.to", .type = "text", .sentence = "The alloy at the top face."},
      {.path = "layers[].graded.shape",
       .type = "word or map",
       .default_text = "linear",
       .allowed = {"linear", "parabolic"},
       .sentence =
           "How the fractions run: linear, parabolic or {power: q}. The vertex is the face with the lower "
           "conduction band edge."},
      {.path = "layers[].graded.shape.power",
       .type = "number",
       .dimensions = {number},
       .sentence = "The power q of the distance from the vertex, above 0 and at most 20."},
      {.path = "layers[].thickness",
       .type = "quantity",
       .dimensions = {length, monolayers},
       .sentence = "A length, or whole or part monolayers (ML) of the layer's own strained lattice at 300 K.",
       .other_names = {"width", "length", "d", "t", "monolayers"}},
      {.path = "layers[].name",
       .type = "text",
       .sentence =
           "A name for addresses and tables; it holds no dot and no bracket and is not a plain number."},
      {.path = "layers[].donors",
       .type = "quantity",
       .dimensions = {sheet_density, volume_density},
       .default_text = "0 cm^-2",
       .sentence = "Fully ionised donors, spread evenly over the layer; a density per area or per volume, as "
                   "the unit says.",
       .other_names = {"doping", "doped", "n", "ND", "Nd"}},
      {.path = "layers[].acceptors",
       .type = "quantity",
       .dimensions = {sheet_density, volume_density},
       .default_text = "0 cm^-2",
       .sentence = "Fully ionised acceptors, likewise.",
       .other_names = {"p", "NA", "Na"}},
      {.path = "layers[].repeat",
       .type = "whole number",
       .sentence =
           "How many times the `layers` beside it follow one another; repeats may stand inside repeats."},
      {.path = "layers[].layers", .type = "list", .sentence = "The layers that are repeated."},
      {.path = "model.strain",
       .type = "on|off",
       .default_text = "on",
       .sentence = "Whether layers are strained to the substrate; on where a substrate is given."},
      {.path = "model.offset_ratio",
       .type = "number",
       .dimensions = {number},
       .sentence =
           "Share of the difference of the gaps that the conduction band takes, instead of the tabled "
           "offsets."},
      {.path = "model.interdiffusion",
       .type = "quantity",
       .dimensions = {length},
       .default_text = "0 nm",
       .sentence = "Rms width of the Gaussian that smears every interface."},
  };
  return keys;
}

}  // namespace wellwright
