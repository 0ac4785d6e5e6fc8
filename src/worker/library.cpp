#include "worker/library.hpp"

#include <cmath>
#include <cstdlib>
#include <cstring>
#include <ngspice/sharedspice.h>
#include <string_view>
#include <vector>

#include "worker/text_rules.hpp"

namespace worker {
namespace {

constexpr std::size_t most_text = 300;

// What the library has said since the phase began. It is one library a process, and its callbacks carry this object.
struct Listener {
  Phase phase = Phase::idle;
  bool starting = true;
  bool unexpected = false;
  bool stepped = false;
  bool step_open = false;  // a stepping that has not come to its end
  std::string text;        // the first unexpected line, or the last of a stepping
  std::string name = "ngspice";
  OnExit on_exit = nullptr;

  void begin(Phase next) {
    phase = next;
    unexpected = stepped = step_open = false;
    text.clear();
  }
};

Listener& listener() {
  static Listener only;
  return only;
}

// "** ngspice-39 shared library" -> "ngspice-39".
void look_for_name(Listener& heard, std::string_view line) {
  const std::size_t at = line.find("ngspice-");
  if (at == std::string_view::npos) return;
  const std::size_t end = line.find_first_of(" \t:", at);
  heard.name = line.substr(at, end == std::string_view::npos ? end : end - at);
}

int on_text(char* line, int, void* user) {
  Listener& heard = *static_cast<Listener*>(user);
  if (heard.starting) look_for_name(heard, line);
  const Meaning meaning = meaning_of(line, heard.phase);
  if (meaning == Meaning::harmless || heard.unexpected) return 0;
  heard.text = std::string(without_stream(line).substr(0, most_text));
  heard.unexpected = meaning == Meaning::unexpected;
  heard.stepped = true;
  heard.step_open = meaning != Meaning::completed;
  return 0;
}

int on_exit_wanted(int, NG_BOOL, NG_BOOL, int, void* user) {
  const Listener& heard = *static_cast<Listener*>(user);
  heard.on_exit(heard.text);
  std::abort();
}

bool command(const char* text) {
  std::vector<char> copy(text, text + std::strlen(text) + 1);
  return ngSpice_Command(copy.data()) == 0;
}

// Cuts a text of lines that end in \n in place, and points at each.
std::vector<char*> lines_of(std::string& text) {
  std::vector<char*> lines;
  char* line = text.data();
  for (char& byte : text) {
    if (byte != '\n') continue;
    byte = '\0';
    lines.push_back(line);
    line = &byte + 1;
  }
  return lines;
}

// The current plot is the constants' when an analysis left nothing.
bool has_operating_point() {
  const char* plot = ngSpice_CurPlot();
  return plot != nullptr && std::strncmp(plot, "op", 2) == 0;
}

// The library gives the same record at every call: its value is copied at once.
bool read_vector(char* name, double& value) {
  const vector_info* found = ngGet_Vec_Info(name);
  if (found == nullptr || found->v_realdata == nullptr || found->v_length != 1) return false;
  value = found->v_realdata[0];
  return std::isfinite(value);
}

simulate::Answer failed(simulate::Verdict verdict, std::string text = {}) {
  return {verdict, false, std::move(text), {}};
}

simulate::Answer solve_loaded(simulate::Request& request, std::vector<char*>& deck) {
  Listener& heard = listener();
  heard.begin(Phase::load);
  deck.push_back(nullptr);
  const bool loaded = ngSpice_Circ(deck.data()) == 0;
  if (!loaded || heard.stepped) return failed(simulate::Verdict::load_text, heard.text);

  heard.begin(Phase::analysis);
  const bool done = command("op");
  heard.phase = Phase::idle;
  if (!done || heard.unexpected || heard.step_open) return failed(simulate::Verdict::analysis_text, heard.text);
  if (!has_operating_point()) return failed(simulate::Verdict::wrong_plot);

  simulate::Answer answer{simulate::Verdict::solved, heard.stepped, heard.text, {}};
  std::vector<char*> names = lines_of(request.vectors);
  if (names.size() != request.vector_count) return failed(simulate::Verdict::bad_vector);
  answer.values.resize(names.size());
  for (std::size_t i = 0; i < names.size(); ++i) {
    if (!read_vector(names[i], answer.values[i])) return failed(simulate::Verdict::bad_vector);
  }
  return answer;
}

}  // namespace

bool start_library(OnExit on_exit) {
  Listener& heard = listener();
  heard.on_exit = on_exit;
  const int code = ngSpice_Init(on_text, nullptr, on_exit_wanted, nullptr, nullptr, nullptr, &heard);
  heard.starting = false;
  return code == 0;
}

std::string library_name() {
  return listener().name;
}

simulate::Answer solve(simulate::Request& request) {
  std::vector<char*> deck = lines_of(request.deck);
  simulate::Answer answer = solve_loaded(request, deck);
  listener().phase = Phase::idle;
  // The next deck must find no plot and no circuit of this one; the last call frees the commands' texts.
  command("destroy all");
  command("remcirc");
  ngSpice_Command(nullptr);
  return answer;
}

}  // namespace worker
