#include "record/record_table.hpp"

#include <algorithm>
#include <array>
#include <numeric>

namespace gaskettle::hdf5 {
namespace {

constexpr hsize_t chunk_rows = 64;

void write_texts(H5::DataSet& dataset, std::size_t first, const std::vector<std::string>& texts) {
  std::vector<const char*> starts;
  for (const std::string& text : texts) starts.push_back(text.c_str());
  write_rows(dataset, text_type(), first, texts.size(), starts.data());
}

template <class Row, class Value>
std::vector<Value> column(const std::vector<Row>& rows, Value Row::*field) {
  std::vector<Value> cells;
  cells.reserve(rows.size());
  for (const Row& row : rows) cells.push_back(row.*field);
  return cells;
}

void read_column(const H5::DataSet& dataset, std::size_t count, std::vector<double>& cells) {
  cells = read_rows(dataset, 0, count);
}
void read_column(const H5::DataSet& dataset, std::size_t count, std::vector<std::string>& cells) {
  cells = read_texts(dataset, count);
}

// The rows of a group's table, one field a column.
template <class Row, class... Values>
std::vector<Row> read_table(const H5::Group& group, const std::vector<ColumnInfo>& columns, Values Row::*... fields) {
  std::vector<H5::DataSet> datasets;
  hsize_t count = H5S_UNLIMITED;
  for (const ColumnInfo& column : columns) {
    datasets.push_back(group.openDataSet(column.name));
    count = std::min(count, row_count(datasets.back()));
  }
  std::vector<Row> rows(count);
  std::size_t next = 0;
  const auto fill = [&]<class Value>(Value Row::*field) {
    std::vector<Value> cells;
    read_column(datasets[next++], count, cells);
    for (std::size_t i = 0; i < count; ++i) rows[i].*field = std::move(cells[i]);
  };
  (fill(fields), ...);
  return rows;
}

}  // namespace

Table::Table(const H5::Group& parent, const std::string& group_name, const std::string& dimension,
             const std::vector<ColumnInfo>& columns, ScaleBook& scales) {
  const H5::Group group = create_group(parent, group_name);
  index_ = create_column(group, dimension, H5::PredType::STD_I64LE, chunk_rows);
  set_attribute(index_, "long_name", "number of the " + dimension + ", from 0");
  const std::array<std::size_t, 1> scale = {scales.add_scale(index_, dimension)};
  for (const ColumnInfo& column : columns) {
    const H5::DataType type = column.text ? H5::DataType(text_type()) : H5::DataType(H5::PredType::IEEE_F64LE);
    H5::DataSet dataset = create_column(group, column.name, type, chunk_rows);
    if (!column.units.empty()) set_attribute(dataset, "units", column.units);
    set_attribute(dataset, "long_name", column.long_name);
    scales.attach(dataset, scale);
    columns_.push_back(dataset);
  }
}

void Table::append(std::size_t count, const std::vector<Cells>& cells) {
  if (count == 0) return;
  std::vector<std::int64_t> numbers(count);
  std::iota(numbers.begin(), numbers.end(), static_cast<std::int64_t>(rows_));
  write_rows(index_, H5::PredType::NATIVE_INT64, rows_, count, numbers.data());
  for (std::size_t i = 0; i < columns_.size(); ++i) {
    if (const auto* texts = std::get_if<std::vector<std::string>>(&cells[i])) {
      write_texts(columns_[i], rows_, *texts);
    } else {
      const auto& values = std::get<std::vector<double>>(cells[i]);
      write_rows(columns_[i], H5::PredType::NATIVE_DOUBLE, rows_, count, values.data());
    }
  }
  rows_ += count;
}

void Table::close() {
  index_.close();
  columns_.clear();
}

const std::vector<ColumnInfo>& event_columns() {
  static const std::vector<ColumnInfo> columns = {
      {"time", "s", "time of the event"},
      {"part", "", "part that the event happened to", true},
      {"what", "", "what happened", true},
      {"before", "", "the part's opening, output, velocity or main quantity just before"},
      {"after", "", "the same just after"},
  };
  return columns;
}

const std::vector<ColumnInfo>& target_columns() {
  static const std::vector<ColumnInfo> columns = {
      {"name", "", "name of the target", true},
      {"time", "s", "time at which it was reached, NaN where it was not"},
  };
  return columns;
}

const std::vector<ColumnInfo>& limit_columns() {
  static const std::vector<ColumnInfo> columns = {
      {"name", "", "name of the limit", true},
      {"extreme", "", "value that came nearest to the limit or went furthest beyond"},
      {"extreme_time", "s", "time of the extreme"},
      {"margin", "", "distance that was left, negative where the limit was exceeded"},
      {"crossed_time", "s", "time at which the limit was first exceeded, NaN where it was not"},
  };
  return columns;
}

std::vector<Cells> cells_of(const std::vector<EventRow>& rows) {
  return {column(rows, &EventRow::time), column(rows, &EventRow::part), column(rows, &EventRow::what),
          column(rows, &EventRow::before), column(rows, &EventRow::after)};
}

std::vector<Cells> cells_of(const std::vector<TargetRow>& rows) {
  return {column(rows, &TargetRow::name), column(rows, &TargetRow::time)};
}

std::vector<Cells> cells_of(const std::vector<LimitRow>& rows) {
  return {column(rows, &LimitRow::name), column(rows, &LimitRow::extreme), column(rows, &LimitRow::extreme_time),
          column(rows, &LimitRow::margin), column(rows, &LimitRow::crossed_time)};
}

std::vector<EventRow> read_events(const H5::Group& group) {
  return read_table(group, event_columns(), &EventRow::time, &EventRow::part, &EventRow::what, &EventRow::before,
                    &EventRow::after);
}

std::vector<TargetRow> read_targets(const H5::Group& group) {
  return read_table(group, target_columns(), &TargetRow::name, &TargetRow::time);
}

std::vector<LimitRow> read_limits(const H5::Group& group) {
  return read_table(group, limit_columns(), &LimitRow::name, &LimitRow::extreme, &LimitRow::extreme_time,
                    &LimitRow::margin, &LimitRow::crossed_time);
}

}  // namespace gaskettle::hdf5
