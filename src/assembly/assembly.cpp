#include <lightledger/assembly/assembly.hpp>

namespace lightledger::assembly {

const char* does(const Assembly& assembly, const Station& station) {
  if (station.intended == Act::detect)
    return "detect";
  if (std::holds_alternative<Opening>(assembly.surfaces[station.surface].effect))
    return "stop";
  return station.intended == Act::bounce ? "reflect" : "refract";
}

} // namespace lightledger::assembly
