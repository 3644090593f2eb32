#include "ghost_quantity.hpp"

#include <algorithm>
#include <array>
#include <charconv>
#include <functional>

namespace lightledger::analysis {
namespace {

/// A key of one object in the JSON, and the figure that stands under it.
template <class Object>
struct Key {
  std::string_view name;
  std::function<Figure(const Object&)> figure;
};

template <class Object>
std::optional<Figure> look_up(const std::vector<Key<Object>>& keys, const Object& object,
                              std::string_view path) {
  const auto key = std::ranges::find(keys, path, &Key<Object>::name);
  return key == keys.end() ? std::nullopt : std::optional(key->figure(object));
}

Figure bare(std::optional<double> value) {
  return {value, std::nullopt};
}

template <std::uint64_t Ghosts::*count>
Figure counted(const Ghosts& ghosts) {
  return bare(static_cast<double>(ghosts.*count));
}

template <double GhostLedger::*power>
Figure entered(const Ghosts& ghosts) {
  return bare(ghosts.ledger.*power);
}

const std::vector<Key<Ghosts>> ghosts_keys{
    {"total",
     [](const Ghosts& g) {
       return Figure{g.total, g.uncertainty};
     }},
    {"returned",
     [](const Ghosts& g) {
       return Figure{g.returned, g.returned_uncertainty};
     }},
    {"not_followed", [](const Ghosts& g) { return bare(g.not_followed); }},
    {"uncertainty", [](const Ghosts& g) { return bare(g.uncertainty); }},
    {"delivered", [](const Ghosts& g) { return bare(g.delivered); }},
    {"closure_error", [](const Ghosts& g) { return bare(g.closure_error); }},
    {"bounces", [](const Ghosts& g) { return bare(g.bounces); }},
    {"rays", counted<&Ghosts::rays>},
    {"paths_considered", counted<&Ghosts::paths_considered>},
    {"paths_traced", counted<&Ghosts::paths_traced>},
    {"ledger.detector", entered<&GhostLedger::detector>},
    {"ledger.returned", entered<&GhostLedger::returned>},
    {"ledger.leaked", entered<&GhostLedger::leaked>},
    {"ledger.absorbed", entered<&GhostLedger::absorbed>},
    {"ledger.clipped", entered<&GhostLedger::clipped>},
    {"ledger.missed", entered<&GhostLedger::missed>},
    {"ledger.scattered", entered<&GhostLedger::scattered>},
    {"ledger.extra", entered<&GhostLedger::extra>},
    {"ledger.bulk", entered<&GhostLedger::bulk>},
    {"ledger.not_followed", entered<&GhostLedger::not_followed>},
};

/// Of a ratio to the power, whose own error is the larger.
Figure relative(const Ghost& ghost) {
  const bool known = ghost.uncertainty && ghost.relative_power && ghost.power > 0.0;
  return {ghost.relative_power,
          known ? std::optional(*ghost.uncertainty * *ghost.relative_power / ghost.power) : std::nullopt};
}

const std::vector<Key<Ghost>> ghost_keys{
    {"power",
     [](const Ghost& g) {
       return Figure{g.power, g.uncertainty};
     }},
    {"uncertainty", [](const Ghost& g) { return bare(g.uncertainty); }},
    {"relative_power", relative},
    {"centroid_mm[0]", [](const Ghost& g) { return bare(g.spot.centroid_mm[0]); }},
    {"centroid_mm[1]", [](const Ghost& g) { return bare(g.spot.centroid_mm[1]); }},
    {"rms_radius_mm", [](const Ghost& g) { return bare(g.spot.rms_radius_mm); }},
    {"path_excess_mm", [](const Ghost& g) { return bare(g.path_excess_mm); }},
    {"peak_ratio", [](const Ghost& g) { return bare(g.peak_ratio); }},
    {"stokes[0]", [](const Ghost& g) { return bare(g.stokes[0]); }},
    {"stokes[1]", [](const Ghost& g) { return bare(g.stokes[1]); }},
    {"stokes[2]", [](const Ghost& g) { return bare(g.stokes[2]); }},
    {"stokes[3]", [](const Ghost& g) { return bare(g.stokes[3]); }},
    {"dop", [](const Ghost& g) { return bare(g.dop); }},
    {"fringe_modulation", [](const Ghost& g) { return bare(g.fringe_modulation); }},
    {"defocus_mm", [](const Ghost& g) { return bare(g.defocus_mm); }},
};

template <std::size_t axis>
Figure centroid(const GhostField& field) {
  return bare(field.spot ? std::optional(field.spot->centroid_mm[axis]) : std::nullopt);
}

const std::vector<Key<GhostField>> field_keys{
    {"power", [](const GhostField& f) { return bare(f.power); }},
    {"relative_power", [](const GhostField& f) { return bare(f.relative_power); }},
    {"centroid_mm[0]", centroid<0>},
    {"centroid_mm[1]", centroid<1>},
    {"rms_radius_mm",
     [](const GhostField& f) { return bare(f.spot ? std::optional(f.spot->rms_radius_mm) : std::nullopt); }},
};

/// Takes a head off a path where it has it.
bool take(std::string_view& path, std::string_view head) {
  if (!path.starts_with(head))
    return false;
  path.remove_prefix(head.size());
  return true;
}

/// Takes `[index]` off a path.
std::optional<std::size_t> take_index(std::string_view& path) {
  if (!path.starts_with('['))
    return std::nullopt;
  std::size_t index = 0;
  const char* const end = path.data() + path.size();
  const auto [stop, error] = std::from_chars(path.data() + 1, end, index);
  if (error != std::errc{} || stop == end || *stop != ']')
    return std::nullopt;
  path.remove_prefix(static_cast<std::size_t>(stop - path.data()) + 1);
  return index;
}

/// Fields by name or by index. Names may hold dots, so each is tried as it stands.
std::optional<Figure> figure_of_field(const Ghost& ghost, std::string_view path) {
  for (const GhostField& field : ghost.by_field) {
    std::string_view rest = path;
    if (field.name && take(rest, ".") && take(rest, *field.name) && take(rest, "."))
      if (const auto figure = look_up(field_keys, field, rest))
        return figure;
  }
  const std::optional<std::size_t> index = take_index(path);
  if (!index || *index >= ghost.by_field.size() || !take(path, "."))
    return std::nullopt;
  return look_up(field_keys, ghost.by_field[*index], path);
}

std::optional<Figure> figure_of_ghost(const Ghost& ghost, std::string_view path) {
  if (std::string_view rest = path; take(rest, "by_field"))
    return figure_of_field(ghost, rest);
  return look_up(ghost_keys, ghost, path);
}

/// Of a path that brings no light.
Ghost nothing() {
  Ghost ghost;
  ghost.uncertainty = 0.0;
  ghost.relative_power = 0.0;
  return ghost;
}

} // namespace

std::optional<Figure> ghost_figure(const Ghosts& ghosts, std::string_view path) {
  if (const auto figure = look_up(ghosts_keys, ghosts, path))
    return figure;
  std::size_t index = 0;
  if (path == "brightest")
    path = "power";
  else if (take(path, "paths")) {
    const auto given = take_index(path);
    if (!given || !take(path, "."))
      return std::nullopt;
    index = *given;
  } else if (!take(path, "brightest."))
    return std::nullopt;
  return figure_of_ghost(index < ghosts.paths.size() ? ghosts.paths[index] : nothing(), path);
}

std::vector<std::string_view> ghost_paths() {
  std::vector<std::string_view> paths{"brightest", "brightest.relative_power", "paths[0].power"};
  for (const Key<Ghosts>& key : ghosts_keys)
    paths.push_back(key.name);
  return paths;
}

} // namespace lightledger::analysis
