#!/usr/bin/python3
"""Writes steam-states.bin: states of water and steam by an independent implementation.

Needs Debian's package python3-iapws (version 1.5.3). Run with /usr/bin/python3 in this folder.

The file is a row of blocks, each of a fixed number of records; steam-states.ts reads it. A record starts
with its inputs as unsigned 32-bit integers (little endian) and goes on with the outputs as doubles cut to
their leading bytes (rounded): 6 bytes keep 36 bits of the mantissa, 5 bytes 28 bits. SI units throughout.

Inputs are drawn from one fixed sequence of pseudo-random numbers.
"""
import struct
import sys

from iapws import IAPWS95
from iapws.iapws97 import (
    _PSat_T,
    _P23_T,
    _Region1,
    _Region2,
    _Region3,
    _Region4,
    _Region5,
)

PRESSURE_STEP = 0.025  # Pa
TEMPERATURE_STEP = 1e-6  # K
DENSITY_STEP = 1e-6  # kg/m3
PART_STEP = 1e-9

seed = 20260101


def draw():
    """The next number from 0 to 1."""
    global seed
    seed = (seed * 1664525 + 1013904223) % 4294967296
    return seed / 4294967296


def cut(value, size):
    """The leading bytes of a double, rounded."""
    (bits,) = struct.unpack("<Q", struct.pack("<d", value))
    drop = 64 - 8 * size
    bits += 1 << (drop - 1)
    return (bits >> drop).to_bytes(size, "little")


def inputs(*pairs):
    """Inputs as integers, and the values that these stand for."""
    counts = [round(value / step) for value, step in pairs]
    return b"".join(struct.pack("<I", count) for count in counts), [
        count * step for count, (_, step) in zip(counts, pairs)
    ]


def single(head, state):
    """h, s, v with 6 bytes each, cp and w with 5."""
    body = cut(state["h"] * 1e3, 6) + cut(state["s"] * 1e3, 6) + cut(state["v"], 6)
    return head + body + cut(state["cp"] * 1e3, 5) + cut(state["w"], 5)


def region1():
    while True:
        T = 273.15 + 350 * draw()
        low = _PSat_T(T) * 1e6
        p = low + (100e6 - low) * draw() ** 3
        head, (p, T) = inputs((p, PRESSURE_STEP), (T, TEMPERATURE_STEP))
        if p > low * 1.000001 and 273.15 <= T <= 623.15 and p <= 100e6:
            return single(head, _Region1(T, p / 1e6))


def region2():
    while True:
        T = 273.15 + 800 * draw()
        if T <= 623.15:
            high = _PSat_T(T) * 1e6
        elif T <= 863.15:
            high = _P23_T(T) * 1e6
        else:
            high = 100e6
        p = high * draw() ** 3
        head, (p, T) = inputs((p, PRESSURE_STEP), (T, TEMPERATURE_STEP))
        if 10 <= p < high * 0.999999:
            return single(head, _Region2(T, p / 1e6))


def region5():
    while True:
        T = 1073.15 + 1200 * draw()
        p = 50e6 * draw() ** 3
        head, (p, T) = inputs((p, PRESSURE_STEP), (T, TEMPERATURE_STEP))
        if 10 <= p and T > 1073.1501:
            return single(head, _Region5(T, p / 1e6))


def region3():
    while True:
        # clear of the borders, where two regions overlap
        T = 623.16 + 239.98 * draw() ** 2
        rho = 60 + 700 * draw()
        head, (rho, T) = inputs((rho, DENSITY_STEP), (T, TEMPERATURE_STEP))
        state = _Region3(rho, T)
        p = state["P"]
        if not 16.6 < p <= 99.99:
            continue
        if p < _P23_T(T) * 1.001:
            continue
        if T < 647.096:
            # clear of the two-phase zone and on the right side of it
            saturated = _PSat_T(T)
            if rho > 322 and p < saturated * 1.0001:
                continue
            if rho < 322 and p > saturated * 0.9999:
                continue
            # within the zone the equation of state has further branches
            if rho > 322 and _Region3(rho * 1.001, T)["P"] < p:
                continue
            if rho < 322 and _Region3(rho * 0.999, T)["P"] > p:
                continue
        body = cut(p * 1e6, 6) + cut(state["h"] * 1e3, 6) + cut(state["s"] * 1e3, 6)
        return head + body + cut(state["cp"] * 1e3, 5) + cut(state["w"], 5)


def wet():
    while True:
        p = 611.3 + (16.529e6 - 611.3) * draw() ** 4
        head, (p, x) = inputs((p, PRESSURE_STEP), (draw(), PART_STEP))
        if p < 611.22:
            continue
        state = _Region4(p / 1e6, x)
        body = cut(state["T"], 6) + cut(state["h"] * 1e3, 6)
        return head + body + cut(state["s"] * 1e3, 6) + cut(state["v"], 6)


def dense_saturation():
    """Both saturated volumes above 16.529 MPa, which this package takes from backward equations."""
    p = 16.53e6 + 5.53e6 * draw()
    head, (p,) = inputs((p, PRESSURE_STEP))
    liquid = _Region4(p / 1e6, 0)
    steam = _Region4(p / 1e6, 1)
    return head + cut(liquid["T"], 6) + cut(liquid["v"], 6) + cut(steam["v"], 6)


def scientific():
    """IAPWS-95 (R6-95): h, s, v, cp, w at p and T, all over the regions."""
    while True:
        kind = draw()
        if kind < 0.35:
            T = 273.16 + 350 * draw()
            low = _PSat_T(T) * 1e6
            p = low * 1.001 + (100e6 - low) * draw() ** 3
        elif kind < 0.7:
            T = 280 + 790 * draw()
            if T <= 623.15:
                p = _PSat_T(T) * 1e6
            elif T <= 863.15:
                p = _P23_T(T) * 1e6
            else:
                p = 100e6
            p *= 0.999 * draw() ** 2
        elif kind < 0.9:
            T = 630 + 200 * draw()
            p = 24e6 + 76e6 * draw()
        else:
            T = 1074 + 1195 * draw()
            p = 50e6 * draw() ** 2
        head, (p, T) = inputs((p, PRESSURE_STEP), (T, TEMPERATURE_STEP))
        if p < 1000 or p > 100e6:
            continue
        state = IAPWS95(T=T, P=p / 1e6)
        if not state.status or abs(state.P * 1e6 / p - 1) > 1e-9:
            continue
        values = {"h": state.h, "s": state.s, "v": state.v, "cp": state.cp, "w": state.w}
        return single(head, values)


BLOCKS = [
    (region1, 14000),
    (region2, 16000),
    (region5, 4000),
    (region3, 10000),
    (wet, 6500),
    (dense_saturation, 300),
    (scientific, 1500),
]


def main():
    with open("steam-states.bin", "wb") as out:
        for record, count in BLOCKS:
            for i in range(count):
                out.write(record())
            print(record.__name__, count, file=sys.stderr)


main()
