#include "base/unit_meaning.h"

#include <fmt/format.h>

#include <algorithm>
#include <array>

#include "base/problems.h"
#include "base/unit_text.h"

namespace gaskettle::unit_reading {

std::string with_article(const std::string& noun) {
  return fmt::format("{} {}", noun.find_first_of("aeiou") == 0 ? "an" : "a", noun);
}

std::string advice(const UnitKind& kind) {
  const std::vector<std::string> examples = example_values(kind);
  if (examples.size() == 1) return fmt::format("write for example {}", examples[0]);
  return fmt::format("write for example {} or {}", examples[0], examples[1]);
}

[[noreturn]] void refuse(const UnitRequest& r, const std::string& why) {
  throw UnitError(fmt::format("{} {}; {}", r.written, why, advice(r.kind)));
}

namespace {

bool ends_with(const std::string& s, std::string_view end) {
  return s.size() >= end.size() && s.compare(s.size() - end.size(), end.size(), end) == 0;
}

/// Takes a last word such as "gauge", "(gauge)" off a unit; false where it does not end so.
bool take_last_word(std::string& unit, std::string_view word) {
  const std::string low = lower_case(unit);
  const std::string bracketed = fmt::format("({})", word);
  const std::string apart = fmt::format(" {}", word);
  std::size_t size = 0;
  if (ends_with(low, bracketed))
    size = bracketed.size();
  else if (ends_with(low, apart))
    size = apart.size();
  else
    return false;
  unit = tidy_blanks(std::string_view(unit).substr(0, unit.size() - size));
  return true;
}

/// Where a unit says abs or gauge; takes that off.
enum class Reference { none, absolute, gauge };

Reference take_reference(std::string& unit) {
  for (const std::string_view word : {"gauge", "g"})
    if (take_last_word(unit, word)) return Reference::gauge;
  for (const std::string_view word : {"abs", "absolute", "a"})
    if (take_last_word(unit, word)) return Reference::absolute;
  for (const std::string_view name : {"bar", "mbar", "psi", "kPa", "MPa", "hPa"}) {
    if (unit.size() != name.size() + 1 || unit.compare(0, name.size(), name) != 0) continue;
    const char last = unit.back();
    if (last != 'g' && last != 'a') continue;
    unit.pop_back();
    return last == 'g' ? Reference::gauge : Reference::absolute;
  }
  return Reference::none;
}

[[noreturn]] void refuse_unknown(const UnitRequest& r, const std::string& name) {
  if (name.size() > 3) {
    const std::string near = nearest_name(name, example_units(r.kind));
    if (!near.empty()) refuse(r, fmt::format("has no unit known here (\"{}\"; \"{}\"?)", printable(name), near));
  }
  refuse(r, fmt::format("has no unit known here (\"{}\")", printable(name)));
}

[[noreturn]] void refuse_fit(const UnitRequest& r, const UnitReading& reading) {
  std::string bare = r.unit;
  if (r.kind.flavour != UnitFlavour::pressure && take_reference(bare) != Reference::none &&
      read_unit(bare, unit_kinds::pressure.si).fit == UnitFit::fits)
    refuse(r, fmt::format("is a pressure, not {}", with_article(r.kind.name)));
  if (reading.fit == UnitFit::unknown_name) refuse_unknown(r, reading.culprit);
  if (reading.fit == UnitFit::malformed) refuse(r, "is not one number and one unit");
  refuse(r, fmt::format("is not {}", with_article(r.kind.name)));
}

UnitScale scale_of(const UnitRequest& r, const std::string& unit, const std::string& si) {
  const UnitReading reading = read_unit(unit, si);
  if (reading.fit != UnitFit::fits) refuse_fit(r, reading);
  return reading.scale;
}

UnitMeaning temperature(const UnitRequest& r) {
  if (r.unit == "C" || r.unit == "F")
    refuse(r, fmt::format("is not a temperature; the degree is spelled deg{}", r.unit));
  UnitMeaning m{scale_of(r, r.unit, "K")};
  if (r.kind.flavour == UnitFlavour::temperature_difference) m.scale.offset = 0.0;
  return m;
}

UnitMeaning pressure(const UnitRequest& r) {
  std::string unit = r.unit;
  const Reference reference = take_reference(unit);
  std::string rest = unit;
  if (reference != Reference::none && take_reference(rest) != Reference::none) refuse(r, "says abs or gauge twice");
  if (read_unit(unit, "Pa").fit != UnitFit::fits) scale_of(r, r.unit, "Pa");
  const UnitMeaning m{{scale_of(r, unit, "Pa").factor, 0.0}, reference == Reference::gauge};
  if (r.kind.flavour == UnitFlavour::pressure_difference) {
    if (reference == Reference::none) return m;
    refuse(r, "says abs or gauge, but a pressure difference is neither abs nor gauge");
  }
  if (reference == Reference::none)
    throw UnitError(fmt::format("{} does not say above what it counts; write {} {} abs or {} {} gauge", r.written,
                                r.number, unit, r.number, unit));
  return m;
}

UnitMeaning rotation(const UnitRequest& r) {
  constexpr std::array<std::string_view, 6> spellings{"rpm", "rev/min", "rev/s", "rad/s", "rads-1", "rad.s-1"};
  std::string joined = r.unit;
  joined.erase(std::remove(joined.begin(), joined.end(), ' '), joined.end());
  if (std::find(spellings.begin(), spellings.end(), joined) != spellings.end())
    return {{scale_of(r, r.unit, r.kind.si).factor, 0.0}};
  std::string why = "is not a speed of rotation";
  if (read_unit(r.unit, "Hz").fit == UnitFit::fits)
    why = "does not say whether turns or radians are counted, so it is not taken for a speed of rotation";
  std::string all;
  for (const std::string& value : example_values(r.kind)) all += all.empty() ? value : fmt::format(", {}", value);
  throw UnitError(fmt::format("{} {}; write it in rpm, rev/min, rev/s or rad/s (for example {})", r.written, why, all));
}

UnitMeaning frequency(const UnitRequest& r) {
  if (read_unit(r.unit, r.kind.si).fit == UnitFit::other_angle)
    refuse(r, "is a speed of rotation; a frequency counts cycles");
  return {{scale_of(r, r.unit, r.kind.si).factor, 0.0}};
}

UnitMeaning percentage(const UnitRequest& r) {
  if (r.unit != "%" && lower_case(r.unit) != "percent") refuse(r, "is not a percentage");
  return {{0.01, 0.0}};
}

// Gas flows.

/// The molar gas constant, J/(mol K), to ten digits: Avogadro times Boltzmann
/// constant, exact since 2019 (BIPM, The International System of Units, 9th edition, table 1).
constexpr double gas_constant = 8.314462618;
/// Amount in a cubic metre of ideal gas, mol/m3. Normal: 0 degC, 101325 Pa.
constexpr double normal_density = 101325.0 / (gas_constant * 273.15);
/// ANR: 20 degC, 100 kPa (ISO 8778:2003, standard reference atmosphere).
constexpr double anr_density = 100000.0 / (gas_constant * 293.15);

/// The volume flow behind abbreviations that leave their reference state to custom.
std::string unclear_volume_flow(const std::string& unit) {
  constexpr std::array<std::array<std::string_view, 2>, 9> customs{{{"sccm", "cm3/min"},
                                                                    {"sccs", "cm3/s"},
                                                                    {"scfm", "ft3/min"},
                                                                    {"scfh", "ft3/h"},
                                                                    {"slpm", "l/min"},
                                                                    {"slm", "l/min"},
                                                                    {"nlpm", "l/min"},
                                                                    {"sm3/h", "m3/h"},
                                                                    {"sl/min", "l/min"}}};
  for (const auto& [custom, plain] : customs)
    if (lower_case(unit) == custom) return std::string(plain);
  if (read_unit(unit, unit_kinds::liquid_flow.si).fit == UnitFit::fits) return unit;
  return {};
}

double volume_factor(const UnitRequest& r, const std::string& unit) {
  const UnitReading reading = read_unit(unit, unit_kinds::liquid_flow.si);
  if (reading.fit == UnitFit::fits) return reading.scale.factor;
  refuse(r, "has a word of state (normal, anr, actual), which goes with a volume flow only");
}

UnitMeaning gas_flow(const UnitRequest& r) {
  std::string unit = r.unit;
  if (take_last_word(unit, "normal")) return {{volume_factor(r, unit) * normal_density, 0.0}, false, FlowBasis::molar};
  if (take_last_word(unit, "anr")) return {{volume_factor(r, unit) * anr_density, 0.0}, false, FlowBasis::molar};
  if (take_last_word(unit, "actual")) return {{volume_factor(r, unit), 0.0}, false, FlowBasis::actual_volume};
  if (unit.size() > 1 && unit[0] == 'N') {
    const UnitReading rest = read_unit(unit.substr(1), unit_kinds::liquid_flow.si);
    if (rest.fit == UnitFit::fits) return {{rest.scale.factor * normal_density, 0.0}, false, FlowBasis::molar};
  }
  const UnitReading molar = read_unit(unit, "mol s-1");
  if (molar.fit == UnitFit::fits) return {{molar.scale.factor, 0.0}, false, FlowBasis::molar};
  const std::string volume = unclear_volume_flow(unit);
  if (!volume.empty())
    throw UnitError(
        fmt::format("{0} does not say at which state the gas is counted; write {1} {2} normal (0 degC, "
                    "101325 Pa), {1} {2} anr (20 degC, 100 kPa) or {1} {2} actual (the state upstream)",
                    r.written, r.number, volume));
  return {{scale_of(r, unit, r.kind.si).factor, 0.0}};
}

}  // namespace

UnitMeaning meaning_of(const UnitRequest& r) {
  switch (r.kind.flavour) {
    case UnitFlavour::temperature:
    case UnitFlavour::temperature_difference:
      return temperature(r);
    case UnitFlavour::pressure:
    case UnitFlavour::pressure_difference:
      return pressure(r);
    case UnitFlavour::rotation:
      return rotation(r);
    case UnitFlavour::frequency:
      return frequency(r);
    case UnitFlavour::gas_flow:
      return gas_flow(r);
    case UnitFlavour::percentage:
      return percentage(r);
    case UnitFlavour::plain:
    case UnitFlavour::count:
      break;
  }
  return {{scale_of(r, r.unit, r.kind.si).factor, 0.0}};
}

}  // namespace gaskettle::unit_reading
