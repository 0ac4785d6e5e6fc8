// A worker that misbehaves. The name of the program says how: "crash" and so on at every deck that holds the value 666,
// and at each start for those that never get ready. All other decks are answered with ones.
#include <array>
#include <filesystem>
#include <fstream>
#include <signal.h>
#include <string>
#include <unistd.h>

#include "simulate/protocol.hpp"

namespace {

constexpr int line = 3;

void send(const std::string& bytes) {
  if (::write(line, bytes.data(), bytes.size()) != static_cast<ssize_t>(bytes.size())) ::_exit(1);
}

[[noreturn]] void sleep_for_ever() {
  while (true) ::pause();
}

std::string next_payload(simulate::FrameReader& reader) {
  std::array<char, 65536> buffer;
  while (true) {
    if (auto payload = reader.next()) return *payload;
    const ssize_t count = ::read(line, buffer.data(), buffer.size());
    if (count <= 0) ::_exit(0);
    reader.feed({buffer.data(), static_cast<std::size_t>(count)});
  }
}

std::string good_answer(const simulate::Request& request) {
  simulate::Answer answer;
  answer.values.assign(request.vector_count, 1.0);
  return simulate::frame(answer);
}

void greet(const std::string& how) {
  if (how == "exits") ::_exit(7);
  if (how == "silent") sleep_for_ever();
  if (how == "garbage-hello") return send("HTTP/1.1 200 OK\r\n\r\n");
  simulate::Hello hello;
  if (how == "version") hello.version = simulate::protocol_version + 1;
  hello.library = "ngspice-0 \x1b[31m";
  send(simulate::frame(hello));
}

void misbehave(const std::string& how, const simulate::Request& request, const std::filesystem::path& seen) {
  if (how == "crash") ::raise(SIGKILL);
  if (how == "exit") ::_exit(9);
  if (how == "hang") sleep_for_ever();
  if (how == "garbage") return send(std::string(100, 'x'));
  if (how == "closes") {
    ::close(line);
    sleep_for_ever();
  }
  const std::string answer = good_answer(request);
  if (how == "truncated") {
    send(answer.substr(0, answer.size() / 2));
    ::_exit(0);
  }
  if (how == "few") return send(simulate::frame(simulate::Answer{}));
  if (how == "twice") return send(answer + answer);
  if (how == "crash-once" && !std::filesystem::exists(seen)) {
    std::ofstream(seen).put('x');
    ::raise(SIGKILL);
  }
  send(answer);
}

}  // namespace

int main(int, char** arguments) {
  const std::filesystem::path program = arguments[0];
  const std::string how = program.filename().string();
  greet(how);
  simulate::FrameReader reader;
  while (true) {
    const auto request = simulate::read_request(next_payload(reader));
    if (!request) return 1;
    if (request->deck.find(" 666\n") == std::string::npos) {
      send(good_answer(*request));
    } else {
      misbehave(how, *request, program.string() + ".seen");
    }
  }
}
