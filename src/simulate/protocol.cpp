#include "simulate/protocol.hpp"

#include <cstring>
#include <type_traits>

namespace simulate {
namespace {

constexpr std::uint32_t magic = 0x74735031;
constexpr std::size_t header_bytes = 8;

enum class Kind : std::uint8_t { hello = 1, request = 2, answer = 3 };

template <class T>
void put(std::string& out, T value) {
  static_assert(std::is_trivially_copyable_v<T>);
  char bytes[sizeof value];
  std::memcpy(bytes, &value, sizeof value);
  out.append(bytes, sizeof value);
}

void put_text(std::string& out, std::string_view text) {
  put(out, static_cast<std::uint32_t>(text.size()));
  out.append(text);
}

std::string begin(Kind kind, std::size_t payload_bytes) {
  std::string out;
  out.reserve(header_bytes + payload_bytes + 64);
  put(out, magic);
  put(out, std::uint32_t{0});
  put(out, kind);
  return out;
}

std::string finish(std::string out) {
  const std::size_t payload = out.size() - header_bytes;
  if (payload > most_frame_bytes) return {};
  const auto length = static_cast<std::uint32_t>(payload);
  std::memcpy(out.data() + sizeof magic, &length, sizeof length);
  return out;
}

// Takes fields off the front of a payload; after the first that is not there nothing comes any more.
class Fields {
 public:
  explicit Fields(std::string_view bytes) : left_(bytes) {}

  template <class T>
  T take() {
    T value{};
    const std::string_view bytes = cut(sizeof value);
    if (bytes.size() == sizeof value) std::memcpy(&value, bytes.data(), sizeof value);
    return value;
  }

  std::string take_text() { return std::string(cut(take<std::uint32_t>())); }

  std::vector<double> take_numbers() {
    const std::size_t count = take<std::uint32_t>();
    const std::string_view bytes = cut(count * sizeof(double));
    std::vector<double> numbers(bytes.size() / sizeof(double));
    if (!numbers.empty()) std::memcpy(numbers.data(), bytes.data(), bytes.size());
    return numbers;
  }

  [[nodiscard]] bool ended_well() const { return good_ && left_.empty(); }

 private:
  std::string_view cut(std::size_t bytes) {
    if (!good_ || bytes > left_.size()) {
      good_ = false;
      return {};
    }
    const std::string_view front = left_.substr(0, bytes);
    left_.remove_prefix(bytes);
    return front;
  }

  std::string_view left_;
  bool good_ = true;
};

}  // namespace

std::string frame(const Hello& hello) {
  std::string out = begin(Kind::hello, hello.library.size());
  put(out, hello.version);
  put_text(out, hello.library);
  return finish(std::move(out));
}

std::string frame(const Request& request) {
  if (request.deck.size() > most_frame_bytes || request.vectors.size() > most_frame_bytes) return {};
  std::string out = begin(Kind::request, request.deck.size() + request.vectors.size());
  put(out, request.analysis);
  put(out, request.vector_count);
  put_text(out, request.deck);
  put_text(out, request.vectors);
  return finish(std::move(out));
}

std::string frame(const Answer& answer) {
  if (answer.values.size() > most_frame_bytes / sizeof(double)) return {};
  std::string out = begin(Kind::answer, answer.text.size() + answer.values.size() * sizeof(double));
  put(out, answer.verdict);
  put(out, static_cast<std::uint8_t>(answer.stepped));
  put_text(out, answer.text);
  put(out, static_cast<std::uint32_t>(answer.values.size()));
  if (!answer.values.empty()) {
    const std::size_t at = out.size();
    out.resize(at + answer.values.size() * sizeof(double));
    std::memcpy(out.data() + at, answer.values.data(), answer.values.size() * sizeof(double));
  }
  return finish(std::move(out));
}

// The version is read whatever follows it: another version's hello may be longer.
std::optional<Hello> read_hello(std::string_view payload) {
  Fields fields(payload);
  if (fields.take<std::uint8_t>() != static_cast<std::uint8_t>(Kind::hello)) return {};
  if (payload.size() < 1 + sizeof(std::uint32_t)) return {};
  Hello hello;
  hello.version = fields.take<std::uint32_t>();
  if (hello.version != protocol_version) return hello;
  hello.library = fields.take_text();
  return fields.ended_well() ? std::optional(std::move(hello)) : std::nullopt;
}

std::optional<Request> read_request(std::string_view payload) {
  Fields fields(payload);
  if (fields.take<std::uint8_t>() != static_cast<std::uint8_t>(Kind::request)) return {};
  const auto analysis = fields.take<std::uint8_t>();
  if (analysis > static_cast<std::uint8_t>(Analysis::operating_point)) return {};
  Request request;
  request.vector_count = fields.take<std::uint32_t>();
  request.deck = fields.take_text();
  request.vectors = fields.take_text();
  return fields.ended_well() ? std::optional(std::move(request)) : std::nullopt;
}

std::optional<Answer> read_answer(std::string_view payload) {
  Fields fields(payload);
  if (fields.take<std::uint8_t>() != static_cast<std::uint8_t>(Kind::answer)) return {};
  const auto verdict = fields.take<std::uint8_t>();
  const auto stepped = fields.take<std::uint8_t>();
  if (verdict > static_cast<std::uint8_t>(Verdict::controlled_exit) || stepped > 1) return {};
  Answer answer{static_cast<Verdict>(verdict), stepped == 1, {}, {}};
  answer.text = fields.take_text();
  answer.values = fields.take_numbers();
  return fields.ended_well() ? std::optional(std::move(answer)) : std::nullopt;
}

std::optional<std::string> FrameReader::next() {
  if (broken_ || bytes_.size() < header_bytes) return {};
  std::uint32_t word = 0;
  std::uint32_t length = 0;
  std::memcpy(&word, bytes_.data(), sizeof word);
  std::memcpy(&length, bytes_.data() + sizeof word, sizeof length);
  broken_ = word != magic || length > most_frame_bytes;
  if (broken_ || bytes_.size() - header_bytes < length) return {};
  std::string payload = bytes_.substr(header_bytes, length);
  bytes_.erase(0, header_bytes + length);
  return payload;
}

}  // namespace simulate
