// Reading declarations out of texts, for the tests of the sheet.
#pragma once

#include <algorithm>
#include <fmt/format.h>
#include <string>
#include <utility>
#include <vector>

#include "parse/sheet.hpp"

namespace sheet_test {

struct Text {
  std::string name;
  std::string bytes;
  bool inside_netlist = false;
};

struct Reading {
  source::Sources sources;
  source::Diagnostics diagnostics;
  model::Sheet sheet;

  // "line:column" of a place; with the file's name where there are several.
  [[nodiscard]] std::string at(source::Span where) const {
    if (!where.valid()) return "nowhere";
    const auto position = sources.position(where.begin);
    const std::string file = sources.size() > 1 ? sources[where.begin.source].name + ":" : "";
    return fmt::format("{}{}:{}", file, position.line, position.column);
  }

  // "line:column: message" of each diagnostic.
  [[nodiscard]] std::vector<std::string> messages() const {
    std::vector<std::string> texts;
    for (const auto& diagnostic : diagnostics) texts.push_back(at(diagnostic.where) + ": " + diagnostic.message);
    return texts;
  }

  // "text of the span @ line:column", to check a value's place.
  [[nodiscard]] std::string spot(source::Span where) const {
    return fmt::format("{} @ {}", sources.text(where), at(where));
  }
};

inline Reading read_all(std::vector<Text> texts) {
  Reading reading;
  std::vector<parse::SheetSource> places;
  for (Text& text : texts) {
    const bool inside = text.inside_netlist;
    places.push_back({reading.sources.add({std::move(text.name), std::move(text.bytes), {}}), inside});
  }
  reading.sheet = parse::read_sheet(places, reading.sources, reading.diagnostics);
  return reading;
}

inline Reading read(std::string toml) {
  return read_all({{"board.tap.toml", std::move(toml), false}});
}
inline Reading read_netlist(std::string netlist) {
  return read_all({{"board.cir", std::move(netlist), true}});
}

using Messages = std::vector<std::string>;

}  // namespace sheet_test
