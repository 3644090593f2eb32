#include <lightledger/assembly/assembly.hpp>

namespace lightledger::assembly {

const char* does(const Assembly& assembly, const Station& station) {
  const Effect& effect = assembly.surfaces[station.surface].effect;
  if (std::holds_alternative<Opening>(effect))
    return "stop";
  if (std::holds_alternative<Sensor>(effect))
    return "detect";
  if (std::holds_alternative<Polarizer>(effect))
    return "polarize";
  if (std::holds_alternative<Retarder>(effect))
    return "retard";
  if (std::holds_alternative<Rotator>(effect))
    return "rotate";
  return station.intended == Act::bounce ? "reflect" : "refract";
}

} // namespace lightledger::assembly
