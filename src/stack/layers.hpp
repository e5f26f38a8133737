// SPDX-License-Identifier: Apache-2.0
// Layers as written, before media are resolved; private to the room.
#pragma once

#include <map>

#include "wellwright/stack.hpp"

namespace wellwright {

/// The declared keys of this room, ready for reading.
const Declarations& stack_declarations();

/// Reads alloys, each text once.
class AlloyReader {
 public:
  explicit AlloyReader(const MaterialTable& table) : table_(table) {}
  const Alloy& read(const Node& value, std::string_view key);

 private:
  const MaterialTable& table_;
  std::map<std::string, Alloy, std::less<>> known_;
};

/// A layer as it stands in the file; a repeat makes several layers of one.
struct WrittenLayer {
  Layer layer;  ///< without thickness, monolayer and densities
  const Node* node = nullptr;
  bool repeated = false;
};

struct WrittenLayers {
  std::vector<WrittenLayer> written;
  std::vector<std::size_t> order;  ///< indices into `written`, bottom to top, repeats unrolled
};

/// Reads names, alloys and repeats under `layers`, refusing counts above the limit before anything is
/// unrolled.
WrittenLayers read_layers(const Node& list, AlloyReader& alloys);

/// Thickness [nm] and densities of a written layer whose monolayer is known.
void read_measures(WrittenLayer& written);

}  // namespace wellwright
