#include "base/problems.h"

#include <fmt/format.h>

#include <algorithm>
#include <map>
#include <set>
#include <string_view>
#include <tuple>
#include <utility>

namespace gaskettle {

std::string Place::text() const {
  const std::string name = file ? *file : std::string("input");
  return line > 0 ? fmt::format("{}:{}:{}", name, line, column) : name;
}

namespace {
/// What users wrote and a message repeats may hold line breaks or be very long: one problem stays one line.
std::string one_line(std::string message) {
  constexpr std::size_t most = 1500;
  if (message.size() > most) {
    std::size_t end = most;
    while (end > 0 && (static_cast<unsigned char>(message[end]) & 0xC0U) == 0x80U) --end;  // not inside a character
    message = message.substr(0, end) + "...";
  }
  for (char& c : message)
    if (static_cast<unsigned char>(c) < 0x20) c = ' ';
  return message;
}
}  // namespace

void Problems::add(Place place, std::string message) {
  list_.push_back({std::move(place), one_line(std::move(message))});
}

std::vector<Problem> Problems::sorted() const {
  // Files in the order in which they were first reported.
  std::map<std::string, std::size_t> files;
  const auto rank = [&files](const Place& place) {
    return files.emplace(place.file ? *place.file : std::string(), files.size()).first->second;
  };
  using Key = std::tuple<std::size_t, int, int>;
  std::set<std::pair<Key, std::string_view>> seen;
  std::vector<std::pair<Key, const Problem*>> order;
  for (const Problem& p : list_) {
    const Key key(rank(p.place), p.place.line, p.place.column);
    if (seen.emplace(key, p.message).second) order.emplace_back(key, &p);
  }
  std::stable_sort(order.begin(), order.end(), [](const auto& a, const auto& b) { return a.first < b.first; });
  std::vector<Problem> list;
  for (const auto& [key, problem] : order) list.push_back(*problem);
  return list;
}

std::string Problems::text(std::size_t most) const {
  std::string out;
  const std::vector<Problem> list = sorted();
  for (std::size_t i = 0; i < list.size() && i < most; ++i)
    out += fmt::format("{}: error: {}\n", list[i].place.text(), list[i].message);
  if (list.size() > most) out += fmt::format("... and {} more problems\n", list.size() - most);
  return out;
}

namespace {
std::size_t edit_distance(const std::string& a, const std::string& b) {
  std::vector<std::size_t> row(b.size() + 1);
  for (std::size_t j = 0; j <= b.size(); ++j) row[j] = j;
  for (std::size_t i = 1; i <= a.size(); ++i) {
    std::size_t diagonal = row[0];
    row[0] = i;
    for (std::size_t j = 1; j <= b.size(); ++j) {
      const std::size_t above = row[j];
      row[j] = std::min({row[j] + 1, row[j - 1] + 1, diagonal + (a[i - 1] == b[j - 1] ? 0U : 1U)});
      diagonal = above;
    }
  }
  return row[b.size()];
}
}  // namespace

std::string nearest_name(const std::string& wrong, const std::vector<std::string>& known) {
  std::string best;
  std::size_t distance = std::max<std::size_t>(2, wrong.size() / 3) + 1;
  if (wrong.size() > 200) return best;
  for (const std::string& name : known) {
    const std::size_t d = edit_distance(wrong, name);
    if (d < distance) {
      distance = d;
      best = name;
    }
  }
  return best;
}

}  // namespace gaskettle
