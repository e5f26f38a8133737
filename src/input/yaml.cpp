// SPDX-License-Identifier: Apache-2.0
// YAML text to a located tree, through the event parser of yaml-cpp, whose traps are refused or mended here.
#include <fmt/format.h>
#include <yaml-cpp/eventhandler.h>
#include <yaml-cpp/yaml.h>

#include <algorithm>
#include <filesystem>
#include <fstream>
#include <sstream>
#include <unordered_map>

#include "input/lines.hpp"
#include "wellwright/input.hpp"

namespace wellwright {
namespace {

class Builder : public YAML::EventHandler {
 public:
  Builder(const Lines& lines, const InputLimits& limits) : lines_(lines), limits_(limits) {}
  Node take() { return std::move(root_); }

  void OnDocumentStart(const YAML::Mark&) override {}
  void OnDocumentEnd() override {}
  void OnNull(const YAML::Mark& mark, YAML::anchor_t anchor) override {
    // The parser puts nothing where the next thing begins: a value that is missing belongs to its key.
    const bool of_key = !frames_.empty() && frames_.back().key_waits;
    add(Node::make_null(of_key ? frames_.back().key_place : place(mark)), mark, anchor);
  }
  void OnAlias(const YAML::Mark& mark, YAML::anchor_t anchor) override {
    const auto found = anchors_.find(anchor);
    if (found == anchors_.end())
      throw InputError("this alias stands inside the value it names", place(mark), "write the value out");
    nodes_ += found->second.size;
    check_size(mark);
    Node copy = found->second.node;
    add(std::move(copy), mark, 0);
  }
  void OnScalar(const YAML::Mark& mark, const std::string& tag, YAML::anchor_t anchor,
                const std::string& value) override {
    if (tag != "?" && tag != "!" && !tag.empty())
      throw InputError("tags are not used here", place(mark), "take the word with the ! out");
    if (tag == "!" && !lines_.closes_quote(mark.line, static_cast<std::size_t>(std::max(mark.column, 0))))
      throw InputError("this quotation mark is not closed", place(mark),
                       "close the text with the mark it began with");
    add(Node::make_scalar(value, place(mark, characters(value)), tag == "!"), mark, anchor);
  }
  void OnSequenceStart(const YAML::Mark& mark, const std::string& tag, YAML::anchor_t anchor,
                       YAML::EmitterStyle::value) override {
    open(mark, tag, anchor, false);
  }
  void OnMapStart(const YAML::Mark& mark, const std::string& tag, YAML::anchor_t anchor,
                  YAML::EmitterStyle::value) override {
    open(mark, tag, anchor, true);
  }
  void OnSequenceEnd() override { close(); }
  void OnMapEnd() override { close(); }

 private:
  struct Frame {
    bool map = false;
    YAML::Mark mark;
    YAML::anchor_t anchor = 0;
    std::size_t nodes_before = 0;
    std::vector<Node> items;
    std::vector<Node::Entry> entries;
    std::unordered_map<std::string, std::size_t> keys;
    bool key_waits = false;
    std::string key;
    Place key_place;
  };
  struct Anchored {
    Node node;
    std::size_t size = 0;
  };

  Place place(const YAML::Mark& mark, int length = 1) const {
    return lines_.place(mark.line, static_cast<std::size_t>(std::max(mark.column, 0)), length);
  }

  void check_size(const YAML::Mark& mark) const {
    if (nodes_ > limits_.nodes)
      throw InputError(fmt::format("the file holds more than {} values, aliases written out", limits_.nodes),
                       place(mark), "this is the limit on the size of an input file");
  }

  void open(const YAML::Mark& mark, const std::string& tag, YAML::anchor_t anchor, bool map) {
    if (tag != "?" && tag != "!" && !tag.empty())
      throw InputError("tags are not used here", place(mark), "take the word with the ! out");
    if (static_cast<int>(frames_.size()) >= limits_.depth)
      throw InputError(fmt::format("the lists and maps are nested more than {} deep", limits_.depth),
                       place(mark), "this is the limit on the depth of an input file");
    refuse_as_key(mark);
    ++nodes_;
    check_size(mark);
    Frame frame;
    frame.map = map;
    frame.mark = mark;
    frame.anchor = anchor;
    frame.nodes_before = nodes_;
    frames_.push_back(std::move(frame));
  }

  // A list or a map cannot be a key.
  void refuse_as_key(const YAML::Mark& mark) const {
    if (!frames_.empty() && frames_.back().map && !frames_.back().key_waits)
      throw InputError("a list or a map stands where a key belongs", place(mark),
                       "a key is one word; a { or [ above may not be closed");
  }

  void close() {
    Frame frame = std::move(frames_.back());
    frames_.pop_back();
    Node node = frame.map ? Node::make_map(std::move(frame.entries), place(frame.mark))
                          : Node::make_sequence(std::move(frame.items), place(frame.mark));
    if (frame.anchor != 0) anchors_[frame.anchor] = {node, nodes_ - frame.nodes_before + 1};
    attach(std::move(node), frame.mark);
  }

  void add(Node node, const YAML::Mark& mark, YAML::anchor_t anchor) {
    ++nodes_;
    check_size(mark);
    if (anchor != 0) anchors_[anchor] = {node, 1};
    attach(std::move(node), mark);
  }

  void attach(Node node, const YAML::Mark& mark) {
    if (frames_.empty()) {
      root_ = std::move(node);
      return;
    }
    Frame& frame = frames_.back();
    if (!frame.map) {
      frame.items.push_back(std::move(node));
      return;
    }
    if (!frame.key_waits) {
      if (!node.is_scalar())
        throw InputError(node.kind() == Node::Kind::null ? "a key is missing before the colon"
                                                         : "a list or a map stands where a key belongs",
                         place(mark), "a key is one word");
      if (node.text() == "<<")
        throw InputError("merge keys are not used here", place(mark), "write the keys out");
      const auto [found, fresh] = frame.keys.emplace(node.text(), frame.entries.size());
      if (!fresh)
        throw InputError(fmt::format("the key `{}` stands twice", node.text()), node.place(),
                         frame.entries[found->second].key_place, "keep one of them");
      frame.key = node.text();
      frame.key_place = node.place();
      frame.key_waits = true;
      return;
    }
    frame.entries.push_back({std::move(frame.key), std::move(frame.key_place), std::move(node)});
    frame.key_waits = false;
  }

  const Lines& lines_;
  const InputLimits& limits_;
  std::vector<Frame> frames_;
  std::unordered_map<YAML::anchor_t, Anchored> anchors_;
  std::size_t nodes_ = 0;
  Node root_;
};

struct Translation {
  const char* theirs;
  const char* sentence;
  const char* hint;
};

// What the parser says, in the user's words.
constexpr Translation translations[] = {
    {"end of map flow not found", "a { is not closed", "close it with }"},
    {"end of sequence flow not found", "a [ is not closed", "close it with ]"},
    {"end of map not found", "this line does not belong to the map above it",
     "check the indentation: keys of one map begin in one column"},
    {"end of sequence not found", "this line does not belong to the list above it",
     "check the indentation: the dashes of one list stand in one column"},
    {"illegal map value", "a colon stands where no key can be",
     "the key above may lack its colon or the blank after it; a text that contains a colon stands in quotes"},
    {"illegal block entry", "a dash stands where no list can be", "put the list on a line of its own"},
    {"illegal map key", "a ? stands where no key can be", "take it out"},
    {"illegal flow end", "a bracket closes that was not opened", "take it out"},
    {"illegal EOF in scalar", "a quote is not closed", "close the text with the quote it began with"},
    {"unknown escape character", "this escape is unknown", "write a backslash as \\\\ in double quotes"},
    {"the referenced anchor is not defined", "this alias names nothing above it", "write the value out"},
    {"cannot assign multiple anchors", "a value has two anchors", "take one out"},
    {"unknown token", "this character begins nothing that is known",
     "put a text that begins with it in quotes"},
};

InputError translated(const YAML::Exception& trouble, const Lines& lines) {
  const Place place =
      lines.place(std::max(trouble.mark.line, 0), static_cast<std::size_t>(std::max(trouble.mark.column, 0)));
  for (const Translation& t : translations)
    if (trouble.msg.find(t.theirs) != std::string::npos) return {t.sentence, place, t.hint};
  return {"this is no valid YAML", place,
          "check quotes, brackets and the indentation here and in the line above"};
}

}  // namespace

Node read_yaml(std::string_view text, const std::string& file, const InputLimits& limits) {
  if (text.size() > limits.file_bytes) {
    Place place;
    place.file = file;
    throw InputError(fmt::format("the file is larger than {} MiB", limits.file_bytes >> 20), place,
                     "this is the limit on the size of an input file");
  }
  const Lines lines(text, file);
  Builder builder(lines, limits);
  try {
    std::istringstream stream(lines.text());
    YAML::Parser parser(stream);
    if (!parser.HandleNextDocument(builder)) return Node::make_null(lines.place(0, 0));
    Node root = builder.take();
    Builder second(lines, limits);
    if (parser.HandleNextDocument(second)) {
      const Node other = second.take();
      throw InputError("a second document begins here", other.place(),
                       "a file holds one document; take the --- out");
    }
    return root;
  } catch (const YAML::Exception& trouble) {
    throw translated(trouble, lines);
  }
}

std::string read_file(const std::string& path, std::size_t limit) {
  namespace fs = std::filesystem;
  std::error_code error;
  if (!fs::exists(path, error)) throw FileTrouble(fmt::format("{}: there is no such file", path));
  if (fs::is_directory(path, error)) throw FileTrouble(fmt::format("{}: this is a folder", path));
  std::ifstream file(path, std::ios::binary);
  if (!file) throw FileTrouble(fmt::format("{}: the file cannot be read", path));
  std::string text;
  char part[1 << 16];
  while (file.read(part, sizeof part) || file.gcount() > 0) {
    text.append(part, static_cast<std::size_t>(file.gcount()));
    if (text.size() > limit)
      throw FileTrouble(
          fmt::format("{}: the file is larger than {} MiB, the limit on an input file", path, limit >> 20));
  }
  if (file.bad()) throw FileTrouble(fmt::format("{}: the file cannot be read", path));
  return text;
}

}  // namespace wellwright
