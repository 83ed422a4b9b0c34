#include "cli/cli.h"

int main(int argc, char** argv) { return gaskettle::run_command_line(argc, argv); }
