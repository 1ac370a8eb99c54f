// A program that knows Sunfall only through find_package: the sun over a place at an instant.
#include <sunfall/sun.h>

#include <cstdio>

int main() {
  using namespace std::chrono_literals;
  const sunfall::Place place{sunfall::Angle::degrees(39.742476), sunfall::Angle::degrees(-105.1786), 1830.14};
  const sunfall::UtcTime time = std::chrono::sys_days{2003y / 10 / 17} + 19h + 30min + 30s;
  std::printf("the sun stands %.2f degrees high\n", sunfall::sun_position(time, place).elevation.degrees());
}
