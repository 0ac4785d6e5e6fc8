#include "worker/confinement.hpp"

#include <signal.h>
#include <sys/prctl.h>
#include <sys/resource.h>
#include <unistd.h>

namespace worker {
namespace {

constexpr rlim_t most_memory_bytes = rlim_t{1} << 30;  // a deck of 100,000 resistors takes 160 MB

template <class Resource>
bool limit(Resource resource, rlim_t most) {
  rlimit current{};
  if (::getrlimit(resource, &current) != 0) return false;
  if (current.rlim_max != RLIM_INFINITY && current.rlim_max < most) most = current.rlim_max;
  const rlimit wanted{most, most};
  return ::setrlimit(resource, &wanted) == 0;
}

}  // namespace

// The parent may have ended between the start of this process and the first line here: then its id is another's.
bool die_with_parent(long parent) {
  return ::prctl(PR_SET_PDEATHSIG, SIGKILL) == 0 && ::getppid() == parent;
}

bool limit_resources(unsigned long cpu_seconds) {
  return limit(RLIMIT_AS, most_memory_bytes) && limit(RLIMIT_CPU, cpu_seconds) && limit(RLIMIT_CORE, 0) &&
         limit(RLIMIT_FSIZE, 0);
}

bool close_doors() {
  return limit(RLIMIT_NOFILE, 0);
}

}  // namespace worker
