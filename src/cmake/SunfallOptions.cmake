# How everything is compiled. Sums are ordered and never fused, so that one job and many, and one
# machine and another, give the same bytes.
# Members of options have defaults, and leaving them out is meant. -Wrestrict of GCC 12 accuses
# std::string's operator+ (GCC bug 105651). -Wpsabi warns of vectors passed between functions when
# those are not inlined; ours never leave their own file.
add_library(sunfall_options INTERFACE)
target_compile_options(sunfall_options INTERFACE
  -ffp-contract=off -Wall -Wextra -Wpedantic -Wshadow -Wconversion -Wno-sign-conversion
  -Wno-missing-field-initializers -Wno-restrict -Wno-psabi
  $<$<CONFIG:Debug>:-Werror>)

# Position independent throughout: programs load at random addresses, and the static library can go
# into somebody's shared one. No symbol of ours is meant to be replaced at load time, which lets the
# compiler inline as it would without -fPIC.
set(CMAKE_POSITION_INDEPENDENT_CODE ON)
include(CheckPIESupported)
check_pie_supported(LANGUAGES CXX)
target_compile_options(sunfall_options INTERFACE -fno-semantic-interposition)

# Files come from strangers: overflows should stop the program, not steer it. FORTIFY needs an
# optimising build and must not sit under a sanitizer; the library's own bound checks cost too much
# in the sweep's inner loops, so only debugging builds have them.
target_compile_options(sunfall_options INTERFACE -fstack-protector-strong -fstack-clash-protection)
target_link_options(sunfall_options INTERFACE LINKER:-z,relro,-z,now,-z,noexecstack)
target_compile_definitions(sunfall_options INTERFACE $<$<CONFIG:Debug>:_GLIBCXX_ASSERTIONS>)
if(SUNFALL_SANITIZE)
  # GCC 12 loses track of initialisation behind its own instrumentation (std::regex).
  target_compile_options(sunfall_options INTERFACE
    -fsanitize=${SUNFALL_SANITIZE} -fno-sanitize-recover=all -fno-omit-frame-pointer -Wno-maybe-uninitialized)
  target_link_options(sunfall_options INTERFACE -fsanitize=${SUNFALL_SANITIZE})
  target_compile_definitions(sunfall_options INTERFACE SUNFALL_NO_CLONES)
else()
  target_compile_options(sunfall_options INTERFACE
    $<$<NOT:$<CONFIG:Debug>>:-U_FORTIFY_SOURCE> $<$<NOT:$<CONFIG:Debug>>:-D_FORTIFY_SOURCE=2>)
endif()
