// SPDX-License-Identifier: Apache-2.0
// Run at build time: reads materials/*.yaml and writes them as code, so that a run parses no table.
// Usage: generate OUT.cpp FILE.yaml...
#include <fmt/format.h>

#include <fstream>
#include <iostream>

#include "materials/raw_table.hpp"

namespace {

using namespace wellwright;

std::string literal(std::string_view text) {
  std::string out = "\"";
  for (const char c : text) {
    if (c == '"' || c == '\\') out += '\\';
    out += c;
  }
  return out + '"';
}

// FNV-1a over all files, so that a result names the table it was made with.
std::string hash_of(const std::vector<std::string>& texts) {
  std::uint64_t hash = 1469598103934665603ull;
  for (const std::string& text : texts)
    for (const char c : text) hash = (hash ^ static_cast<unsigned char>(c)) * 1099511628211ull;
  return fmt::format("{:016x}", hash);
}

std::string code_of(const OwnedTable& table, const std::string& hash) {
  std::string out =
      "// Generated from materials/*.yaml at build; edit those.\n#include \"materials/raw_table.hpp\"\n\n"
      "namespace wellwright {\nnamespace {\n\nconstexpr RawBinary binaries[] = {\n";
  constexpr const char* structures[] = {"zinc_blende", "wurtzite", "diamond"};
  for (const RawBinary& b : table.binaries)
    out += fmt::format("    {{{}, Structure::{}}},\n", literal(b.name),
                       structures[static_cast<int>(b.structure)]);
  out += "};\n\nconstexpr RawAlloy alloys[] = {\n";
  for (const RawAlloy& a : table.alloys)
    out += fmt::format("    {{{}, {}, {}, {}}},\n", literal(a.name), a.from, a.to, literal(a.range));
  out += "};\n\nconstexpr RawValue values[] = {\n";
  for (const RawValue& v : table.values)
    out += fmt::format(
        "    {{{}, {}, {}, P::{}, {}, {}, {{{:.17g}, {:.17g}, {:.17g}}}, {}, {}, {}, {}, {}}},\n", v.of_alloy,
        v.owner, literal(v.variant), parameter_table[static_cast<std::size_t>(v.parameter)].key, v.difference,
        v.terms, v.c[0], v.c[1], v.c[2], literal(v.source), literal(v.range), literal(v.note),
        literal(v.trust), v.recalled);
  out += "};\n\nconstexpr RawSource sources[] = {\n";
  for (const RawSource& s : table.sources)
    out += fmt::format("    {{{}, {}}},\n", literal(s.key), literal(s.text));
  out += "};\n\nconstexpr RawError errors[] = {\n";
  for (const RawError& e : table.errors)
    out += fmt::format("    {{{}, {:.17g}, {}, {}}},\n", literal(e.quantity_class), e.value, literal(e.unit),
                       literal(e.source));
  out += fmt::format(
      "}};\n\n}}  // namespace\n\nconst RawTable shipped_table{{binaries, alloys, values, sources, errors, "
      "{}}};\n\n"
      "}}  // namespace wellwright\n",
      literal(hash));
  return out;
}

}  // namespace

int main(int argc, char** argv) {
  try {
    std::vector<std::string> texts;
    std::vector<Node> roots;
    for (int i = 2; i < argc; ++i) {
      texts.push_back(read_file(argv[i]));
      roots.push_back(read_yaml(texts.back(), argv[i]));
    }
    OwnedTable table;
    read_tables(roots, table);
    std::ofstream(argv[1]) << code_of(table, hash_of(texts));
    return 0;
  } catch (const std::exception& error) {
    std::cerr << error.what() << '\n';
    return 1;
  }
}
