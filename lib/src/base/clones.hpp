// Marks a function to be compiled for several instruction sets; the loader picks the widest that
// the machine has. Contraction is off (CMakeLists.txt) and the marked loops add nothing across
// lanes but whole numbers, so every version gives the same bits.
#pragma once

#if defined(__x86_64__) && defined(__GNUC__) && !defined(__clang__) && \
    !defined(__SANITIZE_ADDRESS__) && !defined(__SANITIZE_THREAD__)
#define BRINK_CLONES __attribute__((target_clones("arch=x86-64-v4", "arch=x86-64-v3", "default")))
#else
#define BRINK_CLONES
#endif
