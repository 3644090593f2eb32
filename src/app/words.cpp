#include "words.hpp"

#include <CLI/CLI.hpp>

#include <algorithm>

namespace lightledger::app {
namespace {

void add_option(CLI::App& app, const OptionInfo& option, Words& words) {
  if (option.switched)
    app.add_flag(option.name, words.*option.switched)->multi_option_policy(CLI::MultiOptionPolicy::TakeLast);
  else
    app.add_option(option.name, words.*option.values)
        ->expected(0, 1)
        ->allow_extra_args(false)
        ->multi_option_policy(CLI::MultiOptionPolicy::TakeAll);
}

} // namespace

const std::vector<OptionInfo>& common_options() {
  static const std::vector<OptionInfo> options{
      {"--json", "PATH", "the result as JSON; - is stdout, then for it alone", &Words::json},
      {"--csv", "PATH", "the table as CSV; - is stdout, then for it alone", &Words::csv},
      {"--rays", "N", "scattered rays per field and wavelength", &Words::rays},
      {"--accuracy", "X", "double the rays until the standard error is below X", &Words::accuracy},
      {"--threads", "N", "threads to use; all of the machine's without it", &Words::threads},
      {"--isa", "NAME", "instruction set: avx512, avx2, neon, portable", &Words::isa},
      {"--set", "PATH=VALUE", "a change of the file, as fold.tilt=[44,0,0]; repeatable", &Words::set},
      {"--db", nullptr, "fractions in dB in the text", nullptr, &Words::decibels},
      {"--quiet", nullptr, "no text on stdout", nullptr, &Words::quiet},
      {"--allow-outside", nullptr, "measured curves may lie outside the file's folder", nullptr,
       &Words::allow_outside}};
  return options;
}

const std::vector<OptionInfo>& own_options(Command command) {
  static const std::vector<OptionInfo> none;
  static const std::vector<OptionInfo> budget{
      {"--split", "wavelength|field", "a ledger for each wavelength or field as well", &Words::split}};
  static const std::vector<OptionInfo> polarization{
      {"--against", "wavelength|angle", "a table against the wavelength or the field as well",
       &Words::against},
      {"--maps", "FOLDER", "maps over the pupil, and the table's charts, into a folder", &Words::maps}};
  static const OptionInfo wavelengths{"--wavelengths", "START:STOP:STEP", "in nm, or one number",
                                      &Words::wavelengths};
  static const std::vector<OptionInfo> coating{
      {"--incident", "MEDIUM", "the medium that light comes from; air without it", &Words::incident},
      {"--substrate", "MEDIUM", "that of the first station that uses the coating without it",
       &Words::substrate},
      wavelengths,
      {"--angles", "START:STOP:STEP", "degrees in the medium of incidence, or one number", &Words::angles}};
  static const std::vector<OptionInfo> media{wavelengths};
  static const std::vector<OptionInfo> draw{
      {"--out", "PATH", "the drawing; NAME.svg in the current folder without it, - is stdout", &Words::out},
      {"--view", "x|y|z|all", "look along an axis of the bench; along the best one without it", &Words::view},
      {"--ghost", "K", "the rays of the K-th brightest ghost as well", &Words::ghost}};
  static const std::vector<OptionInfo> report{
      {"--out", "PATH", "the page; NAME.html in the current folder without it, - is stdout", &Words::out}};
  static const std::vector<OptionInfo> ghosts{
      {"--bounces", "2|4", "follow at most so many; 2 without it", &Words::bounces},
      {"--floor", "X", "leave beams that may bring less of the launched power; 1e-12", &Words::floor},
      {"--top", "N", "list the N brightest paths", &Words::top},
      {"--field", "NAME", "the light of one field alone: its name, or its number from 1", &Words::field},
      {"--returned", nullptr, "list what leaves through the front too", nullptr, &Words::returned},
      {"--images", "FOLDER", "pictures of the listed ghosts on the detector", &Words::images}};
  switch (command) {
  case Command::budget:
    return budget;
  case Command::ghosts:
    return ghosts;
  case Command::polarization:
    return polarization;
  case Command::coating:
    return coating;
  case Command::media:
    return media;
  case Command::draw:
    return draw;
  case Command::report:
    return report;
  case Command::check:
    break;
  }
  return none;
}

Words sort_words(Command command, std::vector<std::string> arguments) {
  Words words;
  CLI::App app;
  app.set_help_flag();
  app.allow_extras();
  for (const OptionInfo& option : own_options(command))
    add_option(app, option, words);
  for (const OptionInfo& option : common_options())
    add_option(app, option, words);
  std::ranges::reverse(arguments); // the order in which the parser takes them
  app.parse(std::move(arguments));
  for (const std::string& word : app.remaining())
    (word.size() > 1 && word.front() == '-' ? words.unknown : words.positionals).push_back(word);
  return words;
}

} // namespace lightledger::app
