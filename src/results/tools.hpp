// SPDX-License-Identifier: Apache-2.0
// Types, spaces and property lists of a file being written, made once, and its axes; private to the room.
#pragma once

#include <hdf5.h>

#include <deque>

#include "results/hdf5.hpp"

namespace wellwright::hdf5 {

inline hid_t checked(hid_t id, const char* doing) {
  if (id < 0) throw Trouble{doing};
  return id;
}
inline void check(herr_t code, const char* doing) {
  if (code < 0) throw Trouble{doing};
}

/// A use of an axis, as the reference list of a dimension scale holds it.
struct Use {
  hobj_ref_t dataset;
  int dimension;
};

/// A one-dimensional dataset that is a dimension scale, and the datasets over it.
struct Axis {
  std::size_t length;
  Handle dataset;
  hobj_ref_t reference;
  std::vector<Use> uses;
};

/// Creation order tracked for attributes, and for links where the kind has them.
Handle ordered(hid_t kind);
hobj_ref_t reference_to(hid_t dataset);

struct Tools {
  Tools();

  Handle text, references, use;         ///< types: text, list of references, use of an axis
  Handle scalar;                        ///< the space of one value
  Handle group, dataset, small_buffer;  ///< properties of groups, of datasets, of transfers of texts
  std::deque<Axis> axes;

  void write_attribute(hid_t object, const char* name, hid_t type, hid_t space, const void* value) const;
  void write_text(hid_t object, const char* name, const std::string& text) const;
  void describe(hid_t object, const Words& words) const;
  /// Attaches the axes to a dataset, one a dimension.
  void attach(hid_t object, const std::vector<Axis*>& to) const;
  /// Makes the dataset a dimension scale.
  void make_scale(hid_t object, const std::string& name) const;
  /// Writes which datasets use each axis, once all are made.
  void write_uses();
};

}  // namespace wellwright::hdf5
