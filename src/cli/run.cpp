// SPDX-License-Identifier: Apache-2.0
// wellwright run: everything a study asks, into the result file and a summary.
#include <fmt/format.h>

#include <cstdio>
#include <filesystem>

#include "cli/commands.hpp"
#include "cli/progress.hpp"
#include "cli/summary.hpp"
#include "cli/text.hpp"
#include "wellwright/answer.hpp"
#include "wellwright/results.hpp"

namespace wellwright::cli {
namespace {

constexpr int exit_not_converged = 3;

std::string target_of(const Request& request) {
  if (!request.output.empty()) return request.output;
  return std::filesystem::path(request.operand).replace_extension(".h5").string();
}

std::string size_of(const std::string& path) {
  std::error_code trouble;
  const auto bytes = static_cast<double>(std::filesystem::file_size(path, trouble));
  if (trouble) return "";
  return bytes < 1e6 ? fmt::format(" ({:.0f} kB)", bytes / 1e3) : fmt::format(" ({:.1f} MB)", bytes / 1e6);
}

}  // namespace

int run(const Request& request) {
  Timings timings;
  const int width = output_width();
  const bool tables = !request.json && !request.quiet;
  const MaterialTable table = table_for(request);
  Notes notes;
  const Study study = study_for(request, table, notes);
  timings.lap("study and stack");
  const std::string target = target_of(request);
  check_target(target);
  if (!request.csv.empty()) check_csv(request.csv);
  if (tables) {
    std::fputs(headline(study, width).c_str(), stdout);
    std::fputc('\n', stdout);
    std::fflush(stdout);
  }

  stop_on_interrupt();
  Answer result;
  {
    ProgressBar bar(!request.quiet);
    timings.skip();
    result = answer(study, std::move(notes), bar.callback());
  }
  timings.add(result.timings);
  timings.skip();
  write_result(result, target);
  timings.lap("result file");
  if (!request.csv.empty()) {
    write_csv(result, request.csv);
    timings.lap("CSV tables");
  }
  if (request.json) std::fputs((to_json(result) + "\n").c_str(), stdout);
  if (tables) {
    std::fputs(summary(result, width, request.verbose).c_str(), stdout);
    std::fputs(fmt::format("\nResult: {}{}\n", target, size_of(target)).c_str(), stdout);
    if (!request.csv.empty()) std::fputs(fmt::format("Tables: {}\n", request.csv).c_str(), stdout);
    timings.lap("summary");
  }
  std::fflush(stdout);
  print_warnings(result.notes, tables);
  if (request.verbose) timings.print();
  return result.converged ? 0 : exit_not_converged;
}

}  // namespace wellwright::cli
