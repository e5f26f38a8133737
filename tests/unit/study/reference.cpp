// SPDX-License-Identifier: Apache-2.0
// The manual's page of study keys and the editor's schema say what the declarations say.
#include <catch2/catch.hpp>
#include <fstream>
#include <nlohmann/json.hpp>
#include <set>
#include <sstream>

#include "wellwright/study.hpp"

using namespace wellwright;

namespace {

std::string contents(const std::string& file) {
  std::ifstream stream(PROJECT_ROOT "/docs/reference/" + file);
  REQUIRE(stream);
  std::stringstream text;
  text << stream.rdbuf();
  return text.str();
}

// The schema's node of a key path such as "layers[].graded.from"; null where there is none.
const nlohmann::json* find(const nlohmann::json& node, const nlohmann::json& root, const std::string& path) {
  if (node.contains("$ref")) {
    const std::string reference = node["$ref"];
    return find(root.at(nlohmann::json::json_pointer(reference.substr(1))), root, path);
  }
  if (path.empty()) return &node;
  for (const char* choice : {"anyOf", "oneOf"})
    if (node.contains(choice))
      for (const auto& one : node[choice])
        if (const auto* found = find(one, root, path)) return found;
  if (path.starts_with("[]")) {
    if (!node.contains("items")) return nullptr;
    return find(node["items"], root, path.substr(path.size() > 2 && path[2] == '.' ? 3 : 2));
  }
  const std::string key = path.substr(0, path.find_first_of(".["));
  std::string rest = path.substr(key.size());
  if (rest.starts_with('.')) rest.erase(0, 1);
  if (!node.contains("properties") || !node["properties"].contains(key)) return nullptr;
  return find(node["properties"][key], root, rest);
}

}  // namespace

TEST_CASE("docs/reference/study.md lists every key with its default and its sentence, and no other") {
  const std::string page = contents("study.md");
  std::set<std::string> declared;
  for (const auto& key : study_keys()) {
    CAPTURE(key.path);
    if (key.step > 1) {
      CHECK(page.find("- `" + key.path + "`") != std::string::npos);
      continue;
    }
    declared.insert(key.path);
    const auto at = page.find("| `" + key.path + "` |");
    if (at == std::string::npos) {
      FAIL_CHECK("the page lacks this key");
      continue;
    }
    const std::string row = page.substr(at, page.find('\n', at) - at);
    CHECK(row.ends_with("| " + key.sentence + " |"));
    CHECK(row.find(key.default_text.empty() ? "|  |" : "| `" + key.default_text + "` |") !=
          std::string::npos);
    for (const auto& word : key.allowed) CHECK(row.find("`" + word + "`") != std::string::npos);
    for (const auto& [word, step] : key.later)
      CHECK(page.find("- `" + key.path + ": " + word + "`") != std::string::npos);
  }
  std::istringstream lines(page);
  for (std::string line; std::getline(lines, line);)
    if (line.starts_with("| `")) {
      const std::string path = line.substr(3, line.find('`', 3) - 3);
      CAPTURE(path);
      CHECK(declared.count(path) == 1);
    }
}

TEST_CASE("docs/reference/study.schema.json knows every key") {
  const auto schema = nlohmann::json::parse(contents("study.schema.json"));
  for (const auto& key : study_keys()) {
    if (key.step > 1) continue;
    CAPTURE(key.path);
    const auto* node = find(schema, schema, key.path);
    if (!node) {
      FAIL_CHECK("the schema lacks this key");
      continue;
    }
    if (node->contains("description")) CHECK((*node)["description"] == key.sentence);
  }
}
