#include "simulate/process.hpp"

#include <array>
#include <cerrno>
#include <cstring>
#include <fcntl.h>
#include <fmt/format.h>
#include <signal.h>
#include <spawn.h>
#include <sys/socket.h>
#include <sys/stat.h>
#include <sys/wait.h>
#include <system_error>
#include <time.h>
#include <unistd.h>
#include <utility>
#include <vector>

namespace simulate {
namespace {

constexpr int worker_socket = 3;  // its number in the worker

base::Error trouble(std::string_view what, int error) {
  return {fmt::format("{}: {}", what, std::strerror(error))};
}

}  // namespace

base::Result<PrivateFolder> PrivateFolder::make() {
  std::error_code error;
  const std::filesystem::path parent = std::filesystem::absolute(std::filesystem::temp_directory_path(error), error);
  if (error) return base::Error{"there is no folder for temporary files: " + error.message()};
  std::string name = (parent / "tapspan-XXXXXX").string();
  if (::mkdtemp(name.data()) == nullptr)
    return trouble("cannot make a folder for the simulator in " + parent.string(), errno);
  PrivateFolder folder;
  folder.path_ = name;
  const Descriptor start_file(::open((name + "/.spiceinit").c_str(), O_CREAT | O_EXCL | O_WRONLY | O_CLOEXEC, 0600));
  if (start_file.number() < 0 || ::mkdir((name + "/scripts").c_str(), 0700) != 0) {
    return trouble("cannot furnish the simulator's folder " + name, errno);
  }
  return folder;
}

PrivateFolder::PrivateFolder(PrivateFolder&& other) noexcept : path_(std::exchange(other.path_, {})) {}

PrivateFolder& PrivateFolder::operator=(PrivateFolder&& other) noexcept {
  if (this != &other) {
    remove();
    path_ = std::exchange(other.path_, {});
  }
  return *this;
}

void PrivateFolder::remove() noexcept {
  if (path_.empty()) return;
  std::error_code ignored;
  std::filesystem::remove_all(path_, ignored);
  path_.clear();
}

Descriptor& Descriptor::operator=(Descriptor&& other) noexcept {
  if (this != &other) {
    close();
    number_ = std::exchange(other.number_, -1);
  }
  return *this;
}

void Descriptor::close() noexcept {
  if (number_ >= 0) ::close(std::exchange(number_, -1));
}

namespace {

// What posix_spawn is to do in the child, freed at the end.
class SpawnPlan {
 public:
  SpawnPlan() {
    ::posix_spawn_file_actions_init(&actions_);
    ::posix_spawnattr_init(&attributes_);
  }
  SpawnPlan(const SpawnPlan&) = delete;
  SpawnPlan& operator=(const SpawnPlan&) = delete;
  ~SpawnPlan() {
    ::posix_spawn_file_actions_destroy(&actions_);
    ::posix_spawnattr_destroy(&attributes_);
  }

  // The socket as its only descriptor beside three to nowhere; its own group, so that a terminal's interrupt passes it
  // by; signals as if nobody had touched them.
  int furnish(int socket, const std::string& folder) {
    sigset_t set;
    sigemptyset(&set);
    int error = ::posix_spawnattr_setsigmask(&attributes_, &set);
    for (const int number : {SIGPIPE, SIGINT, SIGTERM, SIGHUP, SIGQUIT, SIGCHLD}) sigaddset(&set, number);
    const auto also = [&error](int result) { error = error != 0 ? error : result; };
    also(::posix_spawnattr_setsigdefault(&attributes_, &set));
    also(::posix_spawnattr_setpgroup(&attributes_, 0));
    also(::posix_spawnattr_setflags(&attributes_,
                                    POSIX_SPAWN_SETSIGMASK | POSIX_SPAWN_SETSIGDEF | POSIX_SPAWN_SETPGROUP));
    also(::posix_spawn_file_actions_adddup2(&actions_, socket, worker_socket));
    also(::posix_spawn_file_actions_addopen(&actions_, 0, "/dev/null", O_RDWR, 0));
    also(::posix_spawn_file_actions_adddup2(&actions_, 0, 1));
    also(::posix_spawn_file_actions_adddup2(&actions_, 0, 2));
    also(::posix_spawn_file_actions_addchdir_np(&actions_, folder.c_str()));
    return error;
  }

  int spawn(pid_t& pid, std::vector<std::string>& arguments, std::vector<std::string>& environment) const {
    std::vector<char*> argv = pointers(arguments);
    std::vector<char*> envp = pointers(environment);
    return ::posix_spawn(&pid, argv[0], &actions_, &attributes_, argv.data(), envp.data());
  }

 private:
  static std::vector<char*> pointers(std::vector<std::string>& texts) {
    std::vector<char*> out;
    for (std::string& text : texts) out.push_back(text.data());
    out.push_back(nullptr);
    return out;
  }

  posix_spawn_file_actions_t actions_;
  posix_spawnattr_t attributes_;
};

}  // namespace

base::Result<Process> Process::start(const std::filesystem::path& worker, unsigned cpu_seconds) {
  std::error_code path_error;
  const std::string program = std::filesystem::absolute(worker, path_error).string();
  const std::string what = "cannot start the simulator " + program;
  std::array<int, 2> ends{};
  if (::socketpair(AF_UNIX, SOCK_STREAM | SOCK_CLOEXEC, 0, ends.data()) != 0) return trouble(what, errno);
  Process process;
  process.socket_ = Descriptor(ends[0]);
  const Descriptor theirs(ends[1]);
  auto folder = PrivateFolder::make();
  if (!folder) return base::Error{folder.error()};
  process.folder_ = std::move(folder).value();

  SpawnPlan plan;
  if (const int error = plan.furnish(theirs.number(), process.folder_.path().string()); error != 0)
    return trouble(what, error);
  std::vector<std::string> arguments{program, std::to_string(worker_socket), std::to_string(::getpid()),
                                     std::to_string(cpu_seconds)};
  std::vector<std::string> environment{"SPICE_SCRIPTS=" + process.folder_.path().string() + "/scripts", "TZ=UTC0",
                                       "LC_ALL=C"};
  pid_t pid = -1;
  if (const int error = plan.spawn(pid, arguments, environment); error != 0) return trouble(what, error);
  process.pid_ = pid;
  if (::fcntl(process.socket(), F_SETFL, O_NONBLOCK) != 0) return trouble(what, errno);
  return process;
}

Process::Process(Process&& other) noexcept
    : pid_(std::exchange(other.pid_, -1)), socket_(std::move(other.socket_)), folder_(std::move(other.folder_)) {}

Process& Process::operator=(Process&& other) noexcept {
  if (this != &other) {
    kill();
    pid_ = std::exchange(other.pid_, -1);
    socket_ = std::move(other.socket_);
    folder_ = std::move(other.folder_);
  }
  return *this;
}

void Process::kill() noexcept {
  if (pid_ <= 0) return;
  ::kill(-pid_, SIGKILL);  // its group, should it have children
  ::kill(pid_, SIGKILL);
  while (::waitpid(pid_, nullptr, 0) < 0 && errno == EINTR) {
  }
  pid_ = -1;
}

std::string Process::ending() {
  int status = 0;
  for (int i = 0; i < 250 && pid_ > 0; ++i) {
    const pid_t reaped = ::waitpid(pid_, &status, WNOHANG);
    if (reaped == pid_) {
      pid_ = -1;
      if (WIFSIGNALED(status)) return fmt::format("by signal {}", WTERMSIG(status));
      return fmt::format("with status {}", WEXITSTATUS(status));
    }
    const timespec millisecond{0, 1000000};
    ::nanosleep(&millisecond, nullptr);
  }
  kill();
  return "by closing its socket";
}

}  // namespace simulate
