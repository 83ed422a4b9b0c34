#include <algorithm>
#include <cmath>
#include <numeric>
#include <optional>
#include <stdexcept>

#include "laws/conduction_grading.h"
#include "laws/conduction_grid.h"
#include "laws/wall_response.h"

namespace gaskettle {
namespace {

constexpr int search_times_per_decade = 6, stated_times_per_decade = 40;
// So far past the run that nobody asks; a wall all but insulated takes for ever to settle.
constexpr double most_decades = 10.0;
// Of the inversion: 10^(-0.6 * 10) of the flow, alike in wall and grid, is far below any useful tolerance.
constexpr int choice_order = 10, full_order = 18;
// Where the flow has died away, errors count against this part of the mean flow since the step.
constexpr double floor_of_mean = 0.01;

/// Sides whose step the grid is judged by; may put in a film where the wall has none.
std::vector<StepSide> judged_sides(WallSpec& wall) {
  std::vector<StepSide> sides;
  if (wall.inner_film > 0) sides.push_back(StepSide::inner);
  if (wall.outer_film > 0 && (wall.outside_driven || sides.empty())) sides.push_back(StepSide::outer);
  if (!sides.empty()) return sides;
  wall.inner_film = 10.0;
  return {StepSide::inner};
}

/// The grid without a node inside a layer.
ConductionGrid coarsest_grid(const WallSpec& wall) {
  std::vector<std::vector<double>> whole;
  for (const WallLayer& layer : wall.layers) whole.push_back({layer.thickness});
  return make_grid(wall, whole);
}

double settling_time(const WallSpec& wall, const ConductionGrid& grid, StepSide side) {
  double capacity = 0.0;
  for (const ConductionNode& node : grid.nodes) capacity += node.heat_capacity;
  double resistance = 1.0 / (side == StepSide::inner ? wall.inner_film : wall.outer_film * grid.outer_area_ratio);
  for (const ConductionLink& link : grid.links) resistance += 1.0 / conductance(wall, link);
  return 10.0 * capacity * resistance;  // no mode is slower than capacity times resistance
}

/// Compares grids with the exact wall at fixed times; the exact side is worked out once.
class Judge {
public:
  Judge(const WallSpec& wall, double t_min, int per_decade, int order) : wall_(wall) {
    if (!(std::isfinite(t_min) && t_min > 0))
      throw std::invalid_argument("the earliest time a grid is good for must be above 0 s");
    const ConductionGrid coarsest = coarsest_grid(wall);  // refuses a wall that makes no sense
    for (const StepSide side : judged_sides(wall_)) {
      const double decades = std::clamp(std::log10(settling_time(wall_, coarsest, side) / t_min), 0.0, most_decades);
      const int count = static_cast<int>(std::ceil(decades * per_decade));
      for (int i = 0; i <= count; ++i) add(side, t_min * std::pow(10.0, static_cast<double>(i) / per_decade), order);
    }
  }

  const WallSpec& wall() const { return wall_; }

  /// Largest error of a grid; stops early, with a lower bound, once it is above `enough`.
  double error(const ConductionGrid& grid, double enough = perfect_film) {
    double worst = 0.0;
    for (std::size_t i = 0; i < moments_.size() && worst <= enough; ++i) {
      Moment& moment = moments_[(i + first_) % moments_.size()];
      double flow = 0.0;
      for (std::size_t k = 0; k < moment.points.s.size(); ++k)
        flow += (moment.points.weight[k] * grid_admittance(wall_, grid, moment.points.s[k], moment.side)).real();
      worst = std::max(worst, std::abs(flow - moment.flow) / moment.scale);
      if (worst > enough) first_ = (i + first_) % moments_.size();  // most likely to refuse the next one too
    }
    return worst;
  }

private:
  struct Moment {
    StepSide side;
    TalbotPoints points;  // weights divided by s: the step
    double flow, scale;   // W/(m2 K)
  };

  void add(StepSide side, double t, int order) {
    Moment moment{side, talbot_points(t, order), 0.0, 0.0};
    double heat = 0.0;
    for (std::size_t k = 0; k < moment.points.s.size(); ++k) {
      const Complex s = moment.points.s[k];
      moment.points.weight[k] /= s;
      const Complex term = moment.points.weight[k] * wall_admittance(wall_, s, side);
      moment.flow += term.real();
      heat += (term / s).real();
    }
    moment.scale = std::max(moment.flow, floor_of_mean * heat / t);
    moments_.push_back(std::move(moment));
  }

  WallSpec wall_;
  std::vector<Moment> moments_;
  std::size_t first_ = 0;
};

/// Spacings a layer.
using Counts = std::vector<int>;
int total(const Counts& counts) { return std::accumulate(counts.begin(), counts.end(), 0); }

/// Finds the fewest nodes a layer, for one grading.
class Search {
public:
  Search(Judge& judge, Grading grading) : judge_(judge), grading_(std::move(grading)) {}

  ConductionGrid grid(const Counts& counts) const {
    std::vector<std::vector<double>> spacings;
    for (std::size_t i = 0; i < counts.size(); ++i) spacings.push_back(grading_.spacings(i, counts[i]));
    return make_grid(judge_.wall(), spacings);
  }

  /// Counts of a grid within `limit` and with fewer than `most` spacings, if there is one.
  std::optional<Counts> within(double limit, int most) const {
    const Counts densest(judge_.wall().layers.size(), most_nodes_per_layer - 1);
    double density = 0.5;
    Counts counts = even(density);
    while (total(counts) < most && !good(counts, limit)) {
      if (counts == densest) return std::nullopt;
      counts = even(density *= 1.5);
    }
    if (total(counts) >= most) return std::nullopt;
    return thinned(counts, limit);
  }

  /// Takes out of every layer what a grid within `limit` can spare.
  Counts thinned(Counts counts, double limit) const {
    for (std::size_t i = counts.size(); i-- > 0;) thin(counts, i, limit);
    for (int& n : counts)  // a layer may spare a little more once the others have settled
      while (n > 1) {
        --n;
        if (good(counts, limit)) continue;
        ++n;
        break;
      }
    return counts;
  }

private:
  Counts even(double density) const {
    Counts counts;
    for (std::size_t i = 0; i < judge_.wall().layers.size(); ++i)
      counts.push_back(static_cast<int>(
          std::lround(std::clamp(density * grading_.demand(i), 1.0, static_cast<double>(most_nodes_per_layer - 1)))));
    return counts;
  }
  bool good(const Counts& counts, double limit) const { return judge_.error(grid(counts), limit) <= limit; }
  /// Bisects the count of one layer down to the smallest that is still good.
  void thin(Counts& counts, std::size_t layer, double limit) const {
    int bad = 0, fine = counts[layer];
    while (fine - bad > 1) {
      counts[layer] = (bad + fine) / 2;
      (good(counts, limit) ? fine : bad) = counts[layer];
    }
    counts[layer] = fine;
  }

  Judge& judge_;
  Grading grading_;
};

/// A grading and how many spacings each layer gets of it.
struct Choice {
  Search search;
  Counts counts;
  bool within_limit;
};

std::vector<Search> searches(Judge& judge, double t_min) {
  WallSpec judged = judge.wall();
  const std::vector<StepSide> sides = judged_sides(judged);
  const bool inside = sides.front() == StepSide::inner, outside = sides.back() == StepSide::outer;
  std::vector<Search> list;
  // The best start depends on films and layers: fine for bare wool, hardly graded for metal under a weak film.
  for (const double start : {1.0, 2.0, 4.0, 8.0, 16.0, 32.0, 0.5})
    list.emplace_back(judge, Grading(judged, start * std::sqrt(t_min), inside, outside));
  // A face behind metal or a weak film may need no fine nodes of its own.
  if (inside && outside)
    for (const double start : {1.0, 2.0, 4.0})
      for (const bool inner : {false, true})
        list.emplace_back(judge, Grading(judged, start * std::sqrt(t_min), inner, !inner));
  return list;
}

/// The best there is where no grid is within the limit.
Choice nearest(Judge& judge, const std::vector<Search>& list) {
  const Counts densest(judge.wall().layers.size(), most_nodes_per_layer - 1);
  std::size_t best = 0;
  double least = perfect_film;
  for (std::size_t i = 0; i < list.size(); ++i) {
    const double error = judge.error(list[i].grid(densest), least);
    if (error >= least) continue;
    least = error;
    best = i;
  }
  return {list[best], list[best].thinned(densest, 1.02 * least), false};
}

/// The smallest grid within `limit` at the judge's times, over a few gradings.
Choice smallest(Judge& judge, double t_min, double limit) {
  const std::vector<Search> list = searches(judge, t_min);
  const int layers = static_cast<int>(judge.wall().layers.size());
  std::optional<Choice> best;
  int most = layers * most_nodes_per_layer;
  for (const Search& search : list) {
    const std::optional<Counts> counts = search.within(limit, most);
    if (!counts) continue;
    best.emplace(Choice{search, *counts, true});
    most = total(*counts);
    if (most == layers) break;
  }
  return best ? *best : nearest(judge, list);
}

Counts refined(Counts counts, double refinement) {
  for (int& n : counts) n = static_cast<int>(std::max(1.0, std::round(n * refinement)));
  return counts;
}

}  // namespace

ConductionGrid choose_conduction_grid(const WallSpec& wall, double t_min, double tolerance, double refinement) {
  if (!(std::isfinite(refinement) && refinement > 0))
    throw std::invalid_argument("the refinement of a wall grid must be above 0");
  Judge judge(wall, t_min, search_times_per_decade, choice_order);
  Judge closer(wall, t_min, stated_times_per_decade, choice_order);
  double limit = 0.95 * tolerance;
  std::optional<Choice> choice;
  for (int attempt = 0; attempt < 3; ++attempt) {
    choice.emplace(smallest(judge, t_min, limit));
    const double error = closer.error(choice->search.grid(choice->counts));
    if (error <= tolerance || !choice->within_limit) break;
    limit *= 0.9 * tolerance / error;  // the peak lay between the times of the search
  }
  ConductionGrid grid = choice->search.grid(refined(choice->counts, refinement));
  grid.t_min = t_min;
  grid.stated_error = closer.error(grid);
  return grid;
}

double grid_error(const WallSpec& wall, const ConductionGrid& grid, double t_min, int per_decade) {
  return Judge(wall, t_min, per_decade, full_order).error(grid);
}

}  // namespace gaskettle
