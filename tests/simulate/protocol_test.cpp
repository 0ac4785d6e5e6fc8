#include "simulate/protocol.hpp"

#include <random>

#include <catch2/catch.hpp>

using namespace simulate;

namespace {

std::string payload_of(const std::string& frame) {
  FrameReader reader;
  reader.feed(frame);
  auto payload = reader.next();
  REQUIRE(payload.has_value());
  CHECK_FALSE(reader.next().has_value());
  return *payload;
}

const Request request{Analysis::operating_point, 2, "t\nr1 n1 0 1\n.end\n", "n1\nn2\n"};
const Answer answer{Verdict::analysis_text, true, "text \x01 with anything", {1.5, -0.25, 1e300}};

}  // namespace

TEST_CASE("a request comes out of its frame as it went in") {
  const auto read = read_request(payload_of(frame(request)));
  REQUIRE(read.has_value());
  CHECK(read->deck == request.deck);
  CHECK(read->vectors == request.vectors);
  CHECK(read->vector_count == 2);
}

TEST_CASE("an answer comes out of its frame as it went in") {
  const auto read = read_answer(payload_of(frame(answer)));
  REQUIRE(read.has_value());
  CHECK(read->verdict == Verdict::analysis_text);
  CHECK(read->stepped);
  CHECK(read->text == answer.text);
  CHECK(read->values == answer.values);
}

TEST_CASE("a hello of another version is read whatever follows its number") {
  std::string payload = payload_of(frame(Hello{protocol_version + 1, "x"}));
  payload.resize(5);
  const auto read = read_hello(payload);
  REQUIRE(read.has_value());
  CHECK(read->version == protocol_version + 1);
}

TEST_CASE("a payload of one kind is no payload of another") {
  CHECK_FALSE(read_hello(payload_of(frame(request))).has_value());
  CHECK_FALSE(read_request(payload_of(frame(answer))).has_value());
  CHECK_FALSE(read_answer(payload_of(frame(Hello{}))).has_value());
}

TEST_CASE("every cut and every addition makes a payload unreadable") {
  const std::string whole = payload_of(frame(answer));
  for (std::size_t length = 0; length < whole.size(); ++length)
    CHECK_FALSE(read_answer(whole.substr(0, length)).has_value());
  CHECK_FALSE(read_answer(whole + "x").has_value());
  const std::string question = payload_of(frame(request));
  for (std::size_t length = 0; length < question.size(); ++length)
    CHECK_FALSE(read_request(question.substr(0, length)).has_value());
}

TEST_CASE("a frame that comes byte by byte is whole only with its last byte") {
  const std::string whole = frame(answer);
  FrameReader reader;
  for (std::size_t i = 0; i + 1 < whole.size(); ++i) {
    reader.feed({&whole[i], 1});
    REQUIRE_FALSE(reader.next().has_value());
  }
  reader.feed({&whole.back(), 1});
  CHECK(reader.next().has_value());
  CHECK_FALSE(reader.broken());
}

TEST_CASE("two frames in one piece come out one after the other") {
  FrameReader reader;
  reader.feed(frame(Hello{}) + frame(answer));
  REQUIRE(reader.next().has_value());
  const auto second = reader.next();
  REQUIRE(second.has_value());
  CHECK(read_answer(*second).has_value());
}

TEST_CASE("a wrong magic word and a length beyond the limit break the stream for ever") {
  FrameReader garbage;
  garbage.feed("this is no frame at all");
  CHECK_FALSE(garbage.next().has_value());
  CHECK(garbage.broken());

  std::string oversized = frame(Hello{});
  oversized[7] = '\x7f';
  FrameReader large;
  large.feed(oversized);
  CHECK_FALSE(large.next().has_value());
  CHECK(large.broken());
  large.feed(frame(Hello{}));
  CHECK_FALSE(large.next().has_value());
}

TEST_CASE("a deck beyond the limit makes no frame") {
  Request large = request;
  large.deck.assign(most_frame_bytes, 'x');
  CHECK(frame(large).empty());
}

TEST_CASE("no sequence of bytes crashes a reader, and what is read is within its bounds") {
  std::mt19937 random(7);
  const std::string seeds[] = {frame(answer), frame(request), frame(Hello{protocol_version, "ngspice-39"})};
  for (int round = 0; round < 20000; ++round) {
    std::string bytes = seeds[round % 3];
    for (int change = 0; change < 3; ++change) bytes[random() % bytes.size()] = static_cast<char>(random() & 0xff);
    FrameReader reader;
    reader.feed(bytes);
    const auto payload = reader.next();
    if (!payload) continue;
    const auto read = read_answer(*payload);
    if (read) CHECK(read->values.size() * sizeof(double) <= payload->size());
    (void)read_hello(*payload);
    (void)read_request(*payload);
  }
}
