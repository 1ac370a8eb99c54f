# How everything is compiled. Sums are ordered and never fused, so that one job and many, and one
# machine and another, give the same bytes.
add_library(sunfall_options INTERFACE)
target_compile_options(sunfall_options INTERFACE
  -ffp-contract=off -Wall -Wextra -Wpedantic -Wshadow -Wconversion -Wno-sign-conversion
  $<$<CONFIG:Debug>:-Werror>)
if(SUNFALL_SANITIZE)
  target_compile_options(sunfall_options INTERFACE -fsanitize=${SUNFALL_SANITIZE} -fno-omit-frame-pointer)
  target_link_options(sunfall_options INTERFACE -fsanitize=${SUNFALL_SANITIZE})
endif()
