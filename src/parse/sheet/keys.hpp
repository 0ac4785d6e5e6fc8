// The keys of one table: each is asked for by name with what it must be; at the end, what nobody asked for is refused.
#pragma once

#include <initializer_list>
#include <limits>
#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <utility>
#include <vector>

#include "model/sheet.hpp"
#include "parse/quantity.hpp"
#include "parse/sheet/tree.hpp"

namespace parse {

// What all readers of tables share.
struct SheetContext {
  const source::Sources& sources;
  source::Diagnostics& diagnostics;
  bool complete = true;                      // every place could be parsed: a missing key is missing
  std::vector<std::string_view> rails = {};  // names of the declared rails

  void error(source::Span where, std::string message) {
    diagnostics.push_back({base::Level::error, where, std::move(message)});
  }
};

// Which numbers a key takes.
enum class Bound : unsigned char { any, not_negative, above_zero };

// "expected EXPECTED, found ...".
[[nodiscard]] std::string mismatch(std::string_view expected, const TomlNode& node, const SheetContext& context);

// A number in SI units, or a text with a quantity. Errors are told, and give nothing.
[[nodiscard]] std::optional<double> quantity_of(const TomlNode& node, Unit unit, SheetContext& context);

// `number` within `bound`; else an error is told at the node and false given.
[[nodiscard]] bool within(double number, Bound bound, const TomlNode& node, SheetContext& context);

// A text that is not empty. `expected` says what: "the name of a net".
[[nodiscard]] std::optional<std::string> name_of(const TomlNode& node, std::string_view expected,
                                                 SheetContext& context);

// A choice of texts, by its index.
[[nodiscard]] std::optional<std::size_t> choice_of(const TomlNode& node, std::span<const std::string_view> choices,
                                                   SheetContext& context);

class TableKeys {
 public:
  // `title` is how messages call the table: "sensor.RT1".
  TableKeys(const TomlTable& table, source::Span where, std::string title, SheetContext& context)
      : table_(table), where_(where), title_(std::move(title)), context_(context) {}

  [[nodiscard]] const TomlEntry* take(std::string_view key);
  [[nodiscard]] model::Maybe<double> quantity(std::string_view key, Unit unit, Bound bound);
  [[nodiscard]] model::Maybe<int> whole(std::string_view key, int least, int most);
  [[nodiscard]] model::Maybe<std::string> name(std::string_view key, std::string_view expected);
  [[nodiscard]] model::Maybe<std::size_t> choice(std::string_view key, std::initializer_list<std::string_view> choices);

  // Refuses a key, if it is there, with this message.
  void refuse(std::string_view key, const std::string& message);

  // Tells that a key is missing.
  void missing(std::string_view key, std::string_view why = {});

  // Refuses what was not taken: keys of a wider version as such, all else as unknown, with the nearest name.
  void finish(std::initializer_list<std::string_view> not_supported = {});

  // A sheet's note that a key, which was taken, is not checked against anything yet.
  [[nodiscard]] model::UnusedKey unused(std::string_view key, std::string_view unchecked) const;

  [[nodiscard]] bool empty() const { return table_.entries.empty(); }
  [[nodiscard]] const std::string& title() const { return title_; }
  [[nodiscard]] source::Span where() const { return where_; }
  [[nodiscard]] SheetContext& context() const { return context_; }

 private:
  const TomlTable& table_;
  source::Span where_;
  std::string title_;
  SheetContext& context_;
  std::vector<std::string_view> asked_;
};

// "unknown WHAT "betta" IN; did you mean "beta"?"
[[nodiscard]] std::string unknown(std::string_view what, std::string_view name, std::string_view in,
                                  const std::vector<std::string_view>& known);

}  // namespace parse
