#include <iostream>
#include <sstream>

#include "orders.hpp"

int main(int argc, char** argv) {
  std::ostringstream out;  // held back, so that nothing half-made reaches standard output
  const auto status = turnwright::cli::serve(argc, argv, out, std::cerr);
  std::cout << out.str() << std::flush;
  return std::cout ? status : turnwright::cli::own_failure;
}
