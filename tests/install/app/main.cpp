// A program that knows Sunfall only through find_package: the sun over a place at an instant, and
// glass from the table of covers that comes along.
#include <sunfall/covers.h>
#include <sunfall/sun.h>

#include <cstdio>

int main() {
  using namespace std::chrono_literals;
  const sunfall::Place place{sunfall::Angle::degrees(39.742476), sunfall::Angle::degrees(-105.1786), 1830.14};
  const sunfall::UtcTime time = std::chrono::sys_days{2003y / 10 / 17} + 19h + 30min + 30s;
  std::printf("the sun stands %.2f degrees high\n", sunfall::sun_position(time, place).elevation.degrees());
  const std::filesystem::path table = sunfall::own_covers();
  const sunfall::CoverOptics glass(sunfall::read_covers(table).cover("low-iron glass 4 mm", "main.cpp"));
  std::printf("%s: glass passes %.2f\n", table.string().c_str(), glass.perpendicular().total());
}
