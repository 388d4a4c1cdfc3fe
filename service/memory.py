"""How the C library hands memory out, so that a process that served a large body once does not keep its size."""

import ctypes

ARENA_MAX = -8  # the name of a setting in mallopt(3) of the GNU C library
ARENAS = 2  # threads share what is free, in place of an arena each
LIBRARY = ctypes.CDLL(None)
IS_GNU = hasattr(LIBRARY, "gnu_get_libc_version")  # elsewhere nothing happens here


def share_what_is_free() -> None:
    """Let the threads of this process, and of those forked from it, use memory that another one has freed."""
    if IS_GNU:
        LIBRARY.mallopt(ARENA_MAX, ARENAS)


def give_back_what_is_free() -> None:
    """Give memory back that is free; it takes a millisecond or two."""
    if IS_GNU:
        LIBRARY.malloc_trim(0)
