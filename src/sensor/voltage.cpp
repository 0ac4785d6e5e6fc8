// A swept rail: the measurand is its voltage, and nothing more is to be declared.
#include "sensor/law.hpp"

namespace sensor {

Kind voltage_kind() {
  return {"voltage", "voltage", "V", Moves::rail, false, {}, nullptr};
}

}  // namespace sensor
