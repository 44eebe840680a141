#!/usr/bin/env python3
"""Makes the sample readings. All of it is invented; README.md says how.

Usage: python3 sample-data/make_samples.py   (writes beside itself; same bytes every time)

Frame: x east, y north, z up. A set is a Fisher cloud of plane normals about a mean plane. A
scanline meets a plane with probability |t . n|, so each drawn plane is kept with that probability:
the files carry the blind zones that real lines have.
"""

import math
import pathlib
import random

HERE = pathlib.Path(__file__).resolve().parent


def normal(dip, direction):
    """Upward unit normal of a plane, degrees."""
    d, a = math.radians(dip), math.radians(direction)
    return (math.sin(d) * math.sin(a), math.sin(d) * math.cos(a), math.cos(d))


def line_vector(trend, plunge):
    t, p = math.radians(trend), math.radians(plunge)
    return (math.cos(p) * math.sin(t), math.cos(p) * math.cos(t), -math.sin(p))


def dot(a, b):
    return sum(x * y for x, y in zip(a, b))


def cross(a, b):
    return (a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0])


def unit(a):
    length = math.sqrt(dot(a, a))
    return tuple(x / length for x in a)


def fisher(rng, mean, kappa):
    """A direction about `mean` (Fisher distribution, by inversion of its cosine)."""
    u = rng.random()
    cosine = 1.0 + math.log(u + (1.0 - u) * math.exp(-2.0 * kappa)) / kappa
    sine = math.sqrt(max(0.0, 1.0 - cosine * cosine))
    turn = 2.0 * math.pi * rng.random()
    helper = (1.0, 0.0, 0.0) if abs(mean[0]) < 0.9 else (0.0, 1.0, 0.0)
    e1 = unit(cross(mean, helper))
    e2 = cross(mean, e1)
    return tuple(cosine * m + sine * (math.cos(turn) * a + math.sin(turn) * b)
                 for m, a, b in zip(mean, e1, e2))


def anywhere(rng):
    """A direction from the uniform distribution."""
    z = rng.random()
    turn = 2.0 * math.pi * rng.random()
    r = math.sqrt(1.0 - z * z)
    return (r * math.cos(turn), r * math.sin(turn), z)


def reading(n):
    """Dip and dip direction in whole degrees, as a compass is read."""
    if n[2] < 0.0:
        n = tuple(-x for x in n)
    dip = round(math.degrees(math.acos(min(1.0, n[2]))))
    direction = round(math.degrees(math.atan2(n[0], n[1]))) % 360
    return dip, direction if dip > 0 else 0


class Family:
    """A discontinuity set: mean plane, Fisher concentration, share of the rock's joints."""

    def __init__(self, kind, dip, direction, kappa, share, length_m):
        self.kind = kind
        self.mean = normal(dip, direction)
        self.kappa = kappa
        self.share = share
        self.length_m = length_m


def draw(rng, families, stray_share, along):
    """One joint met by a line along the unit vector `along`."""
    while True:
        pick = rng.random()
        family = None
        n = None
        if pick < stray_share:
            n = anywhere(rng)
        else:
            pick = (pick - stray_share) / (1.0 - stray_share)
            for family in families:
                if pick < family.share:
                    break
                pick -= family.share
            n = fisher(rng, family.mean, family.kappa)
        if rng.random() < abs(dot(n, along)):
            return family, n


def length_of(rng, family):
    mean = family.length_m if family else 2.0
    return max(0.3, round(rng.lognormvariate(math.log(mean), 0.5), 1))


def write(path, lines):
    path.write_text("\n".join(lines) + "\n", encoding="utf-8", newline="\n")


def make_quarry():
    rng = random.Random(20417)
    families = [
        Family("joint", 54, 231, 32.0, 0.40, 5.0),
        Family("joint", 87, 128, 26.0, 0.33, 3.5),  # straddles the rim of the net
        Family("bedding", 14, 27, 90.0, 0.27, 12.0),
    ]
    lines = ["# Invented readings; see ../README.md. Azimuths from grid north, lengths in m.",
             "id,traverse,position_m,dip,dip_direction,kind,trace_length_m,termination,note"]
    number = 0
    for name, trend, plunge, count in (("SL1", 118, 1, 64), ("SL2", 210, 3, 58), ("SL3", 165, 62, 58)):
        along = line_vector(trend, plunge)
        position = 0.0
        for _ in range(count):
            number += 1
            position += max(0.02, rng.expovariate(1.0 / 0.42))
            family, n = draw(rng, families, 0.09, along)
            dip, direction = reading(n)
            kind = family.kind if family else "joint"
            termination = rng.choice(["X", "R", "D", "D"])
            note = "clay film" if family is families[0] and rng.random() < 0.1 else ""
            lines.append(f"{number},{name},{position:.2f},{dip},{direction:03d},{kind},"
                         f"{length_of(rng, family)},{termination},{note}")
    write(HERE / "quarry" / "readings.csv", lines)


def strike_of(dip_direction):
    """Strike by the right-hand rule: dip direction = strike + 90."""
    return (dip_direction - 90) % 360


COMPASS = ["N", "NE", "E", "SE", "S", "SW", "W", "NW"]


def quadrant_text(dip, direction):
    """The plane as a bearing with a dip letter, 'N45E 30SE'."""
    strike = strike_of(direction) % 180
    if strike in (0, 90):
        bearing = "NS" if strike == 0 else "EW"
    else:
        bearing = f"N{strike}E" if strike < 90 else f"N{180 - strike}W"
    return f"{bearing} {dip}{COMPASS[round(direction / 45) % 8]}"


def make_road_cut():
    rng = random.Random(88013)
    families = [
        Family("joint", 63, 342, 30.0, 0.38, 4.0),
        Family("joint", 71, 72, 24.0, 0.30, 3.0),
        Family("foliation", 78, 161, 38.0, 0.32, 8.0),
    ]
    declination = 4  # degrees east: magnetic azimuth = grid azimuth - 4
    rows = []
    for name, trend, plunge, count in (("L1", 68, 2, 44), ("L2", 155, 5, 30), ("L3", 68, 2, 48)):
        along = line_vector(trend, plunge)
        position = 0.0
        for _ in range(count):
            position += max(0.05, rng.expovariate(1.0 / 0.6))
            family, n = draw(rng, families, 0.08, along)
            dip, direction = reading(n)
            rows.append((name, position, dip, direction, family.kind if family else "joint",
                         length_of(rng, family)))
    first = ["# Invented readings; see ../README.md. Strikes by the right-hand rule, magnetic.",
             "traverse;position_m;strike;dip;kind;trace_length_m"]
    second = ["# Invented readings; see ../README.md. Bearings and dip quadrants, from grid north.",
              "traverse,position_m,orientation,kind,trace_length_m"]
    for name, position, dip, direction, kind, length in rows:
        if name == "L3":
            second.append(f"{name},{position:.2f},{quadrant_text(dip, direction)},{kind},{length}")
        else:
            strike = (strike_of(direction) - declination) % 360
            first.append(f"{name};{position:.2f};{strike:03d};{dip};{kind};{length}")
    write(HERE / "road-cut" / "readings.csv", first)
    write(HERE / "road-cut" / "quadrants.csv", second)


if __name__ == "__main__":
    make_quarry()
    make_road_cut()
