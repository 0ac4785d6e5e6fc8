// Result<T>: a value, or the sentence that says why there is none.
#pragma once

#include <string>
#include <type_traits>
#include <utility>
#include <variant>

namespace base {

// A failure of the outside world or of a user's input, in one clear sentence without a full stop.
struct Error {
  std::string message;
};

// Holds either a T or an Error. Ask ok() before value(); asking wrongly is a bug and throws std::bad_variant_access.
template <class T>
class [[nodiscard]] Result {
 public:
  Result(T value) : state_(std::in_place_index<0>, std::move(value)) {}      // NOLINT: converts on purpose
  Result(Error error) : state_(std::in_place_index<1>, std::move(error)) {}  // NOLINT: converts on purpose

  [[nodiscard]] bool ok() const { return state_.index() == 0; }
  explicit operator bool() const { return ok(); }

  [[nodiscard]] const T& value() const& { return std::get<0>(state_); }
  [[nodiscard]] T& value() & { return std::get<0>(state_); }
  [[nodiscard]] T&& value() && { return std::get<0>(std::move(state_)); }
  const T& operator*() const& { return value(); }
  T& operator*() & { return value(); }
  const T* operator->() const { return &value(); }

  [[nodiscard]] const std::string& error() const { return std::get<1>(state_).message; }

 private:
  std::variant<T, Error> state_;
};

// Success without a value.
struct Done {};

}  // namespace base
