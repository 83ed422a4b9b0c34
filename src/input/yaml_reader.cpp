#include "input/yaml_reader.h"

#include <fmt/format.h>
#include <yaml-cpp/exceptions.h>
#include <yaml-cpp/parser.h>

#include <algorithm>
#include <cerrno>
#include <cstring>
#include <exception>
#include <filesystem>
#include <fstream>
#include <new>
#include <sstream>

#include "input/yaml_builder.h"
#include "input/yaml_text.h"

namespace gaskettle {
namespace {

struct Hint {
  const char* library_words;
  const char* plain_words;
};

// What the library says, and what it most often means to the writer of a model.
constexpr Hint hints[] = {
    {YAML::ErrorMsg::END_OF_MAP, "the indentation does not fit the lines above"},
    {YAML::ErrorMsg::END_OF_SEQ, "the indentation does not fit the list above"},
    {YAML::ErrorMsg::END_OF_MAP_FLOW, "a '{' is not closed, or a comma is missing"},
    {YAML::ErrorMsg::END_OF_SEQ_FLOW, "a '[' is not closed, or a comma is missing"},
    {YAML::ErrorMsg::MAP_VALUE,
     "a ': ' where no value can begin; check the line above, and put text that holds ': ' "
     "in quotes"},
    {YAML::ErrorMsg::MAP_KEY, "a key where none can begin; check the indentation and the line above"},
    {YAML::ErrorMsg::BLOCK_ENTRY, "a list item where none can begin; put it on a line of its own, or use [ ]"},
    {YAML::ErrorMsg::FLOW_END, "a closing bracket that nothing opens"},
    {YAML::ErrorMsg::UNKNOWN_TOKEN, "a character that cannot begin a value; put the text in quotes"},
    {YAML::ErrorMsg::UNKNOWN_ANCHOR,
     "an alias '*name' without '&name' before it; put text that begins with '*' in "
     "quotes"},
    {YAML::ErrorMsg::ALIAS_NOT_FOUND, "a '*' without a name; put text that begins with '*' in quotes"},
    {YAML::ErrorMsg::ANCHOR_NOT_FOUND, "a '&' without a name; put text that begins with '&' in quotes"},
    {YAML::ErrorMsg::INVALID_ESCAPE, "a '\\' in double quotes begins an escape; use single quotes for plain text"},
    {YAML::ErrorMsg::TAB_IN_INDENTATION, "a tab in the indentation; indent with spaces"},
    {YAML::ErrorMsg::DOC_IN_SCALAR, "a document marker inside quoted text"},
};

std::string plain_words(const std::string& library_words) {
  for (const Hint& hint : hints)
    if (library_words.starts_with(hint.library_words))
      return fmt::format("{} (YAML: {})", hint.plain_words, library_words);
  return fmt::format("this is not valid YAML: {}", library_words);
}

void report(const YAML::Exception& error, const YamlText& text, TreeBuilder& builder, Problems& problems) {
  std::string message = plain_words(error.msg);
  const Node* open = builder.open_node();
  const bool unclosed = error.msg == YAML::ErrorMsg::END_OF_MAP_FLOW || error.msg == YAML::ErrorMsg::END_OF_SEQ_FLOW;
  // In a bracket that is never closed the library takes anything for a key.
  if (!unclosed) builder.report_missing_colons();
  if (unclosed && open)
    message += fmt::format("; it opens in line {}, column {}", open->place.line, open->place.column);
  const Place place = error.mark.is_null() ? text.start() : text.place(error.mark.line, error.mark.column);
  problems.add(place, std::move(message));
}

Node parse(const YamlText& text, Problems& problems) {
  TreeBuilder builder(text, problems);
  try {
    std::istringstream stream(text.bytes());
    YAML::Parser parser(stream);
    while (parser.HandleNextDocument(builder)) {
    }
    builder.report_missing_colons();
    return builder.take_root();
  } catch (const YamlRefusal& refusal) {
    builder.report_missing_colons();
    problems.add(refusal.place, refusal.message);
  } catch (const YAML::Exception& error) {
    report(error, text, builder, problems);
  } catch (const std::bad_alloc&) {
    throw;
  } catch (const std::exception& error) {
    problems.add(text.start(), fmt::format("the YAML library gave up on this text: {}", error.what()));
  }
  return {};
}

// The library looks far ahead from each bracket before it says anything; so their number is bounded first.
bool within_size(std::size_t written, const YamlText& text, Problems& problems) {
  const std::string& bytes = text.bytes();
  const auto brackets = std::count(bytes.begin(), bytes.end(), '[') + std::count(bytes.begin(), bytes.end(), '{');
  if (written > YamlLimits::text_bytes)
    problems.add(text.start(), fmt::format("the text is longer than {} bytes; put long tables into a CSV file",
                                           YamlLimits::text_bytes));
  else if (static_cast<std::size_t>(brackets) > YamlLimits::nodes)
    problems.add(text.start(), fmt::format("the text opens more than {} brackets; put long tables into a CSV file",
                                           YamlLimits::nodes));
  else
    return true;
  return false;
}

}  // namespace

std::optional<std::string> read_text_file(const std::string& path, Place place, Problems& problems) {
  if (!place.file) place.file = std::make_shared<const std::string>(path);
  const auto refuse = [&](const std::string& reason) {
    problems.add(place, fmt::format("cannot read '{}': {}", path, reason));
    return std::nullopt;
  };
  std::error_code ignored;
  if (std::filesystem::is_directory(path, ignored)) return refuse("it is a folder, not a file");
  errno = 0;
  std::ifstream file(path, std::ios::binary);
  if (!file) return refuse(errno != 0 ? std::strerror(errno) : "it does not open");
  std::string text, block(64U << 10, '\0');
  while (file && text.size() <= YamlLimits::text_bytes) {
    file.read(block.data(), static_cast<std::streamsize>(block.size()));
    text.append(block, 0, static_cast<std::size_t>(file.gcount()));
  }
  if (file.bad()) return refuse("reading stopped with an error");
  if (text.size() > YamlLimits::text_bytes)
    return refuse(fmt::format("it is longer than {} bytes; put long tables into a CSV file", YamlLimits::text_bytes));
  return text;
}

Node read_yaml_text(const std::string& text, std::string file_name, Problems& problems) {
  const YamlText yaml(text, std::move(file_name));
  if (!within_size(text.size(), yaml, problems) || !yaml.check(problems)) return {};
  const std::size_t before = problems.count();
  Node root = parse(yaml, problems);
  const bool empty = root.kind == Node::Kind::missing || root.kind == Node::Kind::null;
  if (empty && problems.count() == before) problems.add(yaml.start(), "there is nothing in it");
  return root;
}

Node read_yaml_file(const std::string& path, Problems& problems) {
  auto text = read_text_file(path, {}, problems);
  return text ? read_yaml_text(*text, path, problems) : Node{};
}

}  // namespace gaskettle
