#include "run/case.h"

#include <algorithm>
#include <chrono>
#include <memory>

#include "record/record_writer.h"
#include "run/sampling.h"
#include "solve/integrate.h"

namespace gaskettle {

bool CaseResult::limit_broken() const {
  return std::any_of(limits.begin(), limits.end(), [](const Limit& l) { return l.broken(); });
}
bool CaseResult::target_missed() const {
  return std::any_of(targets.begin(), targets.end(), [](const Target& t) { return !t.reached(); });
}

namespace {
using Clock = std::chrono::steady_clock;

/// Watches one run for its record, its extremes and its user.
class CaseObserver {
public:
  CaseObserver(Plant& plant, const CaseOptions& options, RecordWriter* writer)
      : plant_(plant),
        options_(options),
        writer_(writer),
        rows_(plant, writer, plant.model().run.record_every),
        extremes_(plant) {}

  void start(double t, const double* y) {
    rows_.start(t, y);
    extremes_.look(t, y);
  }
  void piece(const DenseStep& step, double from, double to) {
    rows_.piece(step, from, to);
    extremes_.piece(step, from, to);
    report(to);
  }
  void before_event(double t, const double* y, const std::vector<int>&, bool) { rows_.before_event(t, y); }
  void after_event(double t, const double* y, const std::vector<int>&, bool) {
    rows_.after_event(t, y);
    extremes_.look(t, y);
  }
  bool interrupted() const { return options_.interrupt != nullptr && options_.interrupt->load(); }
  void finish(double t, const double* y) {
    rows_.finish(t, y);
    extremes_.finish(t, y);
  }
  const ExtremeTracker& extremes() const { return extremes_; }

private:
  /// Tells the user and saves what there is, now and then.
  void report(double t) {
    if (++pieces_ % 16 != 0) return;
    const auto now = Clock::now();
    if (options_.progress && now - told_ > std::chrono::milliseconds(100)) {
      told_ = now;
      options_.progress(t, plant_.model().run.until);
    }
    if (writer_ != nullptr && now - saved_ > std::chrono::seconds(1)) {
      saved_ = now;
      writer_->flush();
    }
  }
  Plant& plant_;
  const CaseOptions& options_;
  RecordWriter* writer_;
  RowSampler rows_;
  ExtremeTracker extremes_;
  long pieces_ = 0;
  Clock::time_point told_ = Clock::now(), saved_ = Clock::now();
};

std::unique_ptr<RecordWriter> open_record(const Plant& plant, const CaseOptions& options) {
  if (options.record_path.empty()) return nullptr;
  RecordWriter::Settings s;
  s.path = options.record_path;
  s.overwrite = options.overwrite;
  s.provenance = options.provenance;
  s.identity = options.identity;
  for (const ChannelDoc& c : plant.layout().channels) s.channels.push_back({c.name, c.kind.si, c.meaning});
  for (const BookColumn& b : book_columns(plant)) s.channels.push_back({b.name, b.units, b.meaning});
  for (const ProfileDoc& p : plant.layout().profiles)
    s.profiles.push_back(
        {p.part + ".profile", "K", "temperature over the depth of " + p.part, p.part + ".depth", p.depth});
  s.expected_rows =
      static_cast<std::size_t>(std::min(1e6, plant.model().run.until / plant.model().run.record_every)) + 2;
  return std::make_unique<RecordWriter>(std::move(s));
}

Outcome outcome_of(const CaseResult& r) {
  Outcome o;
  for (const Target& t : r.targets) o.targets.push_back({t.name, t.time});
  for (const Limit& l : r.limits) o.limits.push_back({l.name, l.extreme, l.extreme_time, l.margin(), l.crossed});
  const Statistics& s = r.ending.stats;
  const auto count = [](long n) { return Attribute(static_cast<std::int64_t>(n)); };
  o.attributes = {{"closure_energy", r.books.closure_energy},
                  {"closure_mass", r.books.closure_mass},
                  {"ended", std::string(name(r.ending.reason))},
                  {"ended_message", r.ending.message},
                  {"end_time", r.ending.time},
                  {"partial", count(r.partial() ? 1 : 0)},
                  {"books_closed", count(r.books_closed() ? 1 : 0)},
                  {"entropy_generated", r.books.generated},
                  {"entropy_imbalance", r.books.entropy_imbalance()},
                  {"steps", count(s.steps)},
                  {"steps_stiff", count(s.steps_stiff)},
                  {"steps_explicit", count(s.steps_explicit)},
                  {"rejected", count(s.rejected)},
                  {"rate_calls", count(s.rate_calls)},
                  {"jacobians", count(s.jacobians)},
                  {"factorisations", count(s.factorisations)},
                  {"events", count(s.events)},
                  {"wall_seconds", r.wall_seconds}};
  return o;
}
}  // namespace

CaseResult run_case(Plant& plant, const CaseOptions& options) {
  const auto began = Clock::now();
  std::unique_ptr<RecordWriter> writer = open_record(plant, options);
  std::vector<double> y = plant.start();
  CaseObserver observer(plant, options, writer.get());
  Settings settings;
  settings.t_end = plant.model().run.until;
  settings.rtol = plant.model().run.rtol;
  settings.method = plant.model().run.method;
  CaseResult result;
  result.ending = integrate(plant, observer, settings, y);
  // Held at its stability limit, an explicit method's errors hide below the tolerance of each step.
  constexpr long stiff_steps = 5000;
  if (settings.method == Method::explicit_ && result.ending.stats.steps > stiff_steps)
    plant.layout().warnings.emplace_back(
        "the explicit method took " + std::to_string(result.ending.stats.steps) +
        " steps: the plant is stiff, and the answer may be off by percents; use method: auto or stiff");
  observer.finish(result.ending.time, y.data());
  result.books = close_books(plant, result.ending.time, y.data());
  result.targets = plant.watch().targets();
  result.limits = plant.watch().limits();
  result.reliefs = observer.extremes().reliefs();
  result.ranges = observer.extremes().ranges();
  result.ideal_gas = observer.extremes().ideal_gas();
  result.events = plant.events();
  result.warnings = plant.layout().warnings;
  for (const IdealGasUse& g : result.ideal_gas)
    if (g.departure > departure_worth_saying) result.warnings.push_back(g.space + ": " + departure_text(g.departure));
  const Workspace<double>& w = plant.observe(result.ending.time, y.data());
  for (std::size_t c = 0; c < w.out.size(); ++c)
    result.end_values.emplace_back(plant.layout().channels[c].name, w.out[c]);
  result.wall_seconds = std::chrono::duration<double>(Clock::now() - began).count();
  if (!writer) return result;
  for (const LoggedEvent& e : result.events) writer->add_event({e.time, e.part, e.what, e.before, e.after});
  result.record_path = writer->finish(outcome_of(result));
  return result;
}

}  // namespace gaskettle
