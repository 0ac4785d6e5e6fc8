// The lines are ngspice 39.3's own, as measured.
#include "worker/text_rules.hpp"

#include <catch2/catch.hpp>

using worker::Meaning;
using worker::meaning_of;
using worker::Phase;

TEST_CASE("what a healthy deck makes the library say means no harm") {
  CHECK(meaning_of("stdout Note: No compatibility mode selected!", Phase::load) == Meaning::harmless);
  CHECK(meaning_of("stdout Circuit: t", Phase::load) == Meaning::harmless);
  CHECK(meaning_of("stdout ", Phase::load) == Meaning::harmless);
  CHECK(meaning_of("stdout Doing analysis at TEMP = 27.000000 and TNOM = 27.000000", Phase::analysis) ==
        Meaning::harmless);
  CHECK(meaning_of("stdout No. of Data Rows : 1", Phase::analysis) == Meaning::harmless);
}

TEST_CASE("any other line is unexpected, an unknown one and a harmless one out of its phase too") {
  CHECK(meaning_of("stderr Error on line 3 or its substitute:", Phase::load) == Meaning::unexpected);
  CHECK(meaning_of("stderr Warning: singular matrix:  check node n3", Phase::analysis) == Meaning::unexpected);
  CHECK(meaning_of("stderr Note: Transient op finished successfully", Phase::analysis) == Meaning::unexpected);
  CHECK(meaning_of("stdout DC solution failed -", Phase::analysis) == Meaning::unexpected);
  CHECK(meaning_of("stdout something new", Phase::analysis) == Meaning::unexpected);
  CHECK(meaning_of("stdout No. of Data Rows : 1", Phase::load) == Meaning::unexpected);
  CHECK(meaning_of("stdout Circuit: t", Phase::analysis) == Meaning::unexpected);
}

TEST_CASE("stepping is told from its completion, and is unexpected while a deck loads") {
  CHECK(meaning_of("stderr Note: Starting dynamic gmin stepping", Phase::analysis) == Meaning::stepping);
  CHECK(meaning_of("stderr Trying gmin =   5.6234E-03 Warning: Further gmin increment", Phase::analysis) ==
        Meaning::stepping);
  CHECK(meaning_of("stderr Supplies reduced to   0.0000% ", Phase::analysis) == Meaning::stepping);
  CHECK(meaning_of("stderr Note: Dynamic gmin stepping completed", Phase::analysis) == Meaning::completed);
  CHECK(meaning_of("stderr Note: Source stepping completed", Phase::analysis) == Meaning::completed);
  CHECK(meaning_of("stderr Warning: source stepping failed", Phase::analysis) == Meaning::unexpected);
  CHECK(meaning_of("stderr Note: Starting source stepping", Phase::load) == Meaning::unexpected);
}

TEST_CASE("outside of a deck nothing matters") {
  CHECK(meaning_of("stdout ** ngspice-39 shared library", Phase::idle) == Meaning::harmless);
}
