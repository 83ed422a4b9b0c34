// Internal to this floor and not installed: a small table in a group of a record.
#pragma once
#include <string>
#include <variant>
#include <vector>

#include "record/hdf5_tools.hpp"

namespace gaskettle::hdf5 {

/// What a column is; texts have no units.
struct ColumnInfo {
  std::string name;
  std::string units;
  std::string long_name;
  bool text = false;
};

/// A column's new cells.
using Cells = std::variant<std::vector<double>, std::vector<std::string>>;

/// One dataset a column, along a dimension scale that counts the rows from 0.
class Table {
public:
  Table() = default;
  /// Creates the group and its datasets, empty.
  Table(const H5::Group& parent, const std::string& group, const std::string& dimension,
        const std::vector<ColumnInfo>& columns, ScaleBook& scales);
  /// Adds `count` rows: cells a column, in the order of the columns.
  void append(std::size_t count, const std::vector<Cells>& cells);
  void close();

private:
  std::size_t rows_ = 0;
  H5::DataSet index_;
  std::vector<H5::DataSet> columns_;
};

/// The columns of `/events`, `/outcome/targets` and `/outcome/limits`, in the order of the fields of their rows.
const std::vector<ColumnInfo>& event_columns();
const std::vector<ColumnInfo>& target_columns();
const std::vector<ColumnInfo>& limit_columns();

std::vector<Cells> cells_of(const std::vector<EventRow>& rows);
std::vector<Cells> cells_of(const std::vector<TargetRow>& rows);
std::vector<Cells> cells_of(const std::vector<LimitRow>& rows);

std::vector<EventRow> read_events(const H5::Group& group);
std::vector<TargetRow> read_targets(const H5::Group& group);
std::vector<LimitRow> read_limits(const H5::Group& group);

}  // namespace gaskettle::hdf5
