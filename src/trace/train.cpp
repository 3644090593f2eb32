#include <lightledger/trace/tables.hpp>
#include <lightledger/trace/train.hpp>

#include <utility>

namespace lightledger::trace {

std::optional<Train> prepare(const assembly::Assembly& assembly, assembly::Faults& faults) {
  auto bench = lay_out(assembly, faults);
  if (!bench)
    return std::nullopt;
  const Routes routes(assembly, bench->from);
  std::vector<Plan> plans;
  for (const assembly::Wavelength& wavelength : assembly.light.wavelengths)
    plans.push_back(compile(assembly, *bench, routes, wavelength.nm));
  Path path = intended_path(assembly, routes);
  auto launches = footprints(assembly, path, plans.front(), faults);
  if (!launches)
    return std::nullopt;
  Train train{&assembly, std::move(*bench), routes, std::move(plans), std::move(path), std::move(*launches)};
  tabulate(train);
  return train;
}

} // namespace lightledger::trace
