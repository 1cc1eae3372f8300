"""The plain loops of the bench in vectorised NumPy, float64, on one thread.

Reads one JSON object from standard input: the task, the problem or the box, and how long it may take. Writes one JSON
object with the rate of each measured round and what was found, so that it can be held against the other loops.
"""

import json
import sys
import time

import numpy as np

# Elements of a vector: the fastest of these on this machine is used, so that NumPy is seen at its best.
CHUNKS = (65_536, 131_072, 262_144)


def overdrive(drive, k, lam, vdd, total, rs):
    """VGS - VT of saturated stages; NaN deep in the ohmic region. Arrays that broadcast, drive above zero."""
    x = 4 * k * rs * drive
    x += 1
    np.sqrt(x, out=x)
    x += 1
    np.divide(2 * drive, x, out=x)
    if lam == 0:
        return x
    x[k * x * x * total >= vdd] = np.nan
    a = k * (1 + lam * vdd)
    b = lam * k * total
    slope = a * rs
    for _ in range(4):
        d = x * x
        d *= b
        d += 1
        t = slope * x
        t /= d
        f = t * x
        f += x
        f -= drive
        t /= d
        t *= 2
        t += 1
        f /= t
        x -= f
    return x


def current(x, k, lam, vdd, total):
    """ID of saturated stages from their VGS - VT."""
    squares = x * x
    squares *= k
    if lam == 0:
        return squares
    d = squares * (lam * total)
    d += 1
    squares *= 1 + lam * vdd
    squares /= d
    return squares


def edge_current(intercept, g, k, lam):
    """The current at which each a.c. line meets the edge of saturation."""
    v = (4 * k) * intercept
    v += g * g
    np.sqrt(v, out=v)
    v += g
    np.divide(2 * intercept, v, out=v)
    if lam > 0:
        for _ in range(4):
            f = k * v * v * (1 + lam * v)
            f += v * g
            f -= intercept
            t = (3 * lam) * v
            t += 2
            t *= v
            t *= k
            t += g
            f /= t
            v -= f
    return k * v * v * (1 + lam * v) if lam > 0 else k * v * v


class Grid:
    """Every RD with every RS, or a slice of them, with what depends on nothing else."""

    def __init__(self, rd, rs, load):
        self.rd = rd
        self.rs = rs
        self.total = rd + rs
        self.rl = rd * load / (rd + load)
        self.g = 1 / self.rl

    def part(self, index):
        slim = object.__new__(Grid)
        slim.rd, slim.rs, slim.total = self.rd[index], self.rs[index], self.total[index]
        slim.rl, slim.g = self.rl[index], self.g[index]
        return slim


def room_toward_cutoff(drive, k, lam, rail, grid):
    with np.errstate(invalid="ignore"):
        x = overdrive(drive, k, lam, rail, grid.total, grid.rs)
        i = current(x, k, lam, rail, grid.total)
        return np.where(rail - i * grid.total >= x, i * grid.rl, 0)


def room_toward_ohmic(drive, k, lam, rail, grid):
    with np.errstate(invalid="ignore"):
        x = overdrive(drive, k, lam, rail, grid.total, grid.rs)
        i = current(x, k, lam, rail, grid.total)
        vds = rail - i * grid.total
        room = edge_current(i + vds * grid.g, grid.g, k, lam)
        room -= i
        room *= grid.rl
        return np.where(vds >= x, room, 0)


def corners(problem, device, grid):
    """(drive of the pairs, room) of each corner: toward cutoff, then toward the ohmic region."""
    t, tr, load = problem["resistorTolerance"], problem["railTolerance"], problem["load"]
    lam = device["lambda"]

    def scaled(rd_end, rs_end):
        return Grid(grid.rd * (1 + rd_end * t), grid.rs * (1 + rs_end * t), load)

    def corner(side, rail_end, r1_end, vt, k, corner_grid):
        rail = problem["vdd"] * (1 + rail_end * tr)

        def drive_of(r1, r2):
            return rail / (1 + (r1 * (1 + r1_end * t)) / (r2 * (1 - r1_end * t))) - vt

        def room(drive, at):
            # Without drive nothing conducts; a figure that is never used stands in for the arithmetic's sake.
            here = corner_grid if at is None else corner_grid.part(at)
            return np.where(drive > 0, side(np.maximum(drive, 1e-9), k, lam, rail, here), 0)

        return drive_of, room

    grids = {(rd, rs): scaled(rd, rs) for rd in (1, -1) for rs in (1, -1)}
    for rd in (1, -1) if lam > 0 else (-1,):
        yield corner(room_toward_cutoff, -1, 1, device["vtMax"], device["kMin"], grids[rd, 1])
    for rail in (1, -1):
        for rd in (1, -1):
            for rs in (-1, 1):
                for k in (device["kMax"], device["kMin"]):
                    yield corner(room_toward_ohmic, rail, -1, device["vtMin"], k, grids[rd, rs])


class Centred:
    """Least centring error in whole per cent, then the greatest assured swing, of each part."""

    def __init__(self, problem):
        self.problem = problem

    def start(self, device, grids):
        return [(grid, list(corners(self.problem, device, grid))) for grid in grids]

    def run(self, device, prepared, r1, r2, best):
        k, lam, vdd = device["k"], device["lambda"], self.problem["vdd"]
        drive = vdd / (1 + r1 / r2) - device["vt"]
        alive = drive > 0
        if not alive.any():
            return
        r1, r2, drive = r1[alive], r2[alive], drive[alive][:, None]
        for grid, box in prepared:
            with np.errstate(invalid="ignore"):
                x = overdrive(drive, k, lam, vdd, grid.total, grid.rs)
                i = current(x, k, lam, vdd, grid.total)
                vds = i * grid.total
                np.subtract(vdd, vds, out=vds)
                flat = np.flatnonzero(vds >= x)
            if flat.size == 0:
                continue
            column = flat % grid.rd.size
            i, vds, g = i.ravel()[flat], vds.ravel()[flat], grid.g[column]
            vds *= g
            vds += i
            down = edge_current(vds, g, k, lam)
            # In currents: the a.c. load drops out of the ratio.
            bucket = np.floor(100 * np.abs(down - 2 * i) / down)
            least = bucket.min()
            if least > best[0]:
                continue
            chosen = np.flatnonzero(bucket == least)
            pairs, column = flat[chosen] // grid.rd.size, column[chosen]
            swing = np.full(chosen.size, np.inf)
            for drive_of, room in box:
                np.minimum(swing, room(drive_of(r1[pairs], r2[pairs]), column), out=swing)
            greatest = float(np.rint(swing.max() * 1e9))
            if least < best[0] or greatest > best[1]:
                best[0], best[1] = float(least), greatest


class Assured:
    """The greatest assured swing of each part, from all corners of every combination."""

    def __init__(self, problem, give_up):
        self.problem = problem
        self.give_up = give_up

    def start(self, device, grids):
        return [(grid, list(corners(self.problem, device, grid))) for grid in grids]

    def run(self, device, prepared, r1, r2, best):
        for grid, box in prepared:
            greatest = self.survivors(grid, box, r1, r2) if self.give_up else self.whole(grid, box, r1, r2)
            if greatest > best[1]:
                best[1] = greatest

    def whole(self, grid, box, r1, r2):
        swing = np.full((r1.size, grid.rd.size), np.inf)
        for drive_of, room in box:
            drive = drive_of(r1, r2)
            alive = drive > 0
            swing[~alive] = 0
            if alive.any():
                swing[alive] = np.minimum(swing[alive], room(drive[alive][:, None], None))
        return float(np.rint(swing.max() * 1e9))

    def survivors(self, grid, box, r1, r2):
        """The same, with combinations left out after the first corner that gives them no room."""
        drive_of, room = box[0]
        swing = room(drive_of(r1, r2)[:, None], None).ravel()
        flat = np.flatnonzero(swing > 0)
        swing, pairs, column = swing[flat], flat // grid.rd.size, flat % grid.rd.size
        for drive_of, room in box[1:]:
            if swing.size == 0:
                return 0.0
            swing = np.minimum(swing, room(drive_of(r1, r2)[pairs], column))
            kept = np.flatnonzero(swing > 0)
            if kept.size < 0.75 * swing.size:
                swing, pairs, column = swing[kept], pairs[kept], column[kept]
        return float(np.rint(swing.max(initial=0) * 1e9))


def run_search(task):
    problem, devices = task["problem"], task["devices"]
    divider, drain, source = (np.array(problem[name]) for name in ("divider", "drain", "source"))
    loop = Centred(problem) if task["objective"] == "centred" else Assured(problem, task["giveUp"])
    rd, rs = (axis.ravel() for axis in np.meshgrid(drain, source, indexing="ij"))
    bests = [[np.inf, -1.0] for _ in devices]

    def prepare(chunk):
        grids = [
            Grid(*slices, problem["load"])
            for slices in zip(*(np.array_split(axis, -(-rd.size // chunk)) for axis in (rd, rs)))
        ]
        return [loop.start(device, grids) for device in devices], max(1, chunk // rd.size)

    if task["whole"]:
        r1, r2 = (axis.ravel() for axis in np.meshgrid(divider, divider, indexing="ij"))
        prepared, _ = prepare(CHUNKS[0])
        for device, mine, best in zip(devices, prepared, bests):
            loop.run(device, mine, r1, r2, best)
        return {"rates": [], "bests": [[best[0] if best[0] < np.inf else None, best[1]] for best in bests]}

    random = np.random.default_rng(task["seed"])

    turn = 0

    def rate(prepared, pairs):
        # Some of the parts each time, spread over their order; all come up as the rounds go on.
        nonlocal turn
        step = max(1, len(devices) * pairs * rd.size // task["roundSize"])
        solved, started = 0, time.perf_counter()
        for at in range(turn % step, len(devices), step):
            r1, r2 = random.choice(divider, pairs), random.choice(divider, pairs)
            loop.run(devices[at], prepared[at], r1, r2, bests[at])
            solved += pairs * rd.size
        turn += 1
        return solved / (time.perf_counter() - started)

    return {"rates": measure(rate, prepare, task["seconds"])}


def measure(rate, prepare, seconds):
    """Rates of rounds with the size of vector that does best; the rounds that find it are not among them."""
    until = time.perf_counter() + seconds
    tried = [(rate(*prepare(chunk)), chunk) for chunk in CHUNKS]
    prepared = prepare(max(tried)[1])
    rates = []
    while len(rates) < 5 or (len(rates) < 21 and time.perf_counter() < until):
        rates.append(rate(*prepared))
    return rates


def normal_within(random, count, low, high):
    """Normal around the middle of a range that is six standard deviations wide, truncated to it."""
    draws = random.standard_normal(count)
    while (outside := np.flatnonzero(np.abs(draws) > 3)).size:
        draws[outside] = random.standard_normal(outside.size)
    draws *= (high - low) / 6
    draws += (low + high) / 2
    return draws


def simulate(random, count, box, peak):
    """How many of so many random builds saturate and swing as far as asked both ways."""
    device, stage, t = box["device"], box["stage"], box["tolerance"]["resistors"]
    lam = device["lambda"]

    def around(nominal, tolerance):
        draws = random.random(count)
        draws *= 2 * nominal * tolerance
        draws += nominal * (1 - tolerance)
        return draws

    vt = normal_within(random, count, device["vtMin"], device["vtMax"])
    k = normal_within(random, count, device["kMin"], device["kMax"])
    vdd = around(stage["vdd"], box["tolerance"]["rail"])
    r1, r2, rd, rs = (around(stage[name], t) for name in ("r1", "r2", "rd", "rs"))
    drive = vdd * r2 / (r1 + r2) - vt
    total = rd + rs
    rl = rd * stage["rl"] / (rd + stage["rl"])
    with np.errstate(invalid="ignore"):
        x = overdrive(drive, k, lam, vdd, total, rs)
        i = current(x, k, lam, vdd, total)
        vds = vdd - i * total
        # No root is needed: the edge lies above the a.c. line at the point of the line that is the swing away.
        v = vds - peak
        passed = (drive > 0) & (vds >= x) & (i * rl >= peak) & (v >= 0)
        passed &= k * v * v * (1 + lam * v) >= i + peak / rl
    return int(np.count_nonzero(passed))


def run_yield(task):
    random = np.random.default_rng(task["seed"])
    passed = built = 0

    def prepare(chunk):
        return (chunk,)

    def rate(chunk):
        nonlocal passed, built
        rounds = max(1, 1_000_000 // chunk)
        started = time.perf_counter()
        for _ in range(rounds):
            passed += simulate(random, chunk, task["box"], task["peak"])
        built += rounds * chunk
        return rounds * chunk / (time.perf_counter() - started)

    rates = measure(rate, prepare, task["seconds"])
    return {"rates": rates, "fraction": passed / built, "builds": built}


task = json.load(sys.stdin)
json.dump(run_yield(task) if task["task"] == "yield" else run_search(task), sys.stdout)
