# Every library that Sunfall uses, in one place. All are Debian packages (see dev).
find_package(GDAL REQUIRED)
find_package(PROJ REQUIRED)
find_package(Eigen3 REQUIRED NO_MODULE)
find_package(TBB REQUIRED)
find_package(fmt REQUIRED)
find_package(CLI11 REQUIRED)
find_package(nlohmann_json REQUIRED)
find_package(date REQUIRED)
find_package(OpenSSL REQUIRED COMPONENTS Crypto)
find_package(PkgConfig REQUIRED)
pkg_check_modules(ERFA REQUIRED IMPORTED_TARGET erfa)
pkg_check_modules(CAIRO REQUIRED IMPORTED_TARGET cairo)
pkg_check_modules(TOMLPP REQUIRED IMPORTED_TARGET tomlplusplus)

# What a program that links the static library must link as well (see sunfallConfig.cmake.in), and
# what is only headers and stays with our own build.
add_library(sunfall_dependencies INTERFACE)
target_link_libraries(sunfall_dependencies INTERFACE
  GDAL::GDAL PROJ::proj TBB::tbb fmt::fmt date::date-tz OpenSSL::Crypto
  PkgConfig::ERFA PkgConfig::CAIRO PkgConfig::TOMLPP
  $<BUILD_INTERFACE:Eigen3::Eigen> $<BUILD_INTERFACE:CLI11::CLI11>
  $<BUILD_INTERFACE:nlohmann_json::nlohmann_json>)
