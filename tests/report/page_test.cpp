#include "report/page.hpp"

#include <catch2/catch.hpp>

using report::Page;
using report::Tone;

TEST_CASE("a title fills the page's width") {
  Page page(false);
  page.title("left", '-', "right", Tone::bad);
  CHECK(page.take() == "left " + std::string(69, '-') + " right\n");
}

TEST_CASE("a title without a right side runs to the edge") {
  Page page(false);
  page.title("left", '-', "", Tone::plain);
  CHECK(page.take() == "left " + std::string(75, '-') + "\n");
}

TEST_CASE("characters of several bytes count as one column in a title") {
  Page page(false);
  page.title("\xE2\x84\xA6", '-', "", Tone::plain);
  CHECK(page.take() == "\xE2\x84\xA6 " + std::string(78, '-') + "\n");
}

TEST_CASE("a row breaks between words and goes on under its text") {
  Page page(false);
  page.row("label", std::string(60, 'a') + " " + std::string(10, 'b'));
  CHECK(page.take() == "  label        " + std::string(60, 'a') + "\n               bbbbbbbbbb\n");
}

TEST_CASE("a row that ends exactly at the edge is not broken") {
  Page page(false);
  page.row("label", std::string(54, 'a') + " " + std::string(10, 'b'));
  CHECK(page.take() == "  label        " + std::string(54, 'a') + " bbbbbbbbbb\n");
}

TEST_CASE("a word that is wider than the page is cut in its middle") {
  Page page(false);
  page.row("label", "see " + std::string(10'000, 'a') + " there");
  const std::string text = page.take();
  CHECK(text.size() < 200);
  CHECK(text.find("aaa...aaa") != std::string::npos);
  CHECK(text.find("there\n") != std::string::npos);
}

TEST_CASE("a figure's remark goes on under itself") {
  Page page(false);
  page.figure("label", "12 %  ", std::string(50, 'a') + " " + std::string(20, 'b'));
  CHECK(page.take() ==
        "  label        12 %  " + std::string(50, 'a') + "\n" + std::string(21, ' ') + std::string(20, 'b') + "\n");
}

TEST_CASE("no line ends in a blank") {
  Page page(false);
  page.figure("label", "12 %  ", "");
  page.row("label", "");
  CHECK(page.take().find(" \n") == std::string::npos);
}

TEST_CASE("without colour no escape is written, with colour each is closed on its line") {
  Page plain(false);
  plain.line("text", Tone::bad);
  CHECK(plain.take() == "text\n");
  Page colourful(true);
  colourful.line("text", Tone::bad);
  colourful.line("text");
  CHECK(colourful.take() == "\x1b[31mtext\x1b[0m\ntext\n");
}
