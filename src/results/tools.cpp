// SPDX-License-Identifier: Apache-2.0
// Attributes, and the dimension scales, written as the specification of dimension scales lays them out: the
// library's own calls read and write both lists again for each axis of each dataset, a third of the time a
// small file takes.
//
// Source: The HDF Group, "HDF5 Dimension Scale Specification".
#include "results/tools.hpp"

namespace wellwright::hdf5 {
namespace {

constexpr const char* making_type = "making a type";

Handle text_type() {
  Handle type(H5Tcopy(H5T_C_S1), H5Tclose, making_type);
  check(H5Tset_size(type.id(), H5T_VARIABLE), making_type);
  check(H5Tset_cset(type.id(), H5T_CSET_UTF8), making_type);
  return type;
}

Handle use_type() {
  Handle type(H5Tcreate(H5T_COMPOUND, sizeof(Use)), H5Tclose, making_type);
  check(H5Tinsert(type.id(), "dataset", HOFFSET(Use, dataset), H5T_STD_REF_OBJ), making_type);
  check(H5Tinsert(type.id(), "dimension", HOFFSET(Use, dimension), H5T_NATIVE_INT), making_type);
  return type;
}

Handle space_of(hsize_t length) {
  return {H5Screate_simple(1, &length, nullptr), H5Sclose, "making a space"};
}

// Conversions of texts get by with this many bytes at a time; the library would clear a megabyte for each.
Handle transfer_with_small_buffer() {
  Handle plist(H5Pcreate(H5P_DATASET_XFER), H5Pclose, "making properties");
  check(H5Pset_buffer(plist.id(), 16384, nullptr, nullptr), "making properties");
  return plist;
}

}  // namespace

Handle ordered(hid_t kind) {
  Handle plist(H5Pcreate(kind), H5Pclose, "making properties");
  constexpr unsigned order = H5P_CRT_ORDER_TRACKED | H5P_CRT_ORDER_INDEXED;
  check(H5Pset_attr_creation_order(plist.id(), order), "tracking the order of attributes");
  // Some twenty attributes or links are found faster in the object's header than through heaps and trees.
  constexpr unsigned most = 64, least = 48, expected = 24, name_length = 24;
  check(H5Pset_attr_phase_change(plist.id(), most, least), "making properties");
  if (kind == H5P_DATASET_CREATE) return plist;
  check(H5Pset_link_creation_order(plist.id(), order), "tracking the order of groups");
  check(H5Pset_link_phase_change(plist.id(), most, least), "making properties");
  check(H5Pset_est_link_info(plist.id(), expected, name_length), "making properties");
  return plist;
}

hobj_ref_t reference_to(hid_t dataset) {
  hobj_ref_t out = 0;
  check(H5Rcreate(&out, dataset, ".", H5R_OBJECT, -1), "attaching an axis");
  return out;
}

Tools::Tools()
    : text(text_type()),
      references(H5Tvlen_create(H5T_STD_REF_OBJ), H5Tclose, making_type),
      use(use_type()),
      scalar(H5Screate(H5S_SCALAR), H5Sclose, "making a space"),
      group(ordered(H5P_GROUP_CREATE)),
      dataset(ordered(H5P_DATASET_CREATE)),
      small_buffer(transfer_with_small_buffer()) {}

void Tools::write_attribute(hid_t object, const char* name, hid_t type, hid_t space,
                            const void* value) const {
  const Handle attribute(H5Acreate2(object, name, type, space, H5P_DEFAULT, H5P_DEFAULT), H5Aclose,
                         "writing an attribute");
  if (value) check(H5Awrite(attribute.id(), type, value), "writing an attribute");
}

void Tools::write_text(hid_t object, const char* name, const std::string& words) const {
  const char* value = words.c_str();
  write_attribute(object, name, text.id(), scalar.id(), &value);
}

void Tools::describe(hid_t object, const Words& words) const {
  write_text(object, "long_name", words.long_name);
  if (!words.units.empty()) write_text(object, "units", words.units);
  if (!words.comment.empty()) write_text(object, "comment", words.comment);
}

void Tools::attach(hid_t object, const std::vector<Axis*>& to) const {
  std::vector<hvl_t> list;
  const hobj_ref_t self = reference_to(object);
  for (std::size_t i = 0; i < to.size(); ++i) {
    list.push_back({1, &to[i]->reference});
    to[i]->uses.push_back({self, static_cast<int>(i)});
  }
  const Handle space = space_of(list.size());
  write_attribute(object, "DIMENSION_LIST", references.id(), space.id(), list.data());
}

void Tools::make_scale(hid_t object, const std::string& name) const {
  const auto put = [&](const char* attribute, const std::string& value) {
    const Handle type(H5Tcopy(H5T_C_S1), H5Tclose, making_type);
    check(H5Tset_size(type.id(), value.size() + 1), making_type);
    write_attribute(object, attribute, type.id(), scalar.id(), value.c_str());
  };
  put("CLASS", "DIMENSION_SCALE");
  put("NAME", name);
}

void Tools::write_uses() {
  for (const Axis& axis : axes) {
    if (axis.uses.empty()) continue;
    const Handle space = space_of(axis.uses.size());
    write_attribute(axis.dataset.id(), "REFERENCE_LIST", use.id(), space.id(), axis.uses.data());
  }
  axes.clear();
}

}  // namespace wellwright::hdf5
