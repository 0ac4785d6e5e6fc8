// A sensor that the netlist models itself: the measurand is the parameter that `sweep` names, in the model's own unit.
#include "sensor/law.hpp"

namespace sensor {

Kind parameter_kind() {
  return {"parameter", "parameter", "", Moves::parameter, false, {}, nullptr};
}

}  // namespace sensor
