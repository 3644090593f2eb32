#include "program.hpp"

#include <fcntl.h>
#include <gtest/gtest.h>
#include <pty.h>
#include <sys/wait.h>
#include <unistd.h>

#include <algorithm>
#include <cstdlib>
#include <fstream>
#include <iterator>
#include <stdexcept>

namespace lightledger::contract {
namespace {

namespace fs = std::filesystem;

int exit_code(pid_t child) {
  int status = 0;
  waitpid(child, &status, 0);
  return WIFEXITED(status) ? WEXITSTATUS(status) : -WTERMSIG(status);
}

[[noreturn]] void become(const Arguments& command, const Variables& variables) {
  for (const auto& [name, value] : variables)
    setenv(name.c_str(), value.c_str(), 1);
  std::vector<char*> words;
  for (const std::string& word : command)
    words.push_back(const_cast<char*>(word.c_str()));
  words.push_back(nullptr);
  execv(words.front(), words.data());
  _exit(127);
}

std::string read_all(int descriptor) {
  std::string text;
  char buffer[4096];
  for (ssize_t count = 0; (count = read(descriptor, buffer, sizeof buffer)) > 0;)
    text.append(buffer, static_cast<std::size_t>(count));
  return text;
}

/// Output through pipes; stderr through a file, so that neither can block the other.
Outcome run_in_pipes(const Arguments& command) {
  const Scratch scratch;
  const std::string errors = scratch.path("stderr");
  int ends[2];
  if (pipe2(ends, O_CLOEXEC) != 0)
    throw std::runtime_error("no pipe");
  const pid_t child = fork();
  if (child == 0) {
    dup2(ends[1], STDOUT_FILENO);
    dup2(open(errors.c_str(), O_WRONLY | O_CREAT, 0600), STDERR_FILENO);
    if (chdir(LIGHTLEDGER_SOURCE_DIR) != 0)
      _exit(126);
    become(command, {});
  }
  close(ends[1]);
  Outcome outcome;
  outcome.out = read_all(ends[0]);
  close(ends[0]);
  outcome.code = exit_code(child);
  outcome.err = content(errors);
  return outcome;
}

Arguments command_of(const Arguments& arguments) {
  Arguments command{LIGHTLEDGER_PROGRAM};
  command.insert(command.end(), arguments.begin(), arguments.end());
  return command;
}

} // namespace

Outcome run(const Arguments& arguments) {
  return run_in_pipes(command_of(arguments));
}

Outcome run_shell(const std::string& line) {
  return run_in_pipes({"/bin/bash", "-c", "lightledger() { \"" LIGHTLEDGER_PROGRAM "\" \"$@\"; }\n" + line});
}

Outcome run_on_terminal(const Arguments& arguments, int columns, const Variables& variables) {
  winsize size{};
  size.ws_col = static_cast<unsigned short>(columns);
  size.ws_row = 50;
  int terminal = -1;
  const pid_t child = forkpty(&terminal, nullptr, nullptr, &size);
  if (child == 0) {
    unsetenv("NO_COLOR");
    setenv("TERM", "xterm", 1);
    if (chdir(LIGHTLEDGER_SOURCE_DIR) != 0)
      _exit(126);
    become(command_of(arguments), variables);
  }
  Outcome outcome;
  outcome.out = read_all(terminal);
  close(terminal);
  outcome.code = exit_code(child);
  std::erase(outcome.out, '\r');
  return outcome;
}

Json json_of(Arguments arguments) {
  arguments.insert(arguments.end(), {"--json", "-"});
  const Outcome outcome = run(arguments);
  EXPECT_EQ(outcome.code, 0) << outcome.err;
  EXPECT_EQ(outcome.err, "");
  return Json::parse(outcome.out);
}

std::vector<std::string> keys_of(const Json& object) {
  std::vector<std::string> keys;
  for (const auto& [key, value] : object.items())
    keys.push_back(key);
  return keys;
}

std::string project(const std::string& path) {
  return (fs::path(LIGHTLEDGER_SOURCE_DIR) / path).string();
}

std::string content(const fs::path& path) {
  std::ifstream file(path, std::ios::binary);
  return {std::istreambuf_iterator<char>(file), {}};
}

Scratch::Scratch() {
  std::string name = (fs::temp_directory_path() / "lightledger-test-XXXXXX").string();
  if (!mkdtemp(name.data()))
    throw std::runtime_error("no scratch folder");
  m_folder = name;
}

Scratch::~Scratch() {
  std::error_code ignored;
  fs::remove_all(m_folder, ignored);
}

std::string Scratch::file(const std::string& name, const std::string& text) const {
  std::ofstream(path(name), std::ios::binary) << text;
  return path(name);
}

std::vector<std::string> Scratch::names() const {
  std::vector<std::string> names;
  for (const auto& entry : fs::directory_iterator(m_folder))
    names.push_back(entry.path().filename().string());
  std::ranges::sort(names);
  return names;
}

} // namespace lightledger::contract
