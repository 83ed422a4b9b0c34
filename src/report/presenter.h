/// Numbers as the model's author writes them, and text in aligned columns.
#pragma once
#include <string>
#include <vector>

#include "base/units.h"

namespace gaskettle {

/// Shows SI values in chosen units; knows the atmosphere that gauge pressures stand above.
class Presenter {
public:
  Presenter(double atmosphere, std::string time_unit) : atmosphere_(atmosphere), time_unit_(std::move(time_unit)) {}
  /// "181.3 degC"; pressures with gauge beside absolute.
  std::string show(double si, const UnitKind& kind, const std::string& unit, int significant = 4) const;
  /// As `show`, a pressure in its own spelling alone: for tables that have no room.
  std::string brief(double si, const UnitKind& kind, const std::string& unit) const;
  /// A difference, such as a margin, in the unit of the value it belongs to.
  std::string show_difference(double si, const UnitKind& kind, const std::string& unit) const;
  /// A time in the unit of the run's length.
  std::string time(double seconds) const;
  /// A unit that suits the size where the model gives none: kJ, kW, bar, mm.
  std::string scaled(double si, const UnitKind& kind) const;

private:
  double atmosphere_;
  std::string time_unit_;
};

/// Rows of cells as lines with aligned columns, indented by two spaces; numbers are not
/// told from words: every column is left-aligned but those named in `right`.
std::string table(const std::vector<std::vector<std::string>>& rows, const std::vector<std::size_t>& right = {});
/// Breaks text into lines of at most `width` characters, each begun with `indent`.
std::string wrapped(const std::string& text, std::size_t width, const std::string& indent);

}  // namespace gaskettle
