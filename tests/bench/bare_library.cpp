#include "bench/bare_library.hpp"

#include <cstdio>
#include <cstdlib>
#include <ngspice/sharedspice.h>
#include <string_view>
#include <utility>

namespace bench {
namespace {

int ignore_text(char*, int, void*) {
  return 0;
}

int stop(int, NG_BOOL, NG_BOOL, int, void*) {
  std::fputs("the bare library asked for its end\n", stderr);
  std::abort();
}

std::vector<char*> lines_of(std::string& text) {
  std::vector<char*> lines;
  char* line = text.data();
  for (char& byte : text) {
    if (byte != '\n') continue;
    byte = '\0';
    lines.push_back(std::exchange(line, &byte + 1));
  }
  return lines;
}

void command(std::string_view text) {
  std::string copy(text);
  ngSpice_Command(copy.data());
}

}  // namespace

BareDeck::BareDeck(std::string deck, std::string vectors) : deck_(std::move(deck)), vectors_(std::move(vectors)) {
  lines_ = lines_of(deck_);
  lines_.push_back(nullptr);
  names_ = lines_of(vectors_);
}

void BareDeck::solve(std::vector<double>& values) {
  ngSpice_Circ(lines_.data());
  command("op");
  values.resize(names_.size());
  for (std::size_t i = 0; i < names_.size(); ++i) {
    const vector_info* found = ngGet_Vec_Info(names_[i]);
    if (found == nullptr || found->v_length != 1) stop(0, false, false, 0, nullptr);
    values[i] = found->v_realdata[0];
  }
  command("destroy all");
  command("remcirc");
  ngSpice_Command(nullptr);
}

void start_bare_library() {
  ngSpice_Init(ignore_text, nullptr, stop, nullptr, nullptr, nullptr, nullptr);
}

}  // namespace bench
