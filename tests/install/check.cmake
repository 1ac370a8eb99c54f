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

# Reda and Andreas (2004), worked example: 39.87205 degrees without refraction.
execute_process(COMMAND "${SCRATCH}/build/app" OUTPUT_VARIABLE said COMMAND_ERROR_IS_FATAL ANY)
if(NOT said STREQUAL "the sun stands 39.87 degrees high\n")
  message(FATAL_ERROR "the installed library said: ${said}")
endif()
