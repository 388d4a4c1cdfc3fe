"""The blocks of a table as one, for what depends on all of its rows."""

from collections.abc import Iterator

import numpy as np

from service.csv_table import Block


def joined(blocks: Iterator[Block]) -> Iterator[Block]:
    """Yield one block in place of all; nothing is read before it is asked for.

    Parameters
    ----------
    blocks : iterator of Block
        At least one.

    Yields
    ------
    Block
    """
    parts = list(blocks)
    bad: dict[int, str] = {}
    mended: dict[int, tuple[bytes, bytes]] = {}
    unread: dict[int, set[int]] = {}
    start = 0
    for block in parts:
        unread |= {start + row: places for row, places in block.unread.items()}
        bad |= {start + row: reason for row, reason in block.bad.items()}
        mended |= {start + row: ends for row, ends in block.mended.items()}
        start += len(block.lines)
    yield Block(
        parts[0].first_line,
        [line for block in parts for line in block.lines],
        np.concatenate([block.line_numbers for block in parts]),
        [np.concatenate(columns) for columns in zip(*(block.columns for block in parts), strict=True)],
        bad,
        mended,
        unread,
    )
