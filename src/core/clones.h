#pragma once
// One copy of a hot function per instruction set; the loader picks the best that the processor has.
// Plain vectorised code without fused multiply-add gives the same bits in every copy. Sanitizers
// cannot follow the loader's choice, so their builds keep the plain copy.

#if defined(__x86_64__) && defined(__GNUC__) && !defined(__clang__) && !defined(SUNFALL_NO_CLONES)
#define SUNFALL_CLONES __attribute__((target_clones("arch=x86-64-v4", "arch=x86-64-v3", "default")))
#else
#define SUNFALL_CLONES
#endif
