// Cards of elements: which words are nodes, which is the value, by the letter.
#pragma once

#include <cstddef>
#include <cstdint>
#include <string_view>
#include <vector>

#include "model/netlist.hpp"
#include "parse/cards/text.hpp"

namespace parse {

// Names of the whole netlist, once all of it has been seen: some cards can only be read then.
class KnownNames {
 public:
  explicit KnownNames(const model::Netlist& netlist);

  [[nodiscard]] bool is_model(base::NameId name) const { return is_in(models_, name); }
  [[nodiscard]] bool is_node(base::NameId name) const { return is_in(nodes_, name); }

 private:
  static bool is_in(const std::vector<bool>& set, base::NameId name) {
    return name.index() < set.size() && set[name.index()];
  }
  static void put(std::vector<bool>& set, base::NameId name);

  std::vector<bool> models_;
  std::vector<bool> nodes_;
};

enum class Outcome : std::uint8_t {
  element,  // `element` is complete (or the card has failed)
  later,    // the names of the whole netlist decide: ask again with them
  nothing,  // the card is understood and makes no element
};

// Reads the card into `element`, whose name, card and letter are set. `known` is none on the first pass; with it no
// outcome is `later`. Words that do not fit their letter (a connector J1 with six pins) become a part: letter '?', all
// words but the last are nodes, the last is the reference.
[[nodiscard]] Outcome read_element(Card& card, const KnownNames* known, model::ElementCard& element);

// ---- The readers by letter; `read_element` is their only caller. Words 1 .. `key`-1 stand before the first key =
// value. ----

struct ElementWords {
  Card& card;
  const KnownNames* known;
  model::ElementCard& element;
  std::size_t key;  // the first key, or the number of words

  [[nodiscard]] std::size_t count() const { return key - 1; }  // words between name and first key
  // Takes the first `nodes` words behind the name as nodes; an expression among them fails the card.
  void take_nodes(std::size_t nodes) const;
};

[[nodiscard]] Outcome read_passive(const ElementWords& words);             // R C L
[[nodiscard]] Outcome read_source(const ElementWords& words);              // V I
[[nodiscard]] Outcome read_device(const ElementWords& words);              // D Q J M
[[nodiscard]] Outcome read_controlled(const ElementWords& words);          // E G
[[nodiscard]] Outcome read_current_controlled(const ElementWords& words);  // F H
[[nodiscard]] Outcome read_behavioural(const ElementWords& words);         // B
[[nodiscard]] Outcome read_switch(const ElementWords& words);              // S W
[[nodiscard]] Outcome read_coupling(const ElementWords& words);            // K
[[nodiscard]] Outcome read_instance(const ElementWords& words);            // X
[[nodiscard]] Outcome read_part(const ElementWords& words);  // all other letters, and words that do not fit theirs

}  // namespace parse
