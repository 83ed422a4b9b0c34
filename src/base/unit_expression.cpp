#include "base/unit_expression.h"

#include <udunits2.h>

#include <array>
#include <memory>
#include <mutex>
#include <stdexcept>
#include <string_view>

#include "base/unit_aliases.h"

namespace gaskettle::unit_reading {
namespace {

struct FreeUnit {
  void operator()(ut_unit* u) const { ut_free(u); }
};
using Unit = std::unique_ptr<ut_unit, FreeUnit>;

/// Loaded once, used under its lock: the library keeps state of its own.
class UnitSystem {
public:
  static UnitSystem& instance() {
    static UnitSystem system;
    return system;
  }
  std::mutex& lock() { return mutex_; }
  Unit parse(const std::string& text) const { return Unit(ut_parse(system_, text.c_str(), UT_ASCII)); }
  Unit one() const { return Unit(ut_get_dimensionless_unit_one(system_)); }

private:
  UnitSystem() {
    ut_set_error_message_handler(ut_ignore);
    system_ = ut_read_xml(nullptr);
    if (system_ == nullptr)
      throw std::runtime_error("the unit data of UDUNITS-2 cannot be read; install it (libudunits2-data)");
  }
  ut_system* system_ = nullptr;
  std::mutex mutex_;
};

struct BadUnit {
  UnitFit fit;
  std::string culprit;
};

/// Whether all that follows a '/' up to the next one belongs below the line.
enum class Reading { left_to_right, product_below };

class Parser {
public:
  Parser(const UnitSystem& system, const std::string& text, Reading reading)
      : system_(system), text_(text), reading_(reading) {}

  Unit whole() {
    Unit u = expression(false);
    if (at_ != text_.size()) malformed();
    return u;
  }
  /// The unit was one name and nothing else: a temperature scale may keep its zero.
  bool single_name() const { return names_ == 1 && factors_ == 1 && !raised_; }

private:
  enum class Join { none, times, over };

  [[noreturn]] static void malformed() { throw BadUnit{UnitFit::malformed, {}}; }
  static Unit checked(ut_unit* u) {
    if (u == nullptr) malformed();
    return Unit(u);
  }
  static Unit times(const Unit& a, const Unit& b) { return checked(ut_multiply(a.get(), b.get())); }
  static Unit over(const Unit& a, const Unit& b) { return checked(ut_divide(a.get(), b.get())); }

  char peek(std::size_t ahead = 0) const { return at_ + ahead < text_.size() ? text_[at_ + ahead] : '\0'; }
  static bool letter(char c) { return (c >= 'A' && c <= 'Z') || (c >= 'a' && c <= 'z') || c == '_'; }
  static bool digit(char c) { return c >= '0' && c <= '9'; }
  void blanks() {
    while (peek() == ' ') ++at_;
  }

  Unit expression(bool below) {
    blanks();
    Unit u = leading_one() ? system_.one() : glued(below);
    for (Join join = next_join(); join != Join::none; join = next_join()) {
      if (join == Join::times)
        u = times(u, glued(below));
      else
        u = over(u, divisor());
    }
    return u;
  }

  Unit divisor() {
    Unit u = glued(true);
    while (reading_ == Reading::product_below) {
      const std::size_t before = at_;
      if (next_join() != Join::times) {
        at_ = before;
        break;
      }
      u = times(u, glued(true));
    }
    return u;
  }

  /// The 1 of "1/s".
  bool leading_one() {
    if (peek() != '1') return false;
    std::size_t ahead = 1;
    while (peek(ahead) == ' ') ++ahead;
    if (peek(ahead) != '/') malformed();
    ++at_;
    ++factors_;
    return true;
  }

  /// Moves past whatever joins two factors.
  Join next_join() {
    const std::size_t before = at_;
    blanks();
    if (peek() == '\0' || peek() == ')') return Join::none;
    Join join = at_ > before ? Join::times : Join::none;
    if (text_.compare(at_, 4, "per ") == 0 && join == Join::times) {
      at_ += 4;
      join = Join::over;
    } else if (peek() == '/') {
      ++at_;
      join = Join::over;
    } else if (peek() == '.' || peek() == '*' || (peek() == '-' && letter(peek(1)))) {
      ++at_;
      join = Join::times;
    }
    blanks();
    return join;
  }

  /// Factors written without anything between them: "m2K".
  Unit glued(bool below) {
    Unit u = factor(below);
    while (letter(peek()) || peek() == '(' || peek() == '%') u = times(u, factor(below));
    return u;
  }

  Unit factor(bool below) {
    if (peek() == '(') {
      ++at_;
      Unit inside = expression(below);
      if (peek() != ')') malformed();
      ++at_;
      return raised(std::move(inside));
    }
    const std::string name = read_name();
    return raised(named(name, below));
  }

  std::string read_name() {
    const std::size_t first = at_;
    if (peek() == '%')
      ++at_;
    else
      while (letter(peek())) ++at_;
    if (at_ == first) malformed();
    // The 2 in the formula of water is no exponent.
    if (text_[at_ - 1] == 'H' && text_.compare(at_, 2, "2O") == 0) at_ += 2;
    return text_.substr(first, at_ - first);
  }

  Unit named(const std::string& name, bool below) {
    ++names_;
    ++factors_;
    // Below a line mK is a metre times a kelvin, as in W/mK.
    if (below && name == "mK") return checked(system_.parse("m K").release());
    if (const UnitAlias* alias = find_unit_alias(name); alias != nullptr) {
      const Unit meaning = system_.parse(std::string(alias->meaning));
      if (alias->meaning.find(' ') != std::string_view::npos && (digit(peek()) || peek() == '^'))
        throw BadUnit{UnitFit::unknown_name, name};  // "Nm3" is no cube of a torque
      return checked(ut_scale(alias->factor, meaning.get()));
    }
    if (is_reserved_unit_word(name)) throw BadUnit{UnitFit::unknown_name, name};
    Unit u = system_.parse(name);
    if (!u) throw BadUnit{UnitFit::unknown_name, name};
    return u;
  }

  /// An exponent of at most two digits, if one follows.
  Unit raised(Unit u) {
    std::size_t start = at_;
    const bool marked = peek() == '^' || (peek() == '*' && peek(1) == '*');
    if (marked) start += peek() == '^' ? 1 : 2;
    at_ = start;
    int sign = 1;
    if ((peek() == '-' || peek() == '+') && digit(peek(1))) {
      sign = peek() == '-' ? -1 : 1;
      ++at_;
    }
    if (!digit(peek())) {
      if (marked) malformed();
      return u;
    }
    int power = 0;
    std::size_t digits = 0;
    for (; digit(peek()); ++at_, ++digits) power = digits < 3 ? 10 * power + (peek() - '0') : power;
    if (digits > 2) malformed();
    if (peek() == '.' && digit(peek(1))) malformed();
    raised_ = true;
    return checked(ut_raise(u.get(), sign * power));
  }

  const UnitSystem& system_;
  const std::string& text_;
  Reading reading_;
  std::size_t at_ = 0;
  int names_ = 0;
  int factors_ = 0;  // names and a leading 1
  bool raised_ = false;
};

struct FreeConverter {
  void operator()(cv_converter* c) const { cv_free(c); }
};
using Converter = std::unique_ptr<cv_converter, FreeConverter>;

/// The library would also convert reciprocals into each other and leave angles
/// out of account, so the quotient of the two units is looked at instead.
UnitFit compare(const Unit& quotient) {
  if (!quotient || ut_is_dimensionless(quotient.get()) == 0) return UnitFit::other_dimension;
  std::array<char, 256> text{};
  const int size = ut_format(quotient.get(), text.data(), text.size() - 1, UT_ASCII);
  if (size < 0 || static_cast<std::size_t>(size) >= text.size()) return UnitFit::other_dimension;
  const std::string_view view(text.data());
  const bool angle = view.find("rad") != std::string_view::npos || view.find("sr") != std::string_view::npos;
  return angle ? UnitFit::other_angle : UnitFit::fits;
}

UnitReading read_as(const UnitSystem& system, const std::string& unit, const Unit& si, Reading reading) {
  UnitReading r;
  try {
    Parser parser(system, unit, reading);
    const Unit u = parser.whole();
    const Unit quotient(ut_divide(u.get(), si.get()));
    r.fit = compare(quotient);
    if (r.fit != UnitFit::fits) return r;
    const Converter factor(ut_get_converter(quotient.get(), system.one().get()));
    const Converter scale(ut_get_converter(u.get(), si.get()));
    if (!factor || !scale) {
      r.fit = UnitFit::other_dimension;
      return r;
    }
    r.scale.factor = cv_convert_double(factor.get(), 1.0);
    if (parser.single_name()) r.scale.offset = cv_convert_double(scale.get(), 0.0);
  } catch (const BadUnit& bad) {
    r.fit = bad.fit;
    r.culprit = bad.culprit;
  }
  return r;
}

}  // namespace

UnitReading read_unit(const std::string& unit, const std::string& si) {
  UnitSystem& system = UnitSystem::instance();
  const std::lock_guard guard(system.lock());
  const Unit target = si == "1" ? system.one() : system.parse(si);
  if (!target) throw std::invalid_argument("\"" + si + "\" is not an SI unit that UDUNITS-2 knows");
  const UnitReading plain = read_as(system, unit, target, Reading::left_to_right);
  if (plain.fit != UnitFit::other_dimension) return plain;
  const UnitReading other = read_as(system, unit, target, Reading::product_below);
  return other.fit == UnitFit::fits ? other : plain;
}

}  // namespace gaskettle::unit_reading
