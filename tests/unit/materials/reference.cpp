// SPDX-License-Identifier: Apache-2.0
// docs/reference/materials.md says what the table's files say. With WELLWRIGHT_WRITE_PAGES set it is written
// anew.
#include <catch2/catch.hpp>
#include <cstdlib>
#include <fstream>

#include "wellwright/input.hpp"

using namespace wellwright;

namespace {

const std::string root = PROJECT_ROOT;

std::string text_of(const Node& value) {
  if (value.is_scalar()) return value.text();
  std::string text;
  for (const Node& item : value.items()) text += (text.empty() ? "" : ", ") + item.text();
  return text;
}

std::string cell(std::string text) {
  for (std::size_t at = 0; (at = text.find('|', at)) != std::string::npos; at += 2)
    text.replace(at, 1, "\\|");
  return text;
}

void rows(std::string& page, const Node& values) {
  page += "| quantity | value | source | remarks |\n|---|---|---|---|\n";
  for (const Node::Entry& entry : values.entries()) {
    const Node& v = entry.value;
    const bool difference = v["difference"].present();
    std::string remarks;
    const auto remark = [&](const std::string& text) { remarks += (remarks.empty() ? "" : "; ") + text; };
    if (difference) remark("difference to the first end, per power of x");
    if (v["recalled"].present()) remark("recalled");
    for (const char* key : {"trust", "range", "note", "also"})
      if (v[key].present())
        remark((key == std::string("note") ? "" : key + std::string(": ")) + v[key].text());
    page += "| " + entry.key + " | " + cell(text_of(v[difference ? "difference" : "value"])) + " | " +
            cell(v["source"].text()) + " | " + cell(remarks) + " |\n";
  }
  page += "\n";
}

void variants(std::string& page, const Node& node) {
  for (const Node::Entry& variant : node["variants"].entries()) {
    page += "Variant `" + variant.key + "`:\n\n";
    rows(page, variant.value);
  }
}

std::string page_of_table() {
  std::string page =
      "# The material table\n\n"
      "Made from `materials/*.yaml`; `wellwright materials NAME` prints what follows for an alloy at a "
      "temperature.\n"
      "Lattice constants hold at 300 K, gaps at 0 K. `recalled`: taken from memory of the work named, not "
      "read in it.\n"
      "Bowing C: value = (1 - x) first + x second - x (1 - x) C, C = c0 + c1 x + ...\n\n";
  for (const char* file : {"arsenides", "phosphides", "antimonides", "nitrides", "group-iv"}) {
    const std::string path = root + "/materials/" + file + ".yaml";
    const Node table = read_yaml(read_file(path), path);
    page += "## " + std::string(file) + "\n\n";
    for (const Node::Entry& binary : table["binaries"].entries()) {
      page += "### " + binary.key + " (" + binary.value["structure"].text() + ")\n\n";
      rows(page, binary.value["values"]);
      variants(page, binary.value);
    }
    for (const Node::Entry& alloy : table["alloys"].entries()) {
      page += "### " + alloy.key + ": bowing from " + alloy.value["from"].text() + " to " +
              alloy.value["to"].text() + ", x " + alloy.value["range"].text() + "\n\n";
      rows(page, alloy.value["bowing"]);
      variants(page, alloy.value);
    }
  }
  const std::string errors = root + "/materials/standard-errors.yaml",
                    sources = root + "/materials/sources.yaml";
  page += "## Standard errors by class\n\n| class | one standard error | source |\n|---|---|---|\n";
  const Node error_table = read_yaml(read_file(errors), errors),
             source_table = read_yaml(read_file(sources), sources);
  for (const Node::Entry& e : error_table["standard_errors"].entries())
    page += "| " + e.key + " | " + e.value["value"].text() + " | " + cell(e.value["source"].text()) + " |\n";
  page += "\n## Sources\n\n";
  for (const Node::Entry& s : source_table["sources"].entries())
    page += "- **" + s.key + "**: " + s.value.text() + "\n";
  return page;
}

}  // namespace

TEST_CASE("The reference page of the materials is what the table's files say") {
  const std::string path = root + "/docs/reference/materials.md", page = page_of_table();
  if (std::getenv("WELLWRIGHT_WRITE_PAGES")) std::ofstream(path) << page;
  CHECK(read_file(path) == page);
}
