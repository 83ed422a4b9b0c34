#include <array>

#include "record/hdf5_tools.hpp"

namespace gaskettle::hdf5 {
namespace {

constexpr const char* class_name = "CLASS";
constexpr const char* scale_class = "DIMENSION_SCALE";
constexpr const char* forward_list = "DIMENSION_LIST";
constexpr const char* backward_list = "REFERENCE_LIST";

hobj_ref_t reference_to(const H5::DataSet& dataset) {
  hobj_ref_t reference = 0;
  dataset.reference(&reference, ".");
  return reference;
}

}  // namespace

std::size_t ScaleBook::add_scale(H5::DataSet& dataset, const std::string& name) {
  set_attribute(dataset, class_name, std::string(scale_class));
  set_attribute(dataset, "NAME", name);
  scales_.push_back({dataset, {}});
  return scales_.size() - 1;
}

void ScaleBook::attach(H5::DataSet& dataset, std::span<const std::size_t> scales) {
  std::vector<hobj_ref_t> targets;
  for (const std::size_t scale : scales) targets.push_back(reference_to(scales_[scale].dataset));
  std::vector<hvl_t> lists;
  for (hobj_ref_t& target : targets) lists.push_back({1, &target});
  const H5::VarLenType type(H5::PredType::STD_REF_OBJ);
  const hsize_t rank = lists.size();
  dataset.createAttribute(forward_list, type, H5::DataSpace(1, &rank)).write(type, lists.data());
  for (std::size_t i = 0; i < scales.size(); ++i) {
    scales_[scales[i]].uses.push_back({reference_to(dataset), static_cast<int>(i)});
  }
}

void ScaleBook::write_back_references() {
  H5::CompType type(sizeof(Use));
  type.insertMember("dataset", offsetof(Use, dataset), H5::PredType::STD_REF_OBJ);
  type.insertMember("dimension", offsetof(Use, dimension), H5::PredType::NATIVE_INT);
  for (Scale& scale : scales_) {
    if (scale.uses.empty()) continue;
    const hsize_t count = scale.uses.size();
    scale.dataset.createAttribute(backward_list, type, H5::DataSpace(1, &count)).write(type, scale.uses.data());
  }
}

bool is_scale(const H5::DataSet& dataset) { return get_text(dataset, class_name) == scale_class; }

std::string scale_name(const H5::DataSet& dataset, std::size_t dimension) {
  if (!dataset.attrExists(forward_list)) return {};
  const H5::Attribute attribute = dataset.openAttribute(forward_list);
  const H5::DataSpace space = attribute.getSpace();
  const H5::VarLenType type(H5::PredType::STD_REF_OBJ);
  std::vector<hvl_t> lists(static_cast<std::size_t>(space.getSimpleExtentNpoints()));
  attribute.read(type, lists.data());
  std::string name;
  if (dimension < lists.size() && lists[dimension].len > 0) {
    H5::DataSet scale;
    scale.dereference(dataset, lists[dimension].p);
    name = scale.getObjName();
  }
  H5Dvlen_reclaim(type.getId(), space.getId(), H5P_DEFAULT, lists.data());
  return name.substr(name.rfind('/') + 1);
}

}  // namespace gaskettle::hdf5
