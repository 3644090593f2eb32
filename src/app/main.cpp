#include "input_error.hpp"
#include "interruption.hpp"
#include "run.hpp"
#include "terminal.hpp"

#include <cerrno>
#include <cstdio>
#include <exception>
#include <string>
#include <system_error>
#include <vector>

namespace {

constexpr int wrong_input = 2;
constexpr int anything_else = 3;

int fail(const char* message) {
  std::fprintf(stderr, "lightledger  %s\n", message);
  return anything_else;
}

/// A reader that has seen enough, as `head`, needs no message.
bool reader_left(const std::system_error& error) {
  return error.code().value() == EPIPE;
}

} // namespace

int main(int count, char** arguments) {
  using namespace lightledger::app;
  try {
    make_writing_safe();
    watch_for_interruption();
    return run(std::vector<std::string>(arguments + (count > 0 ? 1 : 0), arguments + count));
  } catch (const InputError& error) {
    std::fputs(error.what(), stderr);
    return wrong_input;
  } catch (const std::system_error& error) {
    return reader_left(error) ? anything_else : fail(error.what());
  } catch (const std::exception& error) {
    return fail(error.what());
  } catch (...) {
    return fail("an error of unknown kind");
  }
}
