// SPDX-License-Identifier: Apache-2.0
// What the subcommands share, and the way from an error to its exit code.
#include "cli/commands.hpp"

#include <fmt/format.h>
#include <tbb/global_control.h>

#include <cstdio>
#include <filesystem>
#include <memory>
#include <new>

#include "cli/progress.hpp"
#include "cli/text.hpp"
#include "cli/words.hpp"
#include "wellwright/cli.hpp"
#include "wellwright/results.hpp"

namespace wellwright {
namespace cli {

MaterialTable table_for(const Request& request) {
  if (request.materials.empty()) return {};
  return MaterialTable::from_yaml(read_yaml(read_file(request.materials), request.materials));
}

Study study_for(const Request& request, const MaterialTable& table, Notes& notes) {
  const std::string text = read_file(request.operand);
  if (text.starts_with("\x89HDF"))
    throw FileTrouble(
        fmt::format("{}: this is an HDF5 file, such as a result; a study is a text file", request.operand));
  return read_study(text, request.operand, table, request.settings, notes);
}

void print_warnings(const Notes& notes, bool in_summary) {
  if (notes.warnings().empty() || (in_summary && output_and_errors_together())) return;
  for (const auto& warning : notes.warnings())
    std::fputs(wrapped("warning: " + warning, output_width(), 0, 2).c_str(), stderr);
}

void Timings::lap(std::string part) {
  const auto now = std::chrono::steady_clock::now();
  parts_.emplace_back(std::move(part), std::chrono::duration<double, std::milli>(now - last_).count());
  last_ = now;
}

void Timings::add(const std::vector<std::pair<std::string, double>>& parts) {
  parts_.insert(parts_.end(), parts.begin(), parts.end());
}

void Timings::print() const {
  double sum = 0;
  std::fputs("Timings\n", stderr);
  for (const auto& [part, ms] : parts_) {
    std::fputs(fmt::format("  {:10.3f} ms  {}\n", ms, part).c_str(), stderr);
    sum += ms;
  }
  std::fputs(fmt::format("  {:10.3f} ms  together\n", sum).c_str(), stderr);
}

namespace {

constexpr int exit_input = 2, exit_not_converged = 3, exit_file = 4;
constexpr int exit_interrupted = 130;  // what shells use for an interrupt

int run_request(const Request& request) {
  if (request.version) {
    std::fputs(fmt::format("wellwright {}\n", version()).c_str(), stdout);
    return 0;
  }
  if (request.help) {
    std::fputs(help_text(request.command).c_str(), stdout);
    return 0;
  }
  std::unique_ptr<tbb::global_control> limit;
  if (request.threads > 0)
    limit = std::make_unique<tbb::global_control>(tbb::global_control::max_allowed_parallelism,
                                                  static_cast<std::size_t>(request.threads));
  if (request.command == "run") return run(request);
  if (request.command == "check") return check(request);
  return materials(request);
}

int complain(const std::string& message, int code) {
  std::fflush(stdout);
  std::fputs(message.c_str(), stderr);
  if (!message.ends_with('\n')) std::fputc('\n', stderr);
  return code;
}

}  // namespace
}  // namespace cli

int run_command_line(int argc, const char* const* argv) {
  using namespace cli;
  try {
    const int code = run_request(read_command_line(argc, argv));
    // A full disk behind standard output shows at the latest here.
    if (std::fflush(stdout) != 0 || std::ferror(stdout) != 0)
      return complain("wellwright: standard output cannot be written", exit_file);
    return code;
  } catch (const UsageError& slip) {
    return complain(slip.what(), exit_input);
  } catch (const InputError& mistake) {
    return complain(mistake.what(), exit_input);
  } catch (const NotConverged& trouble) {
    return complain(fmt::format("wellwright: not converged: {}", trouble.what()), exit_not_converged);
  } catch (const FileTrouble& trouble) {
    return complain(fmt::format("wellwright: {}", trouble.what()), exit_file);
  } catch (const Stopped&) {
    return complain("wellwright: stopped; nothing was written", exit_interrupted);
  } catch (const std::bad_alloc&) {
    return complain("wellwright: the memory does not suffice for this study", exit_not_converged);
  }
}

}  // namespace wellwright
