#include <cmath>
#include <nlohmann/json.hpp>

#include "base/version.h"
#include "plant/cautions.h"
#include "report/answer.h"

namespace gaskettle {

namespace {
using Json = nlohmann::ordered_json;

/// JSON has no NaN: null stands for "none".
Json number(double x) { return std::isfinite(x) ? Json(x) : Json(nullptr); }

Json targets_json(const Plant& plant, const CaseResult& r) {
  Json list = Json::array();
  for (const Target& t : r.targets)
    list.push_back({{"name", t.name},
                    {"when", plant.layout().channels[t.channel].name},
                    {"reached", t.reached()},
                    {"time", number(t.time)}});
  return list;
}

Json limits_json(const CaseResult& r) {
  Json list = Json::array();
  for (const Limit& l : r.limits)
    list.push_back({{"name", l.name},
                    {"of", l.what},
                    {l.below ? "below" : "above", l.bound},
                    {"unit", l.kind.si},
                    {"kept", !l.broken()},
                    {"extreme", number(l.extreme)},
                    {"extreme_time", number(l.extreme_time)},
                    {"margin", number(l.margin())},
                    {"crossed_time", number(l.crossed)}});
  return list;
}

Json reliefs_json(const CaseResult& r) {
  Json list = Json::array();
  for (const ReliefOutcome& o : r.reliefs)
    list.push_back({{"name", o.name},
                    {"disc", o.disc},
                    {"lifts", o.lifts},
                    {"first_lift", number(o.first_lift)},
                    {"greatest_opening", o.greatest_opening},
                    {"set_pressure", o.set_pressure},
                    {"peak_pressure", o.peak_pressure},
                    {"accumulation", o.accumulation},
                    {"capacity", o.capacity},
                    {"needed", o.needed},
                    {"released", o.released}});
  return list;
}

Json events_json(const CaseResult& r) {
  Json list = Json::array();
  for (const LoggedEvent& e : r.events)
    list.push_back({{"time", e.time},
                    {"part", e.part},
                    {"what", e.what},
                    {"before", number(e.before)},
                    {"after", number(e.after)}});
  return list;
}

Json books_json(const Plant& plant, const CaseResult& r) {
  const Books& b = r.books;
  Json energy;
  for (int i = 0; i < ledger_term_count; ++i) energy[ledger_names[i]] = b.term[i];
  energy["boundary_work"] = b.boundary_work;
  energy["stored"] = b.stored;
  energy["throughput"] = b.throughput;
  Json entropy, exergy;
  for (int m = 0; m < mechanism_count; ++m) {
    entropy[mechanism_names[m]] = b.entropy[m];
    exergy[mechanism_names[m]] = b.entropy[m] * plant.layout().ambient_temperature_start;
  }
  entropy["generated"] = b.generated;
  entropy["imbalance"] = b.entropy_imbalance();
  Json mass;
  for (int k = 0; k < plant.layout().mixture.count(); ++k)
    mass[plant.layout().mixture.species(k).name] = {
        {"in", b.mass_in[k]}, {"out", b.mass_out[k]}, {"change", b.mass_change[k]}};
  Json work = Json::array();
  for (const WorkComparison& w : b.work)
    work.push_back({{"what", w.what}, {"ledger", w.ledger}, {"state", w.state}, {"scale", w.scale}});
  return {{"energy", energy},
          {"mass", mass},
          {"entropy", entropy},
          {"exergy_destroyed", exergy},
          {"work_against_state", work},
          {"closure_energy", b.closure_energy},
          {"closure_mass", b.closure_mass},
          {"closed", r.books_closed()}};
}
}  // namespace

std::string answer_json(const Plant& plant, const CaseResult& r, const AnswerContext& context) {
  const Statistics& s = r.ending.stats;
  Json gas_models, end;
  for (const SpaceInfo& space : plant.layout().spaces) gas_models[space.name] = "ideal";
  for (const auto& [channel, value] : r.end_values) end[channel] = number(value);
  Json answer = {{"gaskettle", program_version},
                 {"model", context.model_file},
                 {"title", context.title},
                 {"cautions", cautions(plant)},
                 {"verdict", verdict(plant, r)},
                 {"exit_status", context.exit_status},
                 {"ended", std::string(name(r.ending.reason))},
                 {"ended_message", r.ending.message},
                 {"end_time", r.ending.time},
                 {"partial", r.partial()},
                 {"targets", targets_json(plant, r)},
                 {"limits", limits_json(r)},
                 {"relief_devices", reliefs_json(r)},
                 {"gas_models", gas_models},
                 {"warnings", r.warnings},
                 {"advice", context.advice},
                 {"events", events_json(r)},
                 {"end", end}};
  answer.update(books_json(plant, r));
  answer["solver"] = {{"steps", s.steps},
                      {"steps_stiff", s.steps_stiff},
                      {"steps_explicit", s.steps_explicit},
                      {"rejected", s.rejected},
                      {"rate_calls", s.rate_calls},
                      {"jacobians", s.jacobians},
                      {"factorisations", s.factorisations},
                      {"events", s.events},
                      {"seconds", r.wall_seconds}};
  Json ranges = Json::array(), departures = Json::array();
  for (const ChannelRange& c : r.ranges)
    ranges.push_back({{"channel", c.channel},
                      {"lowest", c.lowest},
                      {"lowest_time", c.lowest_time},
                      {"highest", c.highest},
                      {"highest_time", c.highest_time},
                      {"end", c.end}});
  for (const IdealGasUse& g : r.ideal_gas)
    departures.push_back({{"gas_space", g.space}, {"departure_from_ideal", g.departure}, {"time", g.time}});
  answer["ranges"] = ranges;
  answer["ideal_gas"] = departures;
  answer["record"] = r.record_path;
  return answer.dump(2) + "\n";
}

}  // namespace gaskettle
