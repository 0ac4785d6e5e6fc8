// tapspan-worker SOCKET PARENT CPU_SECONDS: solves decks that come through one socket, until it closes. Started by a
// session, never by hand: src/simulate/process.cpp says what it finds around it.
#include <array>
#include <cerrno>
#include <clocale>
#include <cstdlib>
#include <exception>
#include <unistd.h>

#include "simulate/protocol.hpp"
#include "worker/confinement.hpp"
#include "worker/library.hpp"

namespace {

constexpr int line = 3;  // the socket; the parent says the same

enum Ending : int { done = 0, bad_start = 2, nonsense = 3, broken_line = 4, gave_up = 42 };

// Nothing is flushed and nothing torn down: the library is in no state for it.
[[noreturn]] void end(Ending how) {
  ::_exit(how);
}

void send(const std::string& bytes) {
  std::size_t sent = 0;
  while (sent < bytes.size()) {
    const ssize_t count = ::write(line, bytes.data() + sent, bytes.size() - sent);
    if (count < 0 && errno == EINTR) continue;
    if (count <= 0) end(broken_line);
    sent += static_cast<std::size_t>(count);
  }
}

void library_gives_up(const std::string& text) {
  send(simulate::frame(simulate::Answer{simulate::Verdict::controlled_exit, false, text, {}}));
  end(gave_up);
}

std::string next_payload(simulate::FrameReader& reader) {
  std::array<char, 65536> buffer;
  while (true) {
    if (auto payload = reader.next()) return std::move(*payload);
    if (reader.broken()) end(nonsense);
    const ssize_t count = ::read(line, buffer.data(), buffer.size());
    if (count < 0 && errno == EINTR) continue;
    if (count == 0) end(done);
    if (count < 0) end(broken_line);
    reader.feed({buffer.data(), static_cast<std::size_t>(count)});
  }
}

// The library opens its last files at its first deck.
bool warm_up() {
  simulate::Request request;
  request.vector_count = 1;
  request.deck = "t\nv1 n1 0 1\nr1 n1 n2 1\nr2 n2 0 1\n.end\n";
  request.vectors = "n2\n";
  const simulate::Answer answer = worker::solve(request);
  return answer.verdict == simulate::Verdict::solved && answer.values[0] == 0.5;
}

void start(long parent, unsigned long cpu_seconds) {
  std::setlocale(LC_NUMERIC, "C");
  if (!worker::die_with_parent(parent) || !worker::limit_resources(cpu_seconds)) end(bad_start);
  if (!worker::start_library(library_gives_up) || !warm_up() || !worker::close_doors()) end(bad_start);
  send(simulate::frame(simulate::Hello{simulate::protocol_version, worker::library_name()}));
}

void serve() {
  simulate::FrameReader reader;
  while (true) {
    auto request = simulate::read_request(next_payload(reader));
    if (!request) end(nonsense);
    send(simulate::frame(worker::solve(*request)));
  }
}

}  // namespace

int main(int count, char** arguments) {
  if (count != 4 || std::atoi(arguments[1]) != line) end(bad_start);
  try {
    start(std::atol(arguments[2]), std::strtoul(arguments[3], nullptr, 10));
    serve();
  } catch (const std::exception&) {
    std::abort();
  }
}
