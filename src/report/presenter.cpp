#include "report/presenter.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <sstream>

namespace gaskettle {

namespace {
bool is_gauge(const std::string& unit) {
  if (unit.empty()) return false;
  try {
    return parse_quantity("1 " + unit, unit_kinds::pressure).gauge;
  } catch (const UnitError&) {
    return false;
  }
}

struct Scale {
  const char* si;
  double above;
  double factor;
  const char* name;
};
constexpr Scale scales[] = {{"J", 1e9, 1e9, "GJ"},
                            {"J", 1e6, 1e6, "MJ"},
                            {"J", 1e3, 1e3, "kJ"},
                            {"W", 1e6, 1e6, "MW"},
                            {"W", 1e3, 1e3, "kW"},
                            {"J K-1", 1e6, 1e6, "MJ/K"},
                            {"J K-1", 1e3, 1e3, "kJ/K"},
                            {"J K-1", 0.0, 1.0, "J/K"},
                            {"kg s-1", 1.0, 1.0, "kg/s"},
                            {"kg s-1", 0.0, 1e-3, "g/s"},
                            {"kg", 1.0, 1.0, "kg"},
                            {"kg", 0.0, 1e-3, "g"},
                            {"m", 1.0, 1.0, "m"},
                            {"m", 0.0, 1e-3, "mm"},
                            {"m3", 0.1, 1.0, "m3"},
                            {"m3", 0.0, 1e-3, "l"},
                            {"K s-1", 0.0, 1.0 / 60.0, "K/min"},
                            {"s", 7200.0, 3600.0, "h"},
                            {"s", 120.0, 60.0, "min"},
                            {"W m-2 K-1", 0.0, 1.0, "W/m2/K"}};
}  // namespace

std::string Presenter::scaled(double si, const UnitKind& kind) const {
  if (kind.flavour == UnitFlavour::temperature) return format_quantity(si, kind, "degC", 4);
  if (kind.flavour == UnitFlavour::pressure)
    return fmt::format("{:.4g} bar abs ({:.4g} bar gauge)", si / 1e5, (si - atmosphere_) / 1e5);
  if (kind.flavour == UnitFlavour::pressure_difference) return fmt::format("{:.4g} bar", si / 1e5);
  for (const Scale& s : scales)
    if (kind.si == s.si && std::abs(si) >= s.above)
      return fmt::format("{} {}", format_number(si / s.factor, 4), s.name);
  return kind.si == "1" ? format_number(si, 4) : fmt::format("{} {}", format_number(si, 4), kind.si);
}

std::string Presenter::show(double si, const UnitKind& kind, const std::string& unit, int significant) const {
  if (!std::isfinite(si)) return "-";
  if (unit.empty() || kind.flavour == UnitFlavour::gas_flow) return scaled(si, kind);
  if (kind.flavour != UnitFlavour::pressure) return format_quantity(si, kind, unit, significant);
  const std::string bar = fmt::format("{:.4g} bar", (is_gauge(unit) ? si : si - atmosphere_) / 1e5);
  if (is_gauge(unit)) return format_quantity(si - atmosphere_, kind, unit, significant) + " (" + bar + " abs)";
  return format_quantity(si, kind, unit, significant) + " (" + bar + " gauge)";
}

std::string Presenter::brief(double si, const UnitKind& kind, const std::string& unit) const {
  if (kind.flavour != UnitFlavour::pressure) return show(si, kind, unit);
  if (unit.empty()) return fmt::format("{:.4g} bar gauge", (si - atmosphere_) / 1e5);
  return format_quantity(is_gauge(unit) ? si - atmosphere_ : si, kind, unit, 4);
}

std::string Presenter::show_difference(double si, const UnitKind& kind, const std::string& unit) const {
  if (kind.flavour == UnitFlavour::temperature) return format_number(si, 3) + " K";
  if (kind.flavour == UnitFlavour::pressure) return format_number(si / 1e5, 3) + " bar";
  return show(si, kind, unit, 3);
}

std::string Presenter::time(double seconds) const {
  if (!std::isfinite(seconds)) return "-";
  // Small times of a long run read better in a smaller unit.
  static const std::vector<std::pair<std::string, double>> smaller = {{"h", 3600.0}, {"min", 60.0}, {"s", 1.0}};
  if (seconds == 0.0) return "0 s";
  double unit = parse_quantity("1 " + (time_unit_.empty() ? "s" : time_unit_), unit_kinds::time).value;
  if (std::abs(seconds) >= unit)
    return format_quantity(seconds, unit_kinds::time, time_unit_.empty() ? "s" : time_unit_, 5);
  for (const auto& [name, size] : smaller)
    if (size < unit && std::abs(seconds) >= size) return format_number(seconds / size, 5) + " " + name;
  return format_number(seconds, 5) + " s";
}

std::string table(const std::vector<std::vector<std::string>>& rows, const std::vector<std::size_t>& right) {
  std::vector<std::size_t> width;
  for (const auto& row : rows)
    for (std::size_t c = 0; c < row.size(); ++c) {
      if (c >= width.size()) width.push_back(0);
      width[c] = std::max(width[c], row[c].size());
    }
  std::string out;
  for (const auto& row : rows) {
    std::string line = " ";
    for (std::size_t c = 0; c < row.size(); ++c) {
      const bool to_right = std::find(right.begin(), right.end(), c) != right.end();
      line += to_right ? fmt::format(" {:>{}} ", row[c], width[c]) : fmt::format(" {:<{}} ", row[c], width[c]);
    }
    line.erase(line.find_last_not_of(' ') + 1);
    out += line + "\n";
  }
  return out;
}

std::string wrapped(const std::string& text, std::size_t width, const std::string& indent) {
  std::istringstream words(text);
  std::string word, line, out;
  while (words >> word) {
    if (!line.empty() && indent.size() + line.size() + 1 + word.size() > width) {
      out += indent + line + "\n";
      line.clear();
    }
    line += (line.empty() ? "" : " ") + word;
  }
  return line.empty() ? out : out + indent + line + "\n";
}

}  // namespace gaskettle
