#include "simulate/session.hpp"

#include <utility>

#include "simulate/pool.hpp"

namespace simulate {

base::Result<Session> Session::open(const SessionOptions& options) {
  auto pool = std::make_unique<Pool>(options);
  if (auto started = pool->start(); !started) return base::Error{started.error()};
  return Session(std::move(pool));
}

Session Session::without_worker(std::string reason) {
  auto pool = std::make_unique<Pool>(SessionOptions{});
  pool->give_up(std::move(reason));
  return Session(std::move(pool));
}

Session::Session(std::unique_ptr<Pool> pool) : pool_(std::move(pool)) {}
Session::Session(Session&&) noexcept = default;
Session& Session::operator=(Session&&) noexcept = default;
Session::~Session() = default;

void Session::solve(std::span<const model::Plan> plans, const model::Circuit& circuit, const base::NameTable& names,
                    const std::function<void(std::size_t, model::Outcome)>& done) {
  pool_->solve(plans, circuit, names, done);
}

const std::string& Session::simulator() const {
  return pool_->simulator();
}

}  // namespace simulate
