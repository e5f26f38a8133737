// SPDX-License-Identifier: Apache-2.0
// The command `wellwright`.
#include "wellwright/cli.hpp"

int main(int argc, char** argv) {
  return wellwright::run_command_line(argc, argv);
}
