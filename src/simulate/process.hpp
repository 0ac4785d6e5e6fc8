// One simulator process: its private folder, its socket, its end.
#pragma once

#include <filesystem>
#include <string>
#include <sys/types.h>

#include "base/result.hpp"

namespace simulate {

// A folder of our own below the system's temporary folder; removed with all that is in it.
class PrivateFolder {
 public:
  // Holds an empty start-up file and an empty folder for scripts, so that the library reads nobody else's.
  [[nodiscard]] static base::Result<PrivateFolder> make();

  PrivateFolder() = default;
  PrivateFolder(PrivateFolder&& other) noexcept;
  PrivateFolder& operator=(PrivateFolder&& other) noexcept;
  ~PrivateFolder() { remove(); }

  [[nodiscard]] const std::filesystem::path& path() const { return path_; }
  void remove() noexcept;

 private:
  std::filesystem::path path_;
};

// A file descriptor that is closed at the end.
class Descriptor {
 public:
  explicit Descriptor(int number = -1) : number_(number) {}
  Descriptor(Descriptor&& other) noexcept : number_(other.number_) { other.number_ = -1; }
  Descriptor& operator=(Descriptor&& other) noexcept;
  ~Descriptor() { close(); }

  [[nodiscard]] int number() const { return number_; }
  void close() noexcept;

 private:
  int number_;
};

class Process {
 public:
  // Starts `worker` with nothing but one socket, in a folder and a process group of its own. The process dies with the
  // thread that starts it. `cpu_seconds`: the processor time after which the system ends it. Error: it cannot be
  // started.
  [[nodiscard]] static base::Result<Process> start(const std::filesystem::path& worker, unsigned cpu_seconds);

  Process(Process&& other) noexcept;
  Process& operator=(Process&& other) noexcept;
  ~Process() { kill(); }

  // Our end of the socket, non-blocking.
  [[nodiscard]] int socket() const { return socket_.number(); }

  // The process has read what it needs of its folder.
  void remove_folder() noexcept { folder_.remove(); }

  // Ends it now, if it has not ended, and reaps it.
  void kill() noexcept;

  // After its end of the socket was closed: waits for its end, for a quarter of a second at most, reaps it and says how
  // it ended: "by signal 11", "with status 3".
  [[nodiscard]] std::string ending();

 private:
  Process() = default;

  pid_t pid_ = -1;
  Descriptor socket_;
  PrivateFolder folder_;
};

}  // namespace simulate
