#include "simulate/worker_line.hpp"

#include <array>
#include <cerrno>
#include <fmt/format.h>
#include <sys/socket.h>
#include <utility>

#include "base/text.hpp"

namespace simulate {

base::Result<WorkerLine> WorkerLine::start(const std::filesystem::path& worker, unsigned cpu_seconds) {
  auto process = Process::start(worker, cpu_seconds);
  if (!process) return base::Error{process.error()};
  return WorkerLine(std::move(process).value());
}

WorkerLine::WorkerLine(Process process) : process_(std::move(process)), started_at_(std::chrono::steady_clock::now()) {}

bool WorkerLine::send(const Request& request) {
  out_ = frame(request);
  sent_ = 0;
  if (out_.empty()) return false;
  waiting_ = true;
  write_some();
  return true;
}

// MSG_NOSIGNAL: a process that is gone is found out by reading, and no signal disposition is touched.
void WorkerLine::write_some() {
  while (wants_to_write()) {
    const ssize_t count = ::send(socket(), out_.data() + sent_, out_.size() - sent_, MSG_NOSIGNAL | MSG_DONTWAIT);
    if (count > 0) {
      sent_ += static_cast<std::size_t>(count);
    } else if (errno != EINTR) {
      if (errno != EAGAIN && errno != EWOULDBLOCK) sent_ = out_.size();
      return;
    }
  }
}

void WorkerLine::read_some() {
  std::array<char, 65536> buffer;
  while (!ended_ && !reader_.broken()) {
    const ssize_t count = ::recv(socket(), buffer.data(), buffer.size(), MSG_DONTWAIT);
    if (count > 0) {
      reader_.feed({buffer.data(), static_cast<std::size_t>(count)});
      if (static_cast<std::size_t>(count) < buffer.size()) return;
    } else if (count == 0) {
      ended_ = true;
    } else if (errno != EINTR) {
      ended_ = errno != EAGAIN && errno != EWOULDBLOCK;
      return;
    }
  }
}

WorkerLine::Event WorkerLine::pump() {
  write_some();
  read_some();
  if (const auto payload = reader_.next()) return ready_ ? answered(*payload) : greeted(*payload);
  if (reader_.broken()) return lost("the simulator process answered nonsense");
  if (!ended_) return Event::nothing;
  return lost(fmt::format("the simulator process ended {}{}", process_.ending(), ready_ ? "" : " before it was ready"));
}

WorkerLine::Event WorkerLine::greeted(const std::string& payload) {
  auto hello = read_hello(payload);
  if (!hello) return lost("the simulator process answered nonsense");
  if (hello->version != protocol_version) {
    lost_for_good_ = true;
    return lost(fmt::format("the simulator process speaks version {} of the protocol, this program version {}",
                            hello->version, protocol_version));
  }
  process_.remove_folder();
  library_ = base::printable_short(hello->library, 60);
  ready_ = true;
  return Event::ready;
}

WorkerLine::Event WorkerLine::answered(const std::string& payload) {
  auto answer = read_answer(payload);
  if (!answer || !waiting_) return lost("the simulator process answered nonsense");
  waiting_ = false;
  answer_ = std::move(*answer);
  return Event::answer;
}

WorkerLine::Event WorkerLine::lost(std::string why) {
  why_lost_ = std::move(why);
  return Event::lost;
}

}  // namespace simulate
