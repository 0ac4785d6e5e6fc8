#include "simulate/device_card.hpp"

#include <algorithm>
#include <cmath>
#include <fmt/format.h>
#include <span>
#include <string_view>

#include "base/text.hpp"
#include "simulate/numbers.hpp"

namespace simulate {
namespace {

using Words = std::span<const std::string_view>;

// What ngspice 39 lists as model parameters of each device, without those of heat and of sensing.
constexpr std::string_view diode_words[] = {
    "level", "is",   "js",   "jsw",  "tnom", "tref", "rs",  "trs",  "trs1", "trs2",   "n",    "ns",
    "tt",    "ttt1", "ttt2", "cjo",  "cj0",  "cj",   "vj",  "pb",   "m",    "mj",     "tm1",  "tm2",
    "cjp",   "cjsw", "php",  "mjsw", "ikf",  "ik",   "ikr", "nbv",  "area", "pj",     "tlev", "tlevc",
    "eg",    "xti",  "cta",  "ctc",  "ctp",  "tpb",  "tvj", "tphp", "jtun", "jtunsw", "ntun", "xtitun",
    "keg",   "kf",   "af",   "fc",   "fcs",  "bv",   "ibv", "ib",   "tcv",  "isr",    "nr"};
constexpr std::string_view bipolar_words[] = {
    "level", "subs",  "tnom",  "tref",  "is",    "ibe",      "ibc",   "bf",   "nf",   "vaf",   "va",    "ikf",
    "ik",    "ise",   "c2",    "ne",    "br",    "nr",       "var",   "vb",   "ikr",  "isc",   "c4",    "nc",
    "rb",    "irb",   "rbm",   "re",    "rc",    "cje",      "vje",   "pe",   "mje",  "me",    "tf",    "xtf",
    "vtf",   "itf",   "ptf",   "cjc",   "vjc",   "pc",       "mjc",   "mc",   "xcjc", "tr",    "cjs",   "csub",
    "ccs",   "vjs",   "ps",    "mjs",   "ms",    "xtb",      "eg",    "xti",  "fc",   "kf",    "af",    "iss",
    "ns",    "rco",   "vo",    "gamma", "qco",   "tlev",     "tlevc", "tbf1", "tbf2", "tbr1",  "tbr2",  "tikf1",
    "tikf2", "tikr1", "tikr2", "tirb1", "tirb2", "tnc1",     "tnc2",  "tne1", "tne2", "tnf1",  "tnf2",  "tnr1",
    "tnr2",  "trb1",  "trb2",  "trc1",  "trc2",  "tre1",     "tre2",  "trm1", "trm2", "tvaf1", "tvaf2", "tvar1",
    "tvar2", "nkf",   "nk",    "tis1",  "tis2",  "quasimod", "vg",    "cn",   "d"};
constexpr std::string_view jfet_words[] = {"level", "vt0",     "vto", "beta", "lambda", "rd",   "rs",  "cgs",
                                           "cgd",   "pb",      "is",  "fc",   "b",      "tnom", "tcv", "vtotc",
                                           "bex",   "betatce", "xti", "eg",   "kf",     "af"};
constexpr std::string_view mos_words[] = {"level", "vto",   "vt0",  "kp",    "gamma", "phi",  "lambda", "rd",   "rs",
                                          "cbd",   "cbs",   "is",   "pb",    "cgso",  "cgdo", "cgbo",   "rsh",  "cj",
                                          "mj",    "cjsw",  "mjsw", "js",    "tox",   "ld",   "u0",     "uo",   "fc",
                                          "nsub",  "tpg",   "nss",  "xj",    "nfs",   "vmax", "delta",  "uexp", "ucrit",
                                          "neff",  "theta", "eta",  "kappa", "tnom",  "kf",   "af"};
constexpr std::string_view switch_words[] = {"vt", "vh", "ron", "roff"};

constexpr std::string_view diode_own[] = {"area", "pj", "m", "temp", "dtemp"};
constexpr std::string_view bipolar_own[] = {"area", "areab", "areac", "m", "temp", "dtemp"};
constexpr std::string_view jfet_own[] = {"area", "m", "temp", "dtemp"};
constexpr std::string_view mos_own[] = {"m", "l", "w", "ad", "as", "pd", "ps", "nrd", "nrs", "temp", "dtemp"};

struct Table {
  std::string_view type;
  Words model;
  Words own;
  double most_level;
};

Table table_of(model::DeviceType type) {
  switch (type) {
    case model::DeviceType::diode:
      return {"d", diode_words, diode_own, 1};
    case model::DeviceType::npn:
      return {"npn", bipolar_words, bipolar_own, 1};
    case model::DeviceType::pnp:
      return {"pnp", bipolar_words, bipolar_own, 1};
    case model::DeviceType::njf:
      return {"njf", jfet_words, jfet_own, 1};
    case model::DeviceType::pjf:
      return {"pjf", jfet_words, jfet_own, 1};
    case model::DeviceType::nmos:
      return {"nmos", mos_words, mos_own, 3};
    case model::DeviceType::pmos:
      return {"pmos", mos_words, mos_own, 3};
    case model::DeviceType::voltage_switch:
      break;
  }
  return {"sw", switch_words, {}, 1};
}

base::Result<base::Done> append(std::string& out, const model::DeviceParameter& parameter, const Table& table,
                                Words known, const base::NameTable& names) {
  const std::string word = base::folded(names.text(parameter.name));
  if (std::find(known.begin(), known.end(), word) == known.end()) {
    return base::Error{fmt::format("the simulator's {} models do not take the parameter {}", table.type,
                                   base::printable_short(word, 40))};
  }
  if (!std::isfinite(parameter.value))
    return base::Error{fmt::format("the parameter {} of a {} model is not a finite number", word, table.type)};
  if (word == "level" && !(parameter.value >= 1 && parameter.value <= table.most_level)) {
    return base::Error{
        fmt::format("level {} of {} models is not simulated", base::number_text(parameter.value), table.type)};
  }
  out.append(" ").append(word).append("=");
  append_number(out, parameter.value);
  return base::Done{};
}

}  // namespace

base::Result<base::Done> append_model(std::string& out, std::size_t index, const model::DeviceModel& model,
                                      const base::NameTable& names) {
  const Table table = table_of(model.type);
  out.append(".model dm");
  append_index(out, index);
  out.append(" ").append(table.type).append("(");
  for (const model::DeviceParameter& parameter : model.parameters) {
    if (auto done = append(out, parameter, table, table.model, names); !done) return done;
  }
  out.append(")\n");
  return base::Done{};
}

base::Result<base::Done> append_parameters(std::string& out, const model::Device& device, const model::Circuit& circuit,
                                           const base::NameTable& names) {
  const Table table = table_of(circuit.models[device.model.index()].type);
  for (std::size_t i = 0; i < device.parameters.count; ++i) {
    const model::DeviceParameter& parameter = circuit.device_parameters[device.parameters.first + i];
    if (auto done = append(out, parameter, table, table.own, names); !done) return done;
  }
  return base::Done{};
}

DeviceShape shape_of(model::DeviceType type) {
  switch (type) {
    case model::DeviceType::diode:
      return {'d', 2, 2};
    case model::DeviceType::npn:
    case model::DeviceType::pnp:
      return {'q', 3, 4};
    case model::DeviceType::njf:
    case model::DeviceType::pjf:
      return {'j', 3, 3};
    case model::DeviceType::nmos:
    case model::DeviceType::pmos:
      return {'m', 4, 4};
    case model::DeviceType::voltage_switch:
      break;
  }
  return {'s', 4, 4};
}

}  // namespace simulate
