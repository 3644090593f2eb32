#include "commands.hpp"

#include <algorithm>

namespace lightledger::app {
const std::vector<CommandInfo>& commands() {
  static const std::vector<CommandInfo> all{
      {Command::check, "check", "FILE", "Is the file sound, and are its requirements met?",
       "lightledger check systems/fog-bank-lidar.yaml"},
      {Command::budget, "budget", "FILE", "How much light arrives, and where did the rest go?",
       "lightledger budget systems/fog-bank-lidar.yaml --json -"},
      {Command::ghosts, "ghosts", "FILE", "Which unwanted reflections arrive, and how bright are they?",
       "lightledger ghosts systems/tide-pool-camera.yaml --top 5"},
      {Command::polarization, "polarization", "FILE",
       "What becomes of the polarization, and by which station?",
       "lightledger polarization systems/relay-terminal.yaml --against wavelength --maps maps"},
      {Command::coating, "coating", "FILE NAME", "What does a coating do against wavelength and angle?",
       "lightledger coating systems/fog-bank-lidar.yaml lens_ar --wavelengths 500:560:20 --angles 0:30:15"},
      {Command::media, "media", "[NAME]", "Which media are known, and what are n and kappa of one?",
       "lightledger media fused-silica --wavelengths 400:700:50"},
      {Command::draw, "draw", "FILE", "What does the train look like, to scale and with its rays?",
       "lightledger draw systems/fog-bank-lidar.yaml --out lidar.svg"},
      {Command::report, "report", "FILE", "How does all of it look, on one page ready to send?",
       "lightledger report systems/fog-bank-lidar.yaml --out lidar.html"}};
  return all;
}

const CommandInfo& info(Command command) {
  return *std::ranges::find(commands(), command, &CommandInfo::command);
}

const CommandInfo* find_command(std::string_view name) {
  const auto found = std::ranges::find(commands(), name, &CommandInfo::name);
  return found == commands().end() ? nullptr : &*found;
}

std::vector<std::string_view> command_names() {
  std::vector<std::string_view> names;
  for (const CommandInfo& command : commands())
    names.emplace_back(command.name);
  return names;
}

} // namespace lightledger::app
