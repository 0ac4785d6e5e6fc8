// The line to one simulator process: it greets, takes a deck, answers, or is lost.
#pragma once

#include <chrono>
#include <filesystem>
#include <string>

#include "base/result.hpp"
#include "simulate/process.hpp"
#include "simulate/protocol.hpp"

namespace simulate {

class WorkerLine {
 public:
  enum class Event : std::uint8_t {
    nothing,
    ready,   // it greeted in our version
    answer,  // last_answer() is new
    lost,    // it ended, or what it says is not the protocol; why_lost() says so. The line is of no more use
  };

  // Error: the process cannot be started.
  [[nodiscard]] static base::Result<WorkerLine> start(const std::filesystem::path& worker, unsigned cpu_seconds);

  [[nodiscard]] bool ready() const { return ready_; }
  [[nodiscard]] const std::string& library() const { return library_; }
  [[nodiscard]] std::chrono::steady_clock::time_point started_at() const { return started_at_; }

  // Sends as much as fits; the rest goes with pump(). False: the request is too large for the protocol, nothing was
  // sent.
  [[nodiscard]] bool send(const Request& request);

  // What to poll for.
  [[nodiscard]] int socket() const { return process_.socket(); }
  [[nodiscard]] bool wants_to_write() const { return sent_ < out_.size(); }

  // Writes and reads what can be without waiting.
  [[nodiscard]] Event pump();
  [[nodiscard]] const Answer& last_answer() const { return answer_; }
  [[nodiscard]] const std::string& why_lost() const { return why_lost_; }
  // Whether a fresh process would be lost in the same way.
  [[nodiscard]] bool lost_for_good() const { return lost_for_good_; }

 private:
  explicit WorkerLine(Process process);

  void write_some();
  void read_some();
  [[nodiscard]] Event greeted(const std::string& payload);
  [[nodiscard]] Event answered(const std::string& payload);
  [[nodiscard]] Event lost(std::string why);

  Process process_;
  FrameReader reader_;
  std::string out_;
  std::size_t sent_ = 0;
  bool ready_ = false;
  bool waiting_ = false;  // for an answer
  bool ended_ = false;    // the other end is closed
  bool lost_for_good_ = false;
  std::string library_;
  std::string why_lost_;
  Answer answer_;
  std::chrono::steady_clock::time_point started_at_;
};

}  // namespace simulate
