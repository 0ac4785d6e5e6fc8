// A netlist as written: cards, sorted into scopes (the top level and every subcircuit definition). Nothing is expanded.
#pragma once

#include <cstdint>
#include <map>
#include <string>
#include <vector>

#include "base/names.hpp"
#include "model/expression.hpp"
#include "model/value.hpp"
#include "source/text.hpp"

namespace model {

using CardId = base::Id<struct CardTag>;
using ScopeId = base::Id<struct ScopeTag>;

// What became of a card; each card has exactly one, so that the four counts add up to the cards read.
enum class CardFate : std::uint8_t { modelled, unmodelled, skipped, error };

// One logical line. `end` is past its last byte, continuation lines included.
struct CardRecord {
  source::SourceId source;
  std::uint32_t begin = 0;
  std::uint32_t end = 0;
  CardFate fate = CardFate::modelled;
};

// Why a card has the fate error.
struct CardFault {
  source::Span where;
  std::string reason;  // a clause without a full stop
  CardId cause;        // the other card whose fault it is (a header without its end, a parameter); none: its own
};

// A name as it stands in a card.
struct Word {
  base::NameId name;
  std::uint32_t offset = 0;  // in the card's source
};

// key = value on a card.
struct Assignment {
  Word key;
  Value value;
};

// A range in one of the netlist's vectors.
struct Range {
  std::uint32_t first = 0;
  std::uint32_t count = 0;
};

// An element as written. `letter` is its first letter folded; which words are nodes is settled by letter, by what
// follows, and by the names of models and subcircuits of the whole netlist.
struct ElementCard {
  base::NameId name;
  CardId card;
  char letter = '?';
  bool switched_off = false;  // S W: starts open
  bool at_time_zero = false;  // V I: no DC value is written; `value` is that of its function at time zero
  Range nodes;                // in Netlist::words
  Word reference;             // model (R C L D Q J M S W), subcircuit (X), controlling source (F H W), or a part text
  base::NameId second_reference;  // W: the model, beside its controlling source
  Value value;  // ohms, farads, henries, DC volts or amperes, gain, or the expression of a source (E G B)
  bool drives_current = false;  // B: I= rather than V=
  Range parameters;             // in Netlist::assignments
};

// .model NAME TYPE (key=value ...)
struct ModelCard {
  base::NameId name;
  base::NameId type;
  CardId card;
  Range parameters;
  bool broken = false;  // it could not be read, or another of its name says something else: nothing may use it
};

// .param NAME = VALUE
struct ParameterCard {
  Word name;
  Value value;  // monostate: a parameter without a default
  CardId card;
  bool broken = false;  // what it is worth could not be read
};

// The top level (scope 0) or a subcircuit definition.
struct Scope {
  base::NameId name;                      // of the subcircuit
  CardId card;                            // its .subckt
  CardId last;                            // its .ends; none where it has none
  bool broken = false;                    // as of a model
  ScopeId parent;                         // where it was defined; none for the top level
  Range ports;                            // in Netlist::words
  std::vector<ParameterCard> defaults;    // of the .subckt card
  std::vector<ParameterCard> parameters;  // .param cards, in order
  std::vector<ModelCard> models;
  base::LargeVector<ElementCard> elements;  // in order
  std::vector<ScopeId> scopes;              // subcircuits defined inside
};

// A file, or a section of one, that could not be included.
struct MissingInclude {
  CardId card;
  source::Span where;
  std::string what;  // which and why: "models/clamp.lib": no such file
};

struct Netlist {
  source::SourceId root;
  base::LargeVector<CardRecord> cards;  // in reading order, included files where their card stands
  std::vector<Scope> scopes;            // [0] is the top level
  base::LargeVector<Word> words;
  std::vector<Assignment> assignments;
  std::vector<OddLiteral> odd_literals;
  ExpressionPool expressions;
  std::vector<Word> globals;  // nets of .global
  std::vector<MissingInclude> missing_includes;
  std::map<CardId, CardFault> faults;  // of cards with the fate error: the first of each
  std::string cut;                     // the limit at which cards were left out, in a sentence; empty: none was

  [[nodiscard]] source::Span span(CardId id) const {
    const CardRecord& card = cards[id.index()];
    return {{card.source, card.begin}, card.end - card.begin};
  }
};

// How many cards met which fate.
struct ReadingCount {
  std::size_t cards = 0;
  std::size_t modelled = 0;
  std::size_t unmodelled = 0;
  std::size_t skipped = 0;
  std::size_t error = 0;
};

}  // namespace model
