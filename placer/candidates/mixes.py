"""The mix of requests that a placement puts on the drives of each pool."""

from dataclasses import dataclass
from functools import cached_property

import numpy as np

from placer.candidates.block import Floats, Ints
from placer.candidates.limits import Date
from placer.physics.mix import Request, residual
from placer.units import PPM


@dataclass(frozen=True)
class Mixes:
    """Moments of requests by volume and hour, and what they leave on each pool."""

    date: Date

    @cached_property
    def moments(self) -> Floats:
        """Numbers [1/s], bytes and their squares (volumes, hours, requests, 3)."""
        reads, writes, read_bytes, write_bytes = np.moveaxis(self.date.loads, -1, 0)
        volumes = self.date.estate.volumes
        random = np.array([v.random_reads / PPM for v in volumes])[:, None]
        all_reads = self._powers(reads, read_bytes)
        parts = [
            all_reads * random[..., None],
            all_reads * (1 - random)[..., None],
            self._powers(writes, write_bytes),
        ]
        return np.stack(parts, axis=2)

    def residuals(self, places: Ints) -> Floats:
        """Return the rest of the request in service [s], (pools, hours)."""
        total = self._total(places)
        pools = self.date.estate.pools
        return np.array([residual(pool, total[i]) for i, pool in enumerate(pools)])

    def joined(self, volume: int, hour: int) -> Floats:
        """Return today's rest in one hour once a volume is in each pool too, (pools,).

        In the pool where it is, a volume counts once.
        """
        pools = self.date.estate.pools
        every = np.arange(len(pools))
        own = self._missed(np.full(len(pools), volume), every)[:, hour]
        own[self.date.home[volume]] = 0.0
        there = self._today[:, hour] + own
        return np.array([residual(pool, there[i]) for i, pool in enumerate(pools)])

    @cached_property
    def _today(self) -> Floats:
        return self._total(self.date.home)

    def _total(self, places: Ints) -> Floats:
        """Return the moments of each pool, (pools, hours, requests, 3)."""
        total = np.zeros((len(self.date.estate.pools), *self.moments.shape[1:]))
        np.add.at(total, places, self._missed(np.arange(len(places)), places))
        return total

    def _missed(self, volumes: Ints, pools: Ints) -> Floats:
        """Return moments less what the cache of the pool's array answers."""
        scaled = self.moments[volumes].copy()
        left = 1 - self.date.hits[volumes, pools]
        scaled[:, :, : Request.WRITE] *= left[:, None, None, None]
        return scaled

    def _powers(self, number: Floats, size: Floats) -> Floats:
        """Return numbers, bytes and squares of bytes (volumes, hours, 3)."""
        mean = np.divide(size, number, out=np.zeros_like(size), where=number > 0)
        square = number * self._mean_square(mean)
        return np.stack([number, size, square], axis=-1)

    def _mean_square(self, mean: Floats) -> Floats:
        """Return the mean square of sizes: two sizes where a large share is known."""
        volumes = self.date.estate.volumes
        share = np.array([v.large_share / PPM for v in volumes])[:, None]
        size = np.array([float(v.large_size) for v in volumes])[:, None]
        known = (share > 0) & (share < 1) & (size > 0)
        safe = np.where(known, share, 0.5)
        large = np.where(known, np.minimum(size, mean / safe), mean)
        small = (mean - safe * large) / (1 - safe)
        mixed: Floats = safe * large**2 + (1 - safe) * small**2
        return np.where(known, mixed, mean**2)
