#include "base/problems.h"

#include <algorithm>
#include <tuple>
#include <utility>

#include <fmt/format.h>

namespace gaskettle {

std::string Place::text() const {
  const std::string name = file ? *file : std::string("input");
  return line > 0 ? fmt::format("{}:{}:{}", name, line, column) : name;
}

void Problems::add(Place place, std::string message) { list_.push_back({std::move(place), std::move(message)}); }

std::vector<Problem> Problems::sorted() const {
  std::vector<Problem> list;
  for (const Problem& p : list_) {
    const auto same = [&p](const Problem& q) {
      return p.message == q.message && p.place.text() == q.place.text();
    };
    if (std::none_of(list.begin(), list.end(), same)) list.push_back(p);
  }
  // Files in the order in which they were first reported.
  std::vector<std::string> files;
  for (const Problem& p : list) files.push_back(p.place.file ? *p.place.file : std::string());
  const auto rank = [&files](const Place& place) {
    return std::find(files.begin(), files.end(), place.file ? *place.file : std::string()) - files.begin();
  };
  std::stable_sort(list.begin(), list.end(), [&rank](const Problem& a, const Problem& b) {
    return std::tuple(rank(a.place), a.place.line, a.place.column) <
           std::tuple(rank(b.place), b.place.line, b.place.column);
  });
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
