// What the session and the simulator process say to each other over one socket: frames of a magic word, a length and a
// payload, in the machine's own byte order (both ends run on one machine). Pure; compiled into both programs.
//
// The process speaks first: a Hello. Then it answers each Request with one Answer.
#pragma once

#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace simulate {

inline constexpr std::uint32_t protocol_version = 1;
inline constexpr std::size_t most_frame_bytes = std::size_t{64} << 20;

struct Hello {
  std::uint32_t version = protocol_version;
  std::string library;  // "ngspice-39", as the library says of itself
};

enum class Analysis : std::uint8_t { operating_point };

struct Request {
  Analysis analysis = Analysis::operating_point;
  std::uint32_t vector_count = 0;
  std::string deck;     // lines, each ended by \n: a title first, .end last
  std::string vectors;  // `vector_count` names, each ended by \n
};

// How a deck went. Everything but `solved` is a failure, whatever the library's return codes say.
enum class Verdict : std::uint8_t {
  solved,
  load_text,        // the library said something unexpected while it read the deck
  analysis_text,    // likewise while it solved
  wrong_plot,       // the analysis left no new plot
  bad_vector,       // a wanted vector is missing, of the wrong length or not finite
  controlled_exit,  // the library asked for its own end; the process is gone after this answer
};

struct Answer {
  Verdict verdict = Verdict::solved;
  bool stepped = false;        // gmin or source stepping was needed, and was completed
  std::string text;            // the first unexpected line, shortened
  std::vector<double> values;  // one a wanted vector; empty unless solved
};

// Whole frames, ready to be written. A payload above most_frame_bytes gives an empty string.
[[nodiscard]] std::string frame(const Hello& hello);
[[nodiscard]] std::string frame(const Request& request);
[[nodiscard]] std::string frame(const Answer& answer);

// A payload's meaning; nothing where the payload is of another kind, too short, too long or has values out of range.
[[nodiscard]] std::optional<Hello> read_hello(std::string_view payload);
[[nodiscard]] std::optional<Request> read_request(std::string_view payload);
[[nodiscard]] std::optional<Answer> read_answer(std::string_view payload);

// Cuts a stream of bytes into payloads.
class FrameReader {
 public:
  void feed(std::string_view bytes) { bytes_.append(bytes); }

  // The next whole payload, if there is one. After a wrong magic word or a length above most_frame_bytes the stream is
  // broken() for ever and nothing more comes.
  [[nodiscard]] std::optional<std::string> next();
  [[nodiscard]] bool broken() const { return broken_; }

 private:
  std::string bytes_;
  bool broken_ = false;
};

}  // namespace simulate
