#include "flatten/model_types.hpp"

#include <algorithm>
#include <array>

#include "base/names.hpp"

namespace flatten {
namespace {

using model::DeviceType;

// Which names a model takes: ngspice 39, the table that it prints of each device (measured). Which of them count at DC:
// the model equations of the ngspice manual's chapters on diodes, BJTs, JFETs and MOSFETs.
constexpr std::string_view diode =
    "is js jsw rs n ns bv ibv ib nbv ikf ik ikr isr nr area pj jtun jtunsw ntun xtitun keg eg xti tnom tref trs trs1 "
    "trs2 "
    "tcv";
constexpr std::string_view diode_silent =
    "level cjo cj0 cj vj pb m mj tt ttt1 ttt2 tm1 tm2 cjp cjsw php mjsw fc fcs kf af cta ctc ctp tpb tvj tphp tlev "
    "tlevc "
    "fv_max bv_max id_max te_max pd_max rth0 cth0 mfg type vpk vrev iave ipk irms";
constexpr std::string_view bipolar =
    "is ibe ibc bf nf vaf va ikf ik ise c2 ne br nr var vb ikr isc c4 nc rb irb rbm re rc iss ns rco vo gamma nkf nk "
    "quasimod xtb eg xti tnom tref";
constexpr std::string_view bipolar_silent =
    "level cje vje pe mje me tf xtf vtf itf ptf cjc vjc pc mjc mc xcjc tr cjs csub ccs vjs ps mjs ms fc kf af qco tlev "
    "tlevc vbe_max vbc_max vce_max pd_max ic_max ib_max te_max rth0 mfg type vceo icrating";
constexpr std::string_view junction = "vt0 vto beta lambda rd rs is pb b tnom tcv vtotc bex betatce xti eg";
constexpr std::string_view junction_silent = "level cgs cgd fc kf af nlev gdsnoi mfg type";
constexpr std::string_view mos_silent = "cbd cbs pb cgso cgdo cgbo cj mj cjsw mjsw fc kf af mfg type";
constexpr std::string_view mos1 = "level vto vt0 kp gamma phi lambda rd rs rsh is js tox ld u0 uo nsub tpg nss tnom";
constexpr std::string_view mos2 =
    "level vto vt0 kp gamma phi lambda rd rs rsh is js tox ld u0 uo nsub tpg nss delta uexp ucrit vmax xj neff nfs "
    "tnom";
constexpr std::string_view mos3 =
    "level vto vt0 kp gamma phi rd rs rsh is js tox ld xl wd xw delvto delvt0 u0 uo nsub tpg nss vmax xj nfs xd alpha "
    "eta "
    "delta theta kappa tnom";

constexpr std::array rows{
    ModelType{"d", DeviceType::diode, 'd', 1, diode, diode_silent},
    ModelType{"npn", DeviceType::npn, 'q', 1, bipolar, bipolar_silent},
    ModelType{"pnp", DeviceType::pnp, 'q', 1, bipolar, bipolar_silent},
    ModelType{"njf", DeviceType::njf, 'j', 1, junction, junction_silent},
    ModelType{"pjf", DeviceType::pjf, 'j', 1, junction, junction_silent},
    ModelType{"nmos", DeviceType::nmos, 'm', 1, mos1, mos_silent},
    ModelType{"nmos", DeviceType::nmos, 'm', 2, mos2, mos_silent},
    ModelType{"nmos", DeviceType::nmos, 'm', 3, mos3, mos_silent},
    ModelType{"pmos", DeviceType::pmos, 'm', 1, mos1, mos_silent},
    ModelType{"pmos", DeviceType::pmos, 'm', 2, mos2, mos_silent},
    ModelType{"pmos", DeviceType::pmos, 'm', 3, mos3, mos_silent},
    ModelType{"sw", DeviceType::voltage_switch, 's', 1, "vt vh ron roff", "level"},
};

}  // namespace

const ModelType* model_type(std::string_view type, int level) {
  const auto* const at = std::find_if(rows.begin(), rows.end(), [&](const ModelType& row) {
    return row.level == level && base::same_name(row.name, type);
  });
  return at == rows.end() ? nullptr : at;
}

bool is_model_type(std::string_view type) {
  return model_type(type, 1) != nullptr;
}

bool lists(std::string_view list, std::string_view word) {
  while (!list.empty()) {
    const std::size_t blank = std::min(list.find(' '), list.size());
    if (base::same_name(list.substr(0, blank), word)) return true;
    list.remove_prefix(std::min(blank + 1, list.size()));
  }
  return false;
}

}  // namespace flatten
