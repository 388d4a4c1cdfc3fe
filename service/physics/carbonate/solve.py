"""Solves the alkalinity of a water for its hydrogen ion, each sample frozen by its own criterion; arithmetic only."""

from collections.abc import Callable
from typing import NamedTuple

import numpy as np

from service.physics.declare import Array

CONVERGED = 1.0e-8  # relative step in the hydrogen ion; it is squared by that very step, so far under 1e-10 in pH
ITERATIONS = 100  # far more than any sample of sea or lake needs; what is not solved then is no number
LARGEST_STEP = 1.8  # in ln H, where the rational stand-in for exp is still near it
SURELY = 0.5  # a step that does not halve the mismatch is replaced by a bisection

Mismatch = Callable[[Array], tuple[Array, Array]]  # of the hydrogen ion: alkalinity less what is wanted, and buffer


class Acids(NamedTuple):
    """The acids other than carbonic, in moles per kilogram, constants on the total scale but that of bisulphate."""

    boric_acid_constant: Array
    boron: Array
    water_ion_product: Array
    bisulphate_constant: Array
    sulphate: Array
    hydrogen_fluoride_constant: Array
    fluoride: Array
    phosphoric_acid_constant: Array
    dihydrogen_phosphate_constant: Array
    hydrogen_phosphate_constant: Array
    silicic_acid_constant: Array
    phosphate: Array
    silicate: Array

    @property
    def total_over_free(self) -> Array:
        """Return the hydrogen ion on the total scale over the one on the free scale."""
        return 1.0 + self.sulphate / self.bisulphate_constant

    @property
    def most(self) -> Array:
        """Return what the weak acids can add to the alkalinity at most."""
        return self.boron + 2.0 * self.phosphate + self.silicate

    @property
    def least(self) -> Array:
        """Return what they can take from it at most."""
        return self.sulphate + self.fluoride + self.phosphate

    def alkalinity(self, hydrogen: Array) -> tuple[Array, Array]:
        """Return their alkalinity, and how much it falls over the relative rise of the hydrogen ion.

        Phosphate and silicate are left out where a block has none of them: adding nothing changes no number.
        """
        free = hydrogen / self.total_over_free
        to_boric = 1.0 / (hydrogen + self.boric_acid_constant)
        borate = self.boron * self.boric_acid_constant * to_boric
        hydroxide = self.water_ion_product / hydrogen
        to_bisulphate = 1.0 / (free + self.bisulphate_constant)
        bisulphate = self.sulphate * free * to_bisulphate
        to_fluoride = 1.0 / (hydrogen + self.hydrogen_fluoride_constant)
        fluoride = self.fluoride * hydrogen * to_fluoride
        total = borate + hydroxide - free - bisulphate - fluoride
        buffer = (
            borate * hydrogen * to_boric
            + hydroxide
            + free
            + bisulphate * self.bisulphate_constant * to_bisulphate
            + fluoride * self.hydrogen_fluoride_constant * to_fluoride
        )
        if self.phosphate.any():
            more, of_phosphate = self._phosphate(hydrogen)
            total, buffer = total + more, buffer + of_phosphate
        if self.silicate.any():
            to_silicic = 1.0 / (hydrogen + self.silicic_acid_constant)
            more = self.silicate * self.silicic_acid_constant * to_silicic
            total, buffer = total + more, buffer + more * hydrogen * to_silicic
        return total, buffer

    def _phosphate(self, hydrogen: Array) -> tuple[Array, Array]:
        """Return HPO4 + 2 PO4 - H3PO4, and its buffer: the variance of the protons bound."""
        K12 = self.phosphoric_acid_constant * self.dihydrogen_phosphate_constant
        square_of_hydrogen = hydrogen * hydrogen
        none, one = square_of_hydrogen * hydrogen, square_of_hydrogen * self.phosphoric_acid_constant
        two, three = hydrogen * K12, K12 * self.hydrogen_phosphate_constant
        of_all = 1.0 / (none + one + two + three)
        mean = (two + 2.0 * three - none) * of_all
        square = (two + 4.0 * three + none) * of_all
        return self.phosphate * mean, self.phosphate * (square - mean * mean)


def hydrogen_by_carbon(alkalinity: Array, carbon: Array, K1: Array, K2: Array, acids: Acids) -> Array:
    """Return the hydrogen ion of a water of known alkalinity and total carbon.

    Parameters
    ----------
    alkalinity, carbon : (...) array
        [mol kg-1]
    K1, K2 : (...) array
        Of carbonic acid. [mol kg-1]
    acids : Acids
        All others.

    Returns
    -------
    (...) array
        Total scale; there is one root and one only for any alkalinity. [mol kg-1]
    """
    K12 = K1 * K2

    def mismatch(hydrogen: Array) -> tuple[Array, Array]:
        per_carbon = carbon / ((hydrogen + K1) * hydrogen + K12)
        others, buffer = acids.alkalinity(hydrogen)
        of_carbonate = per_carbon * (hydrogen * K1 + 2.0 * K12)
        spread = hydrogen * ((hydrogen * hydrogen + K12) * K1 + 4.0 * K12 * hydrogen)
        per_square = per_carbon / ((hydrogen + K1) * hydrogen + K12)
        return of_carbonate + others - alkalinity, buffer + spread * per_square

    low = _of_strong(acids, acids.water_ion_product, alkalinity + acids.least)
    high = _of_strong(acids, acids.water_ion_product, alkalinity - acids.most - 2.0 * carbon)
    share = _carbonate_alkalinity(alkalinity, acids) / carbon
    share = np.minimum(np.maximum(share, 1.0e-3), 1.999)  # of carbonate alkalinity in carbon, between 0 and 2
    linear = (1.0 - share) * K1
    first = (linear + np.sqrt(linear * linear + 4.0 * share * (2.0 - share) * K12)) / (2.0 * share)
    return _root(mismatch, low, high, first)


def hydrogen_by_carbon_dioxide(alkalinity: Array, dioxide: Array, K1: Array, K2: Array, acids: Acids) -> Array:
    """Return the hydrogen ion of a water of known alkalinity and dissolved carbon dioxide.

    Parameters
    ----------
    alkalinity, dioxide : (...) array
        [mol kg-1]
    K1, K2 : (...) array
        Of carbonic acid. [mol kg-1]
    acids : Acids
        All others.

    Returns
    -------
    (...) array
        Total scale; there is one root and one only for any alkalinity. [mol kg-1]
    """
    single, double = dioxide * K1, 2.0 * dioxide * K1 * K2

    def mismatch(hydrogen: Array) -> tuple[Array, Array]:
        inverse = 1.0 / hydrogen
        bicarbonate, carbonate = single * inverse, double * inverse * inverse
        others, buffer = acids.alkalinity(hydrogen)
        return bicarbonate + carbonate + others - alkalinity, bicarbonate + 2.0 * carbonate + buffer

    strong = acids.water_ion_product + single
    wanted, ratio = _carbonate_alkalinity(alkalinity, acids), acids.total_over_free
    without_carbonate = _of_strong(acids, strong, wanted)
    with_carbonate = (strong + np.sqrt(strong * strong + 4.0 * double * wanted)) / (2.0 * wanted)
    first = np.where(wanted > without_carbonate, with_carbonate, without_carbonate)
    low = _of_strong(acids, strong, alkalinity + acids.least)
    # Above the sum of these three each of three parts of the mismatch is outweighed by a third of the hydrogen ion.
    excess = np.maximum(acids.most - alkalinity, 0.0)
    high = np.sqrt(3.0 * ratio * strong) + np.cbrt(3.0 * ratio * double) + 3.0 * ratio * excess
    return _root(mismatch, low, high, first)


def _carbonate_alkalinity(alkalinity: Array, acids: Acids) -> Array:
    """Return the alkalinity without borate as it is at a pH of 8, for a first guess."""
    return alkalinity - acids.boron * acids.boric_acid_constant / (acids.boric_acid_constant + 1.0e-8)


def _of_strong(acids: Acids, strong: Array, alkalinity: Array) -> Array:
    """Return the hydrogen ion at which ``strong / H - H / total_over_free`` is an alkalinity, without cancellation."""
    ratio = acids.total_over_free
    scaled = np.abs(alkalinity) * ratio
    root = 0.5 * (scaled + np.sqrt(scaled * scaled + 4.0 * strong * ratio))
    return np.where(alkalinity > 0.0, strong * ratio / root, root)


def _root(mismatch: Mismatch, low: Array, high: Array, first: Array) -> Array:
    """Return the root of a mismatch that falls with the hydrogen ion, between two bounds; NaN where it is not found.

    Newton's method in ln H within a shrinking bracket, as Munhoven (2013, doi:10.5194/gmd-6-1367-2013) solves it, with
    a rational function in the place of exp: plus, minus, times, divide and square root are exact to the last bit
    everywhere, and a sample stops by its own criterion, so that no block or slice changes a number.
    """
    low, high = low * (1.0 - 1.0e-9), high * (1.0 + 1.0e-9)  # room for rounding at the bounds themselves
    hydrogen = np.where((first > low) & (first < high), first, np.sqrt(low * high))
    best = np.full_like(hydrogen, np.inf)
    active = hydrogen > 0.0
    for _ in range(ITERATIONS):
        over, buffer = mismatch(hydrogen)
        low, high = np.where(over > 0.0, hydrogen, low), np.where(over < 0.0, hydrogen, high)
        step = over / buffer
        limited = np.minimum(np.maximum(step, -LARGEST_STEP), LARGEST_STEP)
        newton = hydrogen * ((2.0 + limited) / (2.0 - limited))
        size, near = np.abs(over), np.abs(step) < CONVERGED
        safe = near | ((newton > low) & (newton < high) & (size <= SURELY * best))
        best = np.minimum(size, best)
        following = np.where(safe, newton, np.sqrt(low * high))
        hydrogen = np.where(active, following, hydrogen)
        active &= ~near
        if not active.any():
            return hydrogen
    return np.where(active, np.nan, hydrogen)
