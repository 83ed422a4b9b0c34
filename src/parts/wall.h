/// Layers of solid between a gas space and the surroundings, or another space.
///
/// Conduction by finite volumes, nodes standing at both faces and at the interfaces
/// (laws/conduction_grid.h says how their number is chosen and how good they are):
///   C_i dT_i/dt = G_(i-1,i) (T_(i-1) - T_i) - G_(i,i+1) (T_i - T_(i+1)) + faces
/// Inside face: film to the gas; radiation comes from heaters and bodies. Outside
/// face: film to what it sees, grey-body radiation to it, absorbed flux; or the film
/// of a second space. `bridges` conduct from face to face past the layers.
/// A default area follows a piston (films only; the metal's heat capacity does not).
/// Source: S. V. Patankar, Numerical Heat Transfer and Fluid Flow, 1980, chapter 4.
#pragma once
#include <string>

#include "laws/conductivity_table.h"
#include "laws/radiation.h"
#include "model/film_use.h"
#include "model/materials.h"
#include "model/workspace.h"

namespace gaskettle {

class Wall {
public:
  static constexpr const char* section = "walls";
  static constexpr const char* kind = "wall";
  static constexpr const char* meaning = "layers of solid between a gas space and the surroundings or another space";

  std::string name;
  Place place;

  void read(Section& s);
  void declare(Layout& layout);
  void connect(Layout& layout);

  template <class S>
  void prepare(Workspace<S>& w) const {
    for (std::size_t i = 0; i < store_.size(); ++i)
      w.temperature[store_[i]] = start_ + w.y[state_[i]] * inverse_capacity_[i];
    w.out[channel_] = w.temperature[store_.front()];
    w.out[channel_ + 1] = w.temperature[store_.back()];
  }

  template <class S>
  void exchange(Workspace<S>& w) const {
    const S inner_area = area_ + area_per_volume_ * (w.volume[space_] - volume_start_);
    inside_.exchange(w, space_, store_.front(), inner_area);
    conduct(w);
    if (other_space_ >= 0) {
      outside_.exchange(w, other_space_, store_.back(), S(outer_area_));
      return;
    }
    lose(w);
  }

private:
  struct Link {
    int conductivity;  ///< index of the table, or -1: `conductance` as it is
    double conductance;
  };

  template <class S>
  void conduct(Workspace<S>& w) const {
    for (std::size_t i = 0; i < link_.size(); ++i) {
      const S& a = w.temperature[store_[i]];
      const S& b = w.temperature[store_[i + 1]];
      const S q = link_[i].conductivity < 0
                      ? S(link_[i].conductance * (a - b))
                      : S(link_[i].conductance * tables_[link_[i].conductivity].at(S(0.5 * (a + b))) * (a - b));
      w.heat(store_[i], store_[i + 1], q, Mechanism::conduction);
    }
    if (bridges_ > 0.0 && store_.size() > 1)
      w.heat(store_.front(), store_.back(), bridges_ * (w.temperature[store_.front()] - w.temperature[store_.back()]),
             Mechanism::conduction);
  }

  template <class S>
  void lose(Workspace<S>& w) const {
    const int face = store_.back();
    const S& here = w.temperature[face];
    const S there = facing_input_ >= 0 ? w.input[facing_input_] : w.ambient_temperature;
    const S film = outside_.outside_coefficient(w, here, there) * outer_area_ * (here - there);
    w.heat_out(face, there, film, Mechanism::film, loss_entry_);
    S loss = film;
    if (outside_emissivity_ > 0.0) {
      const S radiated = radiant_heat<S>(S(outside_emissivity_ * outer_area_), here, there);
      w.heat_out(face, there, radiated, Mechanism::radiation, loss_entry_);
      loss = loss + radiated;
    }
    if (flux_input_ >= 0) w.supply(face, w.input[flux_input_] * outer_area_, Mechanism::flux, flux_entry_);
    w.out[channel_ + 2] = loss;
  }

  Reference around_, to_;
  struct Layer {
    Material material;
    double thickness = 0.0, contact = 0.0;
  };
  std::vector<Layer> layers_;
  std::optional<Value> stated_area_, stated_start_;
  bool has_area_ = false;  // states an area, readable or not
  double bridges_ = 0.0, inside_emissivity_ = 0.0, outside_emissivity_ = 0.0;
  FilmUse inside_, outside_;
  SignalSpec facing_spec_, flux_spec_;

  int space_ = 0, other_space_ = -1, channel_ = 0, loss_entry_ = 0, flux_entry_ = 0, facing_input_ = -1,
      flux_input_ = -1;
  double area_ = 0.0, outer_area_ = 0.0, area_per_volume_ = 0.0, volume_start_ = 0.0, start_ = 0.0;
  std::vector<int> store_, state_;
  std::vector<double> inverse_capacity_;
  std::vector<Link> link_;
  std::vector<ConductivityTable> tables_;
};

}  // namespace gaskettle
