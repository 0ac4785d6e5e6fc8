#include "report/json_points.hpp"

#include <cmath>
#include <fmt/format.h>
#include <iterator>
#include <string_view>
#include <vector>

namespace report {
namespace {

class Points {
 public:
  Points(const model::Sweep& sweep, std::string& out) : sweep_(sweep), out_(out) {}

  void run() {
    out_ += "\"points\": [";
    for (std::size_t i = 0; i < sweep_.at.size(); ++i) {
      out_ += i == 0 ? "\n       {" : ",\n       {";
      point(i);
      out_ += '}';
    }
    out_ += sweep_.at.empty() ? "]" : "\n      ]";
  }

 private:
  void point(std::size_t i) {
    first_ = true;
    number("at", sweep_.at, i);
    number("sensor_ohms", sweep_.sensor_ohms, i);
    number("bare_volts", sweep_.bare_volts, i);
    number("pin_volts", sweep_.pin_volts, i);
    number("pin_low", sweep_.pin_low, i);
    number("pin_high", sweep_.pin_high, i);
    if (i >= sweep_.code.size()) return;
    key("code");
    fmt::format_to(std::back_inserter(out_), "{}", sweep_.code[i]);
  }

  void key(std::string_view name) {
    fmt::format_to(std::back_inserter(out_), "{}\"{}\": ", first_ ? "" : ", ", name);
    first_ = false;
  }

  void number(std::string_view name, const std::vector<double>& values, std::size_t i) {
    if (i >= values.size() || !std::isfinite(values[i])) return;
    key(name);
    fmt::format_to(std::back_inserter(out_), "{}", values[i] + 0.0);  // never -0
  }

  const model::Sweep& sweep_;
  std::string& out_;
  bool first_ = true;
};

}  // namespace

void append_points(const model::Sweep& sweep, std::string& out) {
  Points(sweep, out).run();
}

}  // namespace report
