# What `cmake --install` puts where, and how find_package(sunfall) finds it again.
#
# The library is static, so whoever links it must also link what it uses: sunfall_dependencies goes
# along in the export, and sunfallConfig.cmake finds the packages behind it. tests/install fails
# when the two lists drift apart.
include(CMakePackageConfigHelpers)
set(SUNFALL_PACKAGE_DIR "${CMAKE_INSTALL_LIBDIR}/cmake/sunfall")

set_target_properties(sunfall_dependencies PROPERTIES EXPORT_NAME dependencies)
install(TARGETS sunfall sunfall_dependencies EXPORT sunfallTargets
  ARCHIVE DESTINATION "${CMAKE_INSTALL_LIBDIR}" COMPONENT development)
install(DIRECTORY include/sunfall DESTINATION "${CMAKE_INSTALL_INCLUDEDIR}" COMPONENT development)
install(EXPORT sunfallTargets NAMESPACE sunfall:: DESTINATION "${SUNFALL_PACKAGE_DIR}"
  COMPONENT development)

configure_package_config_file("${CMAKE_CURRENT_LIST_DIR}/sunfallConfig.cmake.in" sunfallConfig.cmake
  INSTALL_DESTINATION "${SUNFALL_PACKAGE_DIR}")
write_basic_package_version_file(sunfallConfigVersion.cmake COMPATIBILITY SameMinorVersion)
install(FILES
  "${CMAKE_CURRENT_BINARY_DIR}/sunfallConfig.cmake"
  "${CMAKE_CURRENT_BINARY_DIR}/sunfallConfigVersion.cmake"
  DESTINATION "${SUNFALL_PACKAGE_DIR}" COMPONENT development)

# The program, with what a person needs beside it. The target's file is named `sunfall`.
if(TARGET sunfall_program)
  install(TARGETS sunfall_program RUNTIME DESTINATION "${CMAKE_INSTALL_BINDIR}" COMPONENT program)
endif()
# The table of covers serves the program and whoever links the library.
foreach(component program development)
  install(FILES fields/covers.toml DESTINATION "${CMAKE_INSTALL_DATADIR}/sunfall" COMPONENT ${component})
  install(DIRECTORY fields/covers DESTINATION "${CMAKE_INSTALL_DATADIR}/sunfall" COMPONENT ${component})
endforeach()
install(FILES LICENSE README.md DESTINATION "${CMAKE_INSTALL_DOCDIR}" COMPONENT program)
