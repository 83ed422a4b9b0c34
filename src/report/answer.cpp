#include "report/answer.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <map>

#include "plant/cautions.h"
#include "report/presenter.h"

namespace gaskettle {

namespace {
constexpr std::size_t most_events_shown = 24;

Presenter presenter_of(const Plant& plant) { return {plant.layout().atmosphere_pressure, plant.model().run.time_unit}; }

std::string caution_block(const Plant& plant) {
  std::string out;
  for (const std::string& c : cautions(plant)) out += wrapped("CAUTION: " + c, 100, "");
  return out;
}

std::string targets_block(const Plant& plant, const CaseResult& r, const Presenter& p) {
  if (r.targets.empty()) return "";
  std::vector<std::vector<std::string>> rows;
  for (const Target& t : r.targets) {
    const ChannelDoc& c = plant.layout().channels[t.channel];
    std::string what =
        t.settles ? fmt::format("{} within {} of {} for {}", c.name, p.show_difference(t.band, c.kind, ""),
                                p.show(t.level, c.kind, t.unit), p.show(t.duration, unit_kinds::time, t.duration_unit))
                  : fmt::format("{} reaches {}", c.name, p.show(t.level, c.kind, t.unit));
    const std::string when = t.settles
                                 ? fmt::format("from {} (certain at {})", p.time(t.time), p.time(t.time + t.duration))
                                 : "at " + p.time(t.time);
    rows.push_back({t.name, what, t.reached() ? when : "NOT REACHED"});
  }
  return "\nTargets\n" + table(rows);
}

std::string limits_block(const CaseResult& r, const Presenter& p) {
  if (r.limits.empty()) return "";
  std::vector<std::vector<std::string>> rows;
  for (const Limit& l : r.limits) {
    const std::string bound =
        fmt::format("{} {} {}", l.what, l.below ? "below" : "above", p.show(l.bound, l.kind, l.unit));
    const std::string extreme = fmt::format("{} {} at {}", l.below ? "highest" : "lowest",
                                            p.show(l.extreme, l.kind, l.unit), p.time(l.extreme_time));
    const std::string state =
        l.broken()
            ? fmt::format("EXCEEDED by {} from {}", p.show_difference(-l.margin(), l.kind, l.unit), p.time(l.crossed))
            : "margin " + p.show_difference(l.margin(), l.kind, l.unit);
    rows.push_back({l.name, bound, extreme, state});
  }
  return "\nLimits\n" + table(rows);
}

std::string reliefs_block(const CaseResult& r, const Presenter& p) {
  if (r.reliefs.empty()) return "";
  const UnitKind flow{"mass flow", "kg s-1"};
  std::vector<std::vector<std::string>> rows = {{"device", "lifts", "first at", "greatest lift", "peak inlet pressure",
                                                 "against set", "capacity there", "needed", "released"}};
  for (const ReliefOutcome& o : r.reliefs)
    rows.push_back({o.name, o.disc ? (o.lifts > 0 ? "burst" : "whole") : std::to_string(o.lifts), p.time(o.first_lift),
                    fmt::format("{:.0f} %", 100.0 * o.greatest_opening),
                    p.show(o.peak_pressure, unit_kinds::pressure, "bar gauge"),
                    o.accumulation < 0.0 ? fmt::format("{:.2f} % below", -100.0 * o.accumulation)
                                         : fmt::format("+{:.2f} %", 100.0 * o.accumulation),
                    p.scaled(o.capacity, flow), o.needed > 0.0 ? p.scaled(o.needed, flow) : "-",
                    o.released > 0.0 ? p.scaled(o.released, unit_kinds::mass) : "none"});
  return "\nRelief devices\n" + table(rows) +
         "  capacity: fully open at the peak; needed: the flow that would have held the pressure, at its greatest\n"
         "  while at or above set\n";
}

std::string ranges_block(const CaseResult& r, const Presenter& p) {
  if (r.ranges.empty()) return "";
  std::vector<std::vector<std::string>> rows = {{"", "lowest", "at", "highest", "at", "at the end"}};
  for (const ChannelRange& c : r.ranges)
    rows.push_back({c.channel, p.brief(c.lowest, c.kind, c.unit), p.time(c.lowest_time),
                    p.brief(c.highest, c.kind, c.unit), p.time(c.highest_time), p.brief(c.end, c.kind, c.unit)});
  return "\nHow far it went\n" + table(rows);
}

/// What a long list leaves out first: the same part doing the same thing again and again.
std::vector<const LoggedEvent*> events_worth_showing(const CaseResult& r, std::string& folded) {
  std::map<std::pair<std::string, std::string>, std::size_t> count, seen;
  for (const LoggedEvent& e : r.events) ++count[{e.part, e.what}];
  std::vector<const LoggedEvent*> shown;
  for (const LoggedEvent& e : r.events) {
    const std::pair<std::string, std::string> key{e.part, e.what};
    const std::size_t n = count[key], i = ++seen[key];
    if (r.events.size() <= most_events_shown || n <= 2 || i == 1 || i == n) shown.push_back(&e);
  }
  for (const auto& [key, n] : count)
    if (r.events.size() > most_events_shown && n > 2)
      folded += fmt::format("  {} {} {} times: the first and the last are shown\n", key.first, key.second, n);
  return shown;
}

std::string events_block(const CaseResult& r, const Presenter& p) {
  if (r.events.empty()) return "\nEvents: none\n";
  std::string folded;
  const std::vector<const LoggedEvent*> events = events_worth_showing(r, folded);
  std::vector<std::vector<std::string>> rows;
  const std::size_t n = events.size();
  for (std::size_t i = 0; i < n; ++i) {
    if (n > 2 * most_events_shown && i == most_events_shown) {
      rows.push_back({"...", fmt::format("{} more in the record", n - 2 * most_events_shown), ""});
      i = n - most_events_shown;
    }
    rows.push_back({p.time(events[i]->time), events[i]->part, events[i]->what});
  }
  return fmt::format("\nEvents ({})\n", r.events.size()) + table(rows, {0}) + folded;
}

std::string energy_block(const CaseResult& r, const Presenter& p) {
  const Books& b = r.books;
  std::vector<std::vector<std::string>> rows;
  const auto row = [&](const std::string& name, double joule, const std::string& meaning) {
    // What is only rounding beside the rest is no term.
    if (std::abs(joule) > 1e-9 * b.throughput) rows.push_back({name, p.scaled(joule, unit_kinds::energy), meaning});
  };
  for (int i = 0; i < first_work_term; ++i) row(ledger_names[i], b.term[i], ledger_meanings[i]);
  row("boundary_work", b.boundary_work, "work done by the gas on its moving boundaries, of which");
  for (int i = first_work_term; i < ledger_term_count; ++i)
    row(std::string("  ") + ledger_names[i], b.term[i], ledger_meanings[i]);
  row("stored", b.stored, "gained by gas, walls, bodies and elements");
  return rows.empty() ? "" : "\nWhere the energy went\n" + table(rows, {1});
}

std::string loss_block(const Plant& plant, const CaseResult& r, const Presenter& p) {
  const Books& b = r.books;
  if (!(b.generated > 0.0)) return "";
  const double ambient = plant.layout().ambient_temperature_start;
  std::vector<std::pair<double, int>> order;
  for (int m = 0; m < mechanism_count; ++m)
    if (b.entropy[m] > 1e-6 * b.generated) order.emplace_back(-b.entropy[m], m);
  std::sort(order.begin(), order.end());
  std::vector<std::vector<std::string>> rows;
  for (const auto& [negative, m] : order)
    rows.push_back({mechanism_names[m], p.scaled(-negative * ambient, unit_kinds::energy),
                    fmt::format("{:.1f} %", 100.0 * b.entropy[m] / b.generated), mechanism_meanings[m]});
  return "\nWhere the effort was lost (exergy destroyed, against the surroundings at the start)\n" +
         table(rows, {1, 2});
}

std::string bookkeeping_block(const CaseResult& r) {
  const Books& b = r.books;
  const Statistics& s = r.ending.stats;
  std::string out = "\nBookkeeping (that the sums are right, not how accurate they are)\n";
  out += fmt::format("  energy closes to {:.1e} of throughput, mass to {:.1e}: {}\n", b.closure_energy, b.closure_mass,
                     r.books_closed() ? "closed" : "NOT CLOSED");
  for (const WorkComparison& w : b.work)
    if (w.scale > 0.0)
      out += fmt::format("  {} against its ledger: {:.1e} of {:.3g} J (an accuracy)\n", w.what,
                         w.difference() / w.scale, w.scale);
  if (b.generated > 0.0)
    out += fmt::format("  entropy: {:.6g} J/K generated, unexplained {:.1e} of it\n", b.generated,
                       std::abs(b.entropy_imbalance()) / b.generated);
  out += fmt::format("  {} steps ({} stiff, {} explicit), {} rejected, {} rate calls, {} Jacobians, {:.2g} s\n",
                     s.steps, s.steps_stiff, s.steps_explicit, s.rejected, s.rate_calls, s.jacobians, r.wall_seconds);
  return out;
}
}  // namespace

/// What relief devices did, in a sentence each; empty where none opened.
std::string relief_sentence(const CaseResult& r, const Presenter& p) {
  std::string out;
  for (const ReliefOutcome& o : r.reliefs)
    if (o.lifts > 0)
      out += fmt::format("Relief device '{}' {} first at {} and released {}. ", o.name,
                         o.disc ? "burst" : (o.lifts == 1 ? "lifted once," : fmt::format("lifted {} times,", o.lifts)),
                         p.time(o.first_lift), p.scaled(o.released, unit_kinds::mass));
  return out;
}

std::string gas_model_line(const Plant& plant) {
  std::string out;
  for (const SpaceInfo& s : plant.layout().spaces) {
    std::string gases;
    for (const auto& [name, x] : s.composition)
      gases += (gases.empty() ? "" : ", ") + (s.composition.size() > 1 ? fmt::format("{} {:.4g}", name, x) : name);
    out += fmt::format("  {}: ideal gas ({}), cp of temperature from the gas data\n", s.name, gases);
  }
  return out;
}

std::string verdict(const Plant& plant, const CaseResult& r) {
  const Presenter p = presenter_of(plant);
  std::string out;
  for (const Limit& l : r.limits)
    if (l.broken())
      out += fmt::format("Limit '{}' EXCEEDED: {} reached {} at {}. ", l.name, l.what,
                         p.show(l.extreme, l.kind, l.unit), p.time(l.extreme_time));
  if (r.partial()) out += fmt::format("STOPPED EARLY at {}: {}. ", p.time(r.ending.time), r.ending.message);
  if (!r.books_closed()) out += "The books did NOT CLOSE: do not use this result. ";
  for (const Target& t : r.targets)
    if (!t.reached()) out += fmt::format("Target '{}' NOT REACHED. ", t.name);
  const std::string relief = relief_sentence(r, p);
  if (!out.empty()) {
    out += relief;
    if (out.back() == ' ') out.pop_back();
    return out;
  }
  std::string limits =
      r.limits.empty()
          ? "No limit was set"
          : (r.limits.size() == 1 ? "The limit was kept" : fmt::format("All {} limits were kept", r.limits.size()));
  std::string targets = r.targets.empty()
                            ? ""
                            : (r.targets.size() == 1 ? "; the target was reached"
                                                     : fmt::format("; all {} targets were reached", r.targets.size()));
  if (r.targets.size() == 1) targets += " at " + p.time(r.targets[0].time);
  std::string sentence = fmt::format("{}{}. Ended at {}{}.", limits, targets, p.time(r.ending.time),
                                     r.ending.reason == EndReason::stop_condition ? " (" + r.ending.message + ")" : "");
  if (!relief.empty()) sentence += " " + relief.substr(0, relief.size() - 1);
  return sentence;
}

std::string answer_text(const Plant& plant, const CaseResult& r, const AnswerContext& context) {
  const Presenter p = presenter_of(plant);
  std::string out = caution_block(plant);
  out += "\n" + (context.title.empty() ? context.model_file : context.title) + "\n";
  out += wrapped(verdict(plant, r), 100, "");
  out += targets_block(plant, r, p);
  out += limits_block(r, p);
  out += reliefs_block(r, p);
  out += ranges_block(r, p);
  out += "\nGas models\n" + gas_model_line(plant);
  for (const std::string& w : r.warnings) out += wrapped("warning: " + w, 100, "  ");
  for (const std::string& a : context.advice) out += wrapped("note: " + a, 100, "  ");
  out += events_block(r, p);
  out += energy_block(r, p);
  out += loss_block(plant, r, p);
  out += bookkeeping_block(r);
  return out;
}

}  // namespace gaskettle
