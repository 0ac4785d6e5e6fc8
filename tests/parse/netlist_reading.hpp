// A netlist read from a text, and what it says, in words that tests can compare.
#pragma once

#include <string>
#include <string_view>
#include <utility>
#include <vector>

#include "base/names.hpp"
#include "model/netlist.hpp"
#include "parse/netlist.hpp"
#include "source/diagnostic.hpp"
#include "source/limits.hpp"
#include "source/text.hpp"

namespace parse_test {

using Files = std::vector<std::pair<std::string, std::string>>;

// Reads `text` as t.cir; the files that it may include are `files`.
class NetlistReading {
 public:
  explicit NetlistReading(std::string text, const Files& files = {}, const source::Limits& limits = {});

  [[nodiscard]] const model::Netlist& netlist() const { return netlist_; }
  [[nodiscard]] const model::Scope& top() const { return netlist_.scopes[0]; }
  [[nodiscard]] std::string name(base::NameId id) const;

  // All there was to say, each as file:line:column: level: message.
  [[nodiscard]] std::vector<std::string> said() const;

  // An element as "letter name(node node) reference = value key=value"; what is not there is left out.
  [[nodiscard]] std::string element(std::string_view name) const;
  [[nodiscard]] std::string show(const model::ElementCard& element) const;
  [[nodiscard]] std::string show(const model::Value& value) const;
  [[nodiscard]] std::string show(model::ExpressionId id) const;
  [[nodiscard]] std::string show(const std::vector<model::ParameterCard>& parameters) const;
  [[nodiscard]] std::string words(model::Range range) const;
  [[nodiscard]] std::string assignments(model::Range range) const;

  // Cards by fate: "modelled unmodelled skipped error".
  [[nodiscard]] std::string fates() const;

 private:
  source::Sources sources_;
  base::NameTable names_;
  source::Diagnostics diagnostics_;
  model::Netlist netlist_;
};

// An element of a netlist of one card.
[[nodiscard]] std::string one(const std::string& card);

// An expression tree in brackets: (+ 1 (* 2 a)).
[[nodiscard]] std::string show_tree(const model::ExpressionPool& pool, const base::NameTable& names,
                                    model::ExpressionId id);

}  // namespace parse_test
