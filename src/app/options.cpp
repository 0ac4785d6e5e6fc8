#include "app/options.hpp"

#include <algorithm>
#include <fmt/format.h>
#include <memory>
#include <optional>
#include <string_view>

#include <CLI/CLI.hpp>

#include "app/values.hpp"
#include "base/names.hpp"
#include "base/text.hpp"

namespace app {
namespace {

using Texts = std::vector<std::string>;

constexpr const char* audit_statuses =
    "Exit status: 0 all audited and nothing at or above the gate; 1 a finding at or\n"
    "above the gate; 2 the job could not be done, in whole or in part (bad usage,\n"
    "unreadable input, an input without a result, no input at all). 2 wins over 1.";
constexpr const char* trace_statuses = "Exit status: 0 all could be read; 2 not, in whole or in part.";

// The group of options that are known and refused: help and hints leave it out.
constexpr const char* not_built = "not built";

// Help with the option's value beside its name and nothing else.
class HelpText : public CLI::Formatter {
 public:
  HelpText() { column_width(22); }
  std::string make_option_opts(const CLI::Option* option) const override {
    return option->get_type_name().empty() ? "" : " " + option->get_type_name();
  }
  std::string make_group(std::string group, bool positional, std::vector<const CLI::Option*> options) const override {
    return group == not_built ? "" : Formatter::make_group(std::move(group), positional, std::move(options));
  }
  std::string make_positionals(const CLI::App*) const override { return ""; }
  std::string make_usage(const CLI::App* app, std::string name) const override {
    const bool command = app->get_parent() != nullptr;
    return fmt::format("Usage: {} {}\n", name, command ? "[OPTION]... NETLIST..." : "COMMAND [OPTION]... NETLIST...");
  }
};

// The texts of every option, before any is understood.
struct Raw {
  Texts netlists, with, json, gate, only, points, jobs, timeout, root, as_of, limits;
  Texts sarif, junit, html, markdown;
  bool quiet = false;
};

// CLI11 reads every option as a list with one value each time it is given: what was given twice is told in our own
// words.
CLI::Option* add(CLI::App& app, const char* name, Texts& texts, const char* value, const std::string& help) {
  return app.add_option(name, texts, help)->type_name(value)->allow_extra_args(false);
}

void add_shared(CLI::App& app, Raw& raw) {
  app.add_option("NETLIST", raw.netlists, "SPICE netlists, one a board");
  add(app, "--with", raw.with, "FILE", "Further declarations; may be given again");
  add(app, "--only", raw.only, "GLOB", "Only inputs of these names; may be given again");
  add(app, "--points", raw.points, "N", "Points of each sweep, ends included (default 101)");
  add(app, "--root", raw.root, "DIR", "Includes are read below it (default: netlist's folder)");
  add(app, "--as-of", raw.as_of, "DATE", "The run's date, YYYY-MM-DD (default: today)");
  add(app, "--limit", raw.limits, "NAME=N", "A limit on what is read; may be given again");
  add(app, "--json", raw.json, "FILE", "The JSON report; - puts it in place of the text");
  app.add_flag("--quiet", raw.quiet, "One line a board");
  app.allow_extras();
}

void add_audit(CLI::App& app, Raw& raw) {
  add_shared(app, raw);
  add(app, "--gate", raw.gate, "LEVEL",
      "Findings from this level on fail the run: error (the\ndefault), warning, note or never");
  add(app, "--jobs", raw.jobs, "N", "Simulators at once (default: one a processor)");
  add(app, "--timeout", raw.timeout, "SECONDS", "For the simulation of one input (default 20)");
  add(app, "--sarif", raw.sarif, "FILE", "")->group(not_built);
  add(app, "--junit", raw.junit, "FILE", "")->group(not_built);
  add(app, "--html", raw.html, "FILE", "")->group(not_built);
  add(app, "--markdown", raw.markdown, "FILE", "")->group(not_built);
}

Message refusal(const std::string& text) {
  return {fmt::format("tapspan: {}\n", text), ExitStatus::incomplete};
}
Message unsupported(std::string_view what) {
  return refusal(fmt::format("{} is not supported by this version", what));
}

// Puts the value of an option that may be given once, if it is given, through `use`, which returns a Result.
template <class Use>
std::optional<Message> take(std::string_view name, const Texts& texts, Use use) {
  if (texts.empty()) return std::nullopt;
  if (texts.size() > 1) return refusal(fmt::format("{} is given more than once", name));
  // What looks like the next option is one: the value was forgotten.
  if (texts.front().empty() || texts.front().rfind("--", 0) == 0) return refusal(fmt::format("{} needs a value", name));
  const auto result = use(texts.front());
  if (!result.ok()) return refusal(fmt::format("{}: {}", name, result.error()));
  return std::nullopt;
}

// Assigns what `read` makes of a text.
template <class Target, class Read>
auto into(Target& target, Read read) {
  return [&target, read](const std::string& text) -> base::Result<base::Done> {
    auto value = read(text);
    if (!value.ok()) return base::Error{value.error()};
    target = static_cast<Target>(*value);
    return base::Done{};
  };
}

base::Result<std::string> as_written(const std::string& text) {
  return text;
}

// The first refusal of all.
std::optional<Message> first_of(std::initializer_list<std::optional<Message>> refusals) {
  for (const std::optional<Message>& message : refusals)
    if (message) return message;
  return std::nullopt;
}

std::optional<Message> read_limits(const Texts& texts, source::Limits& limits) {
  for (const std::string& text : texts)
    if (const auto done = set_limit(text, limits); !done.ok()) return refusal("--limit: " + done.error());
  return std::nullopt;
}

std::optional<Message> read_shared(const Raw& raw, Request& request) {
  if (raw.netlists.empty()) return refusal("expected at least one NETLIST");
  request.netlists = raw.netlists;
  request.options.with.assign(raw.with.begin(), raw.with.end());
  request.options.only = raw.only;
  request.quiet = raw.quiet;
  // A limit raised on the same line holds for the options that it limits.
  if (auto message = read_limits(raw.limits, request.options.limits)) return message;
  const auto points = [&request](const std::string& text) {
    return whole_number(text, 2, request.options.limits.points);
  };
  std::string root;
  auto message =
      first_of({take("--json", raw.json, into(request.json, as_written)), take("--root", raw.root, into(root, folder)),
                take("--as-of", raw.as_of, into(request.as_of, date_of)),
                take("--points", raw.points, into(request.options.points, points))});
  if (!root.empty()) request.options.root = root;
  if (!message && raw.points.empty() && request.options.points > request.options.limits.points)
    return refusal(
        fmt::format("a sweep has {} points where --points does not say otherwise, more than the limit points = {}",
                    request.options.points, request.options.limits.points));
  return message;
}

Command audit_command(const Raw& raw) {
  if (!raw.sarif.empty()) return unsupported("--sarif");
  if (!raw.junit.empty()) return unsupported("--junit");
  if (!raw.html.empty()) return unsupported("--html");
  if (!raw.markdown.empty()) return unsupported("--markdown");
  AuditCommand command;
  constexpr std::uint64_t most_jobs = 1024;
  const auto jobs = [](const std::string& text) { return whole_number(text, 1, most_jobs); };
  auto message = read_shared(raw, command.request);
  if (!message)
    message = first_of({take("--gate", raw.gate, into(command.gate, gate_of)),
                        take("--jobs", raw.jobs, into(command.jobs, jobs)),
                        take("--timeout", raw.timeout, into(command.timeout_seconds, seconds))});
  if (message) return *message;
  return command;
}

Command trace_command(const Raw& raw) {
  TraceCommand command;
  if (auto message = read_shared(raw, command.request)) return *message;
  return command;
}

std::string_view without_dashes(std::string_view word) {
  word.remove_prefix(std::min(word.find_first_not_of('-'), word.size()));
  return word;
}

// The nearest of the names that can stand there, as a question; else a pointer to the help. Dashes count for nothing:
// they make every option alike.
std::string hint(const std::string& word, const Texts& known, const std::string& help) {
  std::vector<std::string_view> names;
  for (const std::string& name : known) names.push_back(without_dashes(name));
  const std::string_view nearest = base::nearest_name(without_dashes(word), names);
  if (nearest.empty()) return fmt::format("; {} tells more", help);
  const auto at = std::find(names.begin(), names.end(), nearest) - names.begin();
  return fmt::format("; did you mean {}?", known[static_cast<std::size_t>(at)]);
}

Texts option_names(const CLI::App& app) {
  Texts out;
  for (const CLI::Option* option : app.get_options())
    for (const std::string& name : option->get_lnames())
      if (option->get_group() != not_built) out.push_back("--" + name);
  return out;
}

// A word that nothing took: an unknown option of a command, or one of the other command.
std::optional<Message> unknown_option(const CLI::App& command, const CLI::App& other) {
  for (const std::string& word : command.remaining()) {
    if (word == "--") continue;
    const std::string option = word.substr(0, word.find('='));
    const Texts of_other = option_names(other);
    if (std::find(of_other.begin(), of_other.end(), option) != of_other.end())
      return refusal(fmt::format("{} is an option of {}, not of {}", option, other.get_name(), command.get_name()));
    return refusal(
        fmt::format("unknown option {}{}", base::printable_short(option),
                    hint(option, option_names(command), fmt::format("tapspan {} --help", command.get_name()))));
  }
  return std::nullopt;
}

Message no_command(const CLI::App& app) {
  const Texts words = app.remaining();
  if (words.empty()) return refusal("expected a command, audit or trace; tapspan --help tells more");
  const std::string& word = words.front();
  const bool option = word.size() > 1 && word[0] == '-';
  return refusal(fmt::format("unknown {} {}{}", option ? "option" : "command", base::printable_short(word),
                             hint(word, {"audit", "trace", "draft", "--help", "--version"}, "tapspan --help")));
}

// CLI11 throws for help, version and for what it cannot read; its own words are kept only for what remains.
Message message_of(const CLI::App& app, const CLI::ParseError& error) {
  if (dynamic_cast<const CLI::CallForVersion*>(&error) != nullptr)
    return {std::string(error.what()) + '\n', ExitStatus::passed};
  if (dynamic_cast<const CLI::CallForHelp*>(&error) != nullptr) return {app.help(), ExitStatus::passed};
  const std::string text = error.what();
  if (dynamic_cast<const CLI::ArgumentMismatch*>(&error) != nullptr)
    return refusal(fmt::format("{} needs a value", base::printable_short(text.substr(0, text.find(':')))));
  return refusal(base::printable_short(text, 200));
}

}  // namespace

Command parse_arguments(const std::vector<std::string>& words) {
  Raw raw;
  CLI::App app("Audits the resistive dividers that feed the ADC inputs of a board, from its netlist.", "tapspan");
  app.set_version_flag("--version", "tapspan " TAPSPAN_VERSION, "Print the version");
  app.allow_extras();
  app.require_subcommand(0, 1);  // a netlist may be called like a command
  app.footer(audit_statuses);
  app.formatter(std::make_shared<HelpText>());
  CLI::App* const audit = app.add_subcommand("audit", "Find, sweep, judge and report every declared input");
  add_audit(*audit, raw);
  audit->footer(audit_statuses);
  CLI::App* const trace = app.add_subcommand("trace", "Tell what was found and how, without simulating");
  add_shared(*trace, raw);
  trace->footer(trace_statuses);
  CLI::App* const draft = app.add_subcommand("draft", "Write a starter declaration file")->group("");
  draft->allow_extras();
  Texts reversed(words.rbegin(), words.rend());  // the order in which CLI11 takes a list
  try {
    app.parse(std::move(reversed));
  } catch (const CLI::ParseError& error) {
    return message_of(app, error);
  }
  if (draft->parsed()) return unsupported("draft");
  const CLI::App* const command = audit->parsed() ? audit : trace->parsed() ? trace : nullptr;
  if (command == nullptr || !app.remaining().empty()) return no_command(app);
  if (const auto message = unknown_option(*command, command == audit ? *trace : *audit)) return *message;
  return command == audit ? audit_command(raw) : trace_command(raw);
}

}  // namespace app
