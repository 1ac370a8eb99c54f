# Installs, configures, builds and runs; any step that fails ends the test.
file(REMOVE_RECURSE "${SCRATCH}")
set(prefix "${SCRATCH}/prefix")
execute_process(COMMAND ${CMAKE_COMMAND} --install "${SUNFALL_BUILD}" --prefix "${prefix}"
  --component development COMMAND_ERROR_IS_FATAL ANY OUTPUT_QUIET)

set(flags "")
if(SANITIZE)
  set(flags "-fsanitize=${SANITIZE}")
endif()
execute_process(COMMAND ${CMAKE_COMMAND} -S "${APP_SOURCE}" -B "${SCRATCH}/build" -G "${GENERATOR}"
  "-DCMAKE_PREFIX_PATH=${prefix}" "-DCMAKE_CXX_COMPILER=${COMPILER}" "-DCMAKE_CXX_FLAGS=${flags}"
  COMMAND_ERROR_IS_FATAL ANY OUTPUT_QUIET)
execute_process(COMMAND ${CMAKE_COMMAND} --build "${SCRATCH}/build" COMMAND_ERROR_IS_FATAL ANY)

# Where an installed program stands, so that it finds the table beside itself.
file(INSTALL "${SCRATCH}/build/app" DESTINATION "${prefix}/bin" USE_SOURCE_PERMISSIONS)

# Reda and Andreas (2004), worked example: 39.87205 degrees without refraction. Glass of index 1.526 and
# absorption 2 per metre: 0.9169 exp(-0.008) = 0.910.
execute_process(COMMAND "${prefix}/bin/app" OUTPUT_VARIABLE said COMMAND_ERROR_IS_FATAL ANY)
file(REAL_PATH "${prefix}" real_prefix)
if(NOT said STREQUAL
    "the sun stands 39.87 degrees high\n${real_prefix}/share/sunfall/covers.toml: glass passes 0.91\n")
  message(FATAL_ERROR "the installed library said: ${said}")
endif()
if(NOT EXISTS "${prefix}/share/sunfall/covers/shade-net-50.csv")
  message(FATAL_ERROR "the measured covers are not installed")
endif()
