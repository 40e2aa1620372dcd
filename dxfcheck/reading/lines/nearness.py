"""Which points lie near which straight pieces, on a sheet of any size: a uniform grid, worked on whole arrays.

A sheet of other parts may hold 60,000 lines round a few linkages, so nothing here loops over lines in Python.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

__all__ = ["ComplexArray", "FloatArray", "IntArray", "near_pairs", "pair_distances"]

ComplexArray = NDArray[np.complex128]
FloatArray = NDArray[np.float64]
IntArray = NDArray[np.int64]

ALL_PAIRS_LIMIT = 40_000
"""Up to so many point-piece pairs it is quicker to measure them all than to sort them into cells."""

REACH_BUCKET = 8.0
"""Points whose reaches lie within this factor share a grid, so that one large ring does not coarsen all cells."""

POINTS_AT_ONCE = 50_000
"""Points looked up at a time, which bounds the memory of the candidate lists."""

_TINY = float(np.finfo(np.float64).tiny)


def near_pairs(
    points: ComplexArray, reaches: FloatArray, starts: ComplexArray, ends: ComplexArray
) -> tuple[IntArray, IntArray]:
    """All pairs of a point and a straight piece no further apart than the point's reach.

    ``points`` (P,), ``reaches`` (P,) lengths, ``starts`` and ``ends`` (S,) of the pieces (equal for a mere point).
    Returns indices (K,) of points and (K,) of pieces, sorted by point, then piece. Cost near-linear in P + S for
    pieces spread over the sheet.
    """
    if points.size == 0 or starts.size == 0:
        empty = np.zeros(0, dtype=np.int64)
        return empty, empty
    if points.size * starts.size <= ALL_PAIRS_LIMIT:
        distance = pair_distances(points[:, None], starts[None, :], ends[None, :])
        which_point, which_piece = np.nonzero(distance <= reaches[:, None])
        return which_point, which_piece
    found = [
        _pairs_of_bucket(chosen, points, reaches, starts, ends)
        for bucket in _buckets(reaches)
        for chosen in np.split(bucket, range(POINTS_AT_ONCE, bucket.size, POINTS_AT_ONCE))
    ]
    which_point = np.concatenate([pair[0] for pair in found])
    which_piece = np.concatenate([pair[1] for pair in found])
    order = np.lexsort((which_piece, which_point))
    return which_point[order], which_piece[order]


def pair_distances(points: ComplexArray, starts: ComplexArray, ends: ComplexArray) -> FloatArray:
    """Distances from points to bounded straight pieces, element by element (arrays of shapes that broadcast)."""
    # Few numpy calls, as most sheets are small and a call costs more than its work; its clip alone as much as the rest.
    along = ends - starts
    towards = along.conj()
    out = points - starts
    square = np.maximum((along * towards).real, _TINY)
    parameter = np.minimum(np.maximum((out * towards).real / square, 0.0), 1.0)
    distances: FloatArray = np.abs(out - parameter * along)
    return distances


def _buckets(reaches: FloatArray) -> list[IntArray]:
    positive = np.maximum(reaches, _TINY)
    level = np.floor(np.log(positive) / np.log(REACH_BUCKET))
    return [np.nonzero(level == each)[0] for each in np.unique(level)]


def _pairs_of_bucket(
    chosen: IntArray, points: ComplexArray, reaches: FloatArray, starts: ComplexArray, ends: ComplexArray
) -> tuple[IntArray, IntArray]:
    reach = float(reaches[chosen].max())
    mean_length = float(np.abs(ends - starts).mean())
    extent = float(np.abs(np.concatenate((starts, ends)) - starts[0]).max())
    # A sample every cell leaves no part of a piece further than half a cell from one: with cells of twice the reach
    # the nearest sample of a piece in reach lies in the point's own cell or in one of its eight neighbours.
    cell = max(2.0 * reach, mean_length, extent * 1e-6)
    if cell == 0.0:
        cell = 1.0
    origin = complex(min(starts.real.min(), ends.real.min()), min(starts.imag.min(), ends.imag.min())) - cell * (1 + 1j)
    keys, pieces = _cells_of_pieces(starts, ends, origin, cell)
    first = _starts_of_runs(keys)
    unique_keys = keys[first]
    counts = np.diff(np.append(first, keys.size))

    column = np.floor((points[chosen].real - origin.real) / cell).astype(np.int64)
    row = np.floor((points[chosen].imag - origin.imag) / cell).astype(np.int64)
    pairs: list[tuple[IntArray, IntArray]] = []
    for d_column in (-1, 0, 1):
        for d_row in (-1, 0, 1):
            wanted = _key(column + d_column, row + d_row)
            place = np.minimum(np.searchsorted(unique_keys, wanted), unique_keys.size - 1)
            hit = np.nonzero(unique_keys[place] == wanted)[0]
            repeats = counts[place[hit]]
            which_point = np.repeat(chosen[hit], repeats)
            offset = np.arange(which_point.size) - np.repeat(np.cumsum(repeats) - repeats, repeats)
            which_piece = pieces[np.repeat(first[place[hit]], repeats) + offset]
            near = pair_distances(points[which_point], starts[which_piece], ends[which_piece]) <= reaches[which_point]
            pairs.append((which_point[near], which_piece[near]))
    which_point = np.concatenate([pair[0] for pair in pairs])
    which_piece = np.concatenate([pair[1] for pair in pairs])
    # A piece with samples in several of the nine cells was found several times.
    once = np.sort(which_point * starts.size + which_piece)
    once = once[_starts_of_runs(once)]
    return once // starts.size, once % starts.size


def _starts_of_runs(values: IntArray) -> IntArray:
    """Where each run of equal values begins in sorted ones; several times as quick as numpy's unique."""
    new = np.ones(values.size, dtype=np.bool_)
    new[1:] = values[1:] != values[:-1]
    return np.nonzero(new)[0]


def _cells_of_pieces(
    starts: ComplexArray, ends: ComplexArray, origin: complex, cell: float
) -> tuple[IntArray, IntArray]:
    """Keys of the cells that samples of each piece fall in, and the piece of each, sorted by key."""
    steps = np.ceil(np.abs(ends - starts) / cell).astype(np.int64)
    pieces = np.repeat(np.arange(starts.size), steps + 1)
    number = np.arange(pieces.size) - np.repeat(np.cumsum(steps + 1) - (steps + 1), steps + 1)
    parameter = number / np.maximum(steps[pieces], 1)
    samples = starts[pieces] + parameter * (ends - starts)[pieces]
    keys = _key(
        np.floor((samples.real - origin.real) / cell).astype(np.int64),
        np.floor((samples.imag - origin.imag) / cell).astype(np.int64),
    )
    order = np.argsort(keys, kind="stable")
    return keys[order], pieces[order]


def _key(column: IntArray, row: IntArray) -> IntArray:
    return column * np.int64(1 << 31) + row
