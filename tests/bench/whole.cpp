#include "bench/whole.hpp"

#include "bench/cases.hpp"

#include <lightledger/trace/tracer.hpp>

#include <fmt/format.h>
#include <sys/resource.h>
#include <sys/wait.h>
#include <unistd.h>

#include <algorithm>
#include <chrono>
#include <cmath>
#include <filesystem>
#include <fstream>
#include <functional>
#include <stdexcept>

namespace lightledger::bench {
namespace {

double seconds_once(const std::function<void()>& work) {
  const auto start = std::chrono::steady_clock::now();
  work();
  return std::chrono::duration<double>(std::chrono::steady_clock::now() - start).count();
}

/// The median of five runs.
double seconds(const std::function<void()>& work) {
  std::vector<double> times;
  for (int trial = 0; trial < 5; ++trial)
    times.push_back(seconds_once(work));
  std::ranges::nth_element(times, times.begin() + 2);
  return times[2];
}

double trace_seconds(Case& one, std::uint64_t rays, int threads) {
  one.assembly->light.sampling = assembly::Scattered{rays};
  return seconds([&] { (void)trace::trace(one.train, {.threads = threads}); });
}

/// d log(cost)/d log(size) over a factor of four.
double exponent(double small, double large) {
  return std::log(large / small) / std::log(4.0);
}

struct Process {
  double seconds;
  double peak_mb;
};

Process run_process(const std::vector<std::string>& words) {
  std::vector<char*> arguments;
  for (const std::string& word : words)
    arguments.push_back(const_cast<char*>(word.c_str()));
  arguments.push_back(nullptr);
  rusage usage{};
  const double time = seconds_once([&] {
    const pid_t child = fork();
    if (child == 0) {
      if (std::freopen("/dev/null", "w", stdout) == nullptr)
        _exit(1);
      execv(arguments.front(), arguments.data());
      _exit(1);
    }
    int status = 0;
    wait4(child, &status, 0, &usage);
    if (status != 0)
      throw std::runtime_error("the program failed: " + words[1]);
  });
  return {time, static_cast<double>(usage.ru_maxrss) / 1024.0};
}

Process median_process(const std::vector<std::string>& words) {
  std::vector<Process> runs;
  for (int trial = 0; trial < 9; ++trial)
    runs.push_back(run_process(words));
  std::ranges::nth_element(runs, runs.begin() + 4, {}, &Process::seconds);
  return runs[4];
}

void traces(Whole& whole) {
  Case faces = make("layers4", 20);
  constexpr std::uint64_t rays = 1 << 18;
  const double one_thread = trace_seconds(faces, rays, 1);
  whole.push_back(
      {"interactions a second, one thread, launch included", rays * 21 / one_thread / 1e6, "M/s"});
  whole.push_back({"speed on two threads over one", one_thread / trace_seconds(faces, rays, 2), ""});
  whole.push_back(
      {"exponent of the cost over rays", exponent(trace_seconds(faces, rays / 4, 1), one_thread), ""});
  Case more = make("layers4", 80);
  whole.push_back({"exponent over surfaces", exponent(one_thread, trace_seconds(more, rays, 1)), ""});
  Case colours = make("layers4", 20, 4);
  whole.push_back({"exponent over wavelengths", exponent(one_thread, trace_seconds(colours, rays, 1)), ""});
}

void plans(Whole& whole) {
  whole.push_back({"train of 60 surfaces with 4 layers, 5 wavelengths, made ready",
                   1e3 * seconds([] { (void)make("layers4", 60, 5); }), "ms"});
  whole.push_back({"the same without layers", 1e3 * seconds([] { (void)make("sphere", 60, 5); }), "ms"});
}

void processes(Whole& whole, const std::filesystem::path& program, const std::filesystem::path& systems) {
  const std::string name = program.string();
  const std::string lidar = (systems / "fog-bank-lidar.yaml").string();
  whole.push_back({"start-up (media)", 1e3 * median_process({name, "media"}).seconds, "ms"});
  whole.push_back({"budget of the lidar", 1e3 * median_process({name, "budget", lidar}).seconds, "ms"});
  for (const char* rays : {"10000", "10000000"})
    whole.push_back({fmt::format("peak memory of the lidar with {} rays", rays),
                     run_process({name, "budget", lidar, "--rays", rays}).peak_mb, "MB"});
}

} // namespace

Whole measure_whole(const std::string& own_path) {
  Whole whole;
  traces(whole);
  plans(whole);
  const std::filesystem::path folder = std::filesystem::absolute(own_path).parent_path().parent_path();
  processes(whole, folder / "lightledger", std::filesystem::path(LIGHTLEDGER_SOURCE_DIR) / "systems");
  return whole;
}

} // namespace lightledger::bench
