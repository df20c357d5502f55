"""Writes options.json: random frames with analysis options and their exact answers, computed apart from the Rust code.

Every member is a chain of pieces: rigid zone, flexible part, rigid zone. Along a piece the state (w, turn, M, T) obeys
four linear equations, which follow from the energy 1/2 int [EI turn'^2 + GA (w' - turn)^2 + N w'^2] dx, N tension:

    w' = (T + GA turn) / (GA + N)    (w' = turn without shear deformation),
    turn' = M / EI                   (0 in a rigid zone),
    M' = -(T - N w'),                T' = 0.

w is the deflection across the member, turn the rotation of its section, M the bending moment, T the force across the
undeformed axis. That N works on the slope w' of the axis is Engesser's assumption. The transfer matrix over a piece is the
exponential of these equations, summed as a power series with 40 digits: no stability function is used and nothing is
divided into elements. End springs of beams are freedoms of their own at the faces of the zones, eliminated exactly; zones
are transfer matrices of rigid pieces (columns) or a kinematic transformation (beams). Frames are put together over absolute
floor sways, joint rises and joint turns.

What follows for the numbers stored: with T the shear, a zone of length a at the foot and b at the head,

    face moment at the foot = joint-centre moment + (T - N turn_foot) a,    at the head = ... + (T - N turn_head) b,
    T h = -(M_foot + M_head) + N x drift.

Column axial stiffness is E A / h over the distance of the joint centres. Gravity acts only as axial force in the columns.
Second order: N in a column = axial force of the lateral answer - gravity from above on its line, repeated until both agree
to 25 digits. The critical load factor multiplies gravity alone: the lowest at which the stiffness matrix is singular.

Guards: a Ritz solution of the same energy with high polynomials in ordinary floating point for every column stiffness
matrix, joint equilibrium of every answer, and positive pivots everywhere (below the lowest critical load).

Run `python3 tests/reference/generate_options.py` from the root of the project; it needs numpy and mpmath. Draws use only
random.random of a seeded generator, which Python keeps stable. Positive: to the right, clockwise, tension, upwards. N and m.
"""

import json
import math
import multiprocessing
import pathlib
import random

import mpmath
import numpy as np

mpmath.mp.dps = 40
MPF = mpmath.mpf
ZERO, ONE = MPF(0), MPF(1)
FRAMES = 48
RIGID, HINGE = None, 0.0


# --- drawing -------------------------------------------------------------------------------------------------------


def draw(number):
    """Frame `number` with its options."""
    rng = random.Random(31_000 + number)

    def uniform(low, high):
        return float(f"{low + (high - low) * rng.random():.4g}")

    def spread(low, high):
        return float(f"{low * math.exp(math.log(high / low) * rng.random()):.5g}")

    bays, storeys = 1 + number % 4, 1 + (number * 5 + number // 12) % 6
    columns, beams = storeys * (bays + 1), storeys * bays
    slender = number % 5 == 4
    frame = {
        "bays": [uniform(3, 10) for _ in range(bays)],
        "storeys": [uniform(2.5, 6) for _ in range(storeys)],
        "modulus": 3.0e10,
        "columns": [[spread(3e-5 if slender else 4e-4, 1e-2), spread(0.02, 0.6)] for _ in range(columns)],
        "beams": [spread(4e-4, 1e-2) for _ in range(beams)],
        "feet": ["fixed", "pinned", [spread(1e6, 1e9) for _ in range(bays + 1)]][number % 3],
        "lateral": [round(uniform(5e3, 6e4)) * (20 if number % 7 == 6 else 1) for _ in range(storeys)],
    }
    shear, springs, zones = (rng.random() < 0.6 for _ in range(3))
    gravity = number // 4 % 3 != 0 or not (shear or springs or zones)
    maybe = lambda share, value: value() if rng.random() < share else None
    frame["shear_modulus"] = 1.2e10 if shear else None
    # Small shear areas, so that shear deformation is felt.
    frame["column_shear_area"] = [maybe(0.8, lambda: spread(0.005, 0.2)) if shear else None for _ in range(columns)]
    frame["beam_shear_area"] = [maybe(0.8, lambda: spread(0.005, 0.2)) if shear else None for _ in range(beams)]

    def end_spring():
        kind = rng.random()
        stiffness = spread(1e6, 1e9)
        return RIGID if kind < 0.25 else HINGE if kind < 0.4 else stiffness

    frame["beam_springs"] = [[end_spring(), end_spring()] if springs else [RIGID, RIGID] for _ in range(beams)]
    zone = lambda high: uniform(0.05, high) if zones and rng.random() < 0.8 else 0.0
    frame["column_zones"] = [[zone(0.5), zone(0.7)] for _ in range(columns)]
    frame["beam_zones"] = [[zone(0.6), zone(0.6)] for _ in range(beams)]
    frame["gravity"] = None
    if gravity:
        # Some lines carry nothing, some much more than others: columns past their own Euler load leaning on the rest.
        line = [spread(0.05, 1) * (0 if rng.random() < 0.15 else 1) for _ in range(bays + 1)]
        if not any(line):
            line[0] = 1.0
        frame["gravity"] = [spread(0.5, 1) * line[index % (bays + 1)] for index in range(columns)]
        unit = float(Model(frame).critical())
        target = [1.4, 2.5, 6.0, 40.0, 1.15, 300.0][int(6 * rng.random())]
        scale = float(f"{unit / target:.3g}")
        frame["gravity"] = [float(f"{share * scale:.6g}") for share in frame["gravity"]]
    return frame


# --- one member ----------------------------------------------------------------------------------------------------


def transfer(length, bending, shear, tension):
    """exp(length x equations) over one piece; `bending` None where rigid, `shear` None without shear deformation."""
    size = bending / length if bending is not None else ONE
    columns = []
    for start in range(4):
        state = [ONE if row == start else ZERO for row in range(4)]
        if start >= 2:
            state[start] = size
        total, term = list(state), list(state)
        for order in range(1, 400):
            term = [entry * length / order for entry in derivative(term, bending, shear, tension)]
            total = [sum_ + entry for sum_, entry in zip(total, term)]
            scaled = abs(term[0]) / length + abs(term[1]) + abs(term[2]) / size + abs(term[3]) * length / size
            if scaled < MPF(10) ** -45 and order > 6:
                break
        else:
            raise AssertionError("the series does not end")
        columns.append([entry / size for entry in total] if start >= 2 else total)
    return np.array(columns, dtype=object).T


def derivative(state, bending, shear, tension):
    _, turn, moment, force = state
    slope = turn if shear is None else (force + shear * turn) / (shear + tension)
    return [slope, ZERO if bending is None else moment / bending, -(force - tension * slope), ZERO]


def piece(length, bending, shear, tension):
    return transfer(length, bending, shear, tension) if length > 0 else np.diag([ONE] * 4)


def ends_matrix(over):
    """Forces (force, moment at the start, force, moment at the end) against movements there, from a transfer matrix."""
    (a, b), (c, d) = over[:2, 2:]
    inverse = np.array([[d, -b], [-c, a]], dtype=object) / (a * d - b * c)
    start = np.concatenate([-inverse @ over[:2, :2], inverse], axis=1)  # (M, T) at the start
    end = np.concatenate([over[2:, :2], np.full((2, 2), ZERO)], axis=1) + over[2:, 2:] @ start
    return np.array([-start[1], -start[0], end[1], end[0]], dtype=object)


def ritz_matrix(length, bending, shear, tension, degree=16):
    """The same matrix of the flexible part by polynomials over the energy, in ordinary floating point."""
    legendre = np.polynomial.legendre
    points, weights = legendre.leggauss(degree + 8)

    def bubbles(count):
        """Legendre sums that vanish at both ends, and their derivatives."""
        rows = []
        for order in range(2, count + 2):
            series = np.zeros(order + 1)
            series[order], series[order - 2] = 1, -1
            rows.append((legendre.legval(points, series), legendre.legval(points, legendre.legder(series))))
        return rows

    half = length / 2
    linear = [((1 - points) / 2, -0.5 + 0 * points), ((1 + points) / 2, 0.5 + 0 * points)]
    turns = linear + bubbles(degree)
    if shear is not None:
        moves = linear + bubbles(degree)
        count = len(moves)
        slope = np.array([row[1] / half for row in moves] + [0 * points] * count)
        turn = np.array([0 * points] * count + [row[0] for row in turns])
        curve = np.array([0 * points] * count + [row[1] / half for row in turns])
        ends, inner = [0, count, 1, count + 1], [*range(2, count), *range(count + 2, 2 * count)]
        weigh = weights * half
        matrix = (curve * weigh * bending) @ curve.T + ((slope - turn) * weigh * shear) @ (slope - turn).T
        matrix += (slope * weigh * tension) @ slope.T
    else:
        # Hermite cubics, and bubbles (1 - x^2)^2 times Legendre polynomials.
        x = points
        cubic = [
            ((2 - 3 * x + x**3) / 4, 6 * x / 4),
            (half * (1 - x - x**2 + x**3) / 4, half * (6 * x - 2) / 4),
            ((2 + 3 * x - x**3) / 4, -6 * x / 4),
            (half * (-1 - x + x**2 + x**3) / 4, half * (6 * x + 2) / 4),
        ]
        slopes = [(-3 + 3 * x**2) / 4, half * (-1 - 2 * x + 3 * x**2) / 4]
        slopes += [(3 - 3 * x**2) / 4, half * (-1 + 2 * x + 3 * x**2) / 4]
        curves = [row[1] for row in cubic]
        square = legendre.poly2leg([1, 0, -2, 0, 1])
        for order in range(degree):
            series = legendre.legmul(square, [0] * order + [1])
            slopes.append(legendre.legval(x, legendre.legder(series)))
            curves.append(legendre.legval(x, legendre.legder(series, 2)))
        slope, curve = np.array(slopes) / half, np.array(curves) / half**2
        ends, inner = [0, 1, 2, 3], [*range(4, 4 + degree)]
        matrix = (curve * weights * half * bending) @ curve.T + (slope * weights * half * tension) @ slope.T
    coupled = matrix[np.ix_(ends, inner)]
    return matrix[np.ix_(ends, ends)] - coupled @ np.linalg.solve(matrix[np.ix_(inner, inner)], coupled.T)


def guard(exact, length, bending, shear, tension):
    """Both matrices against each other, lengths and stiffness scaled out."""
    other = ritz_matrix(*[None if number is None else float(number) for number in (length, bending, shear, tension)])
    scale = np.diag([float(length), 1, float(length), 1])
    exact, other = scale @ exact.astype(float) @ scale, scale @ other @ scale
    worst = np.max(np.abs(exact - other)) / np.max(np.abs(exact))
    assert worst < 1e-9, f"series and polynomials disagree by {worst}"


class Column:
    def __init__(self, length, zones, bending, shear, tension):
        flexible = length - zones[0] - zones[1]
        self.foot_zone = piece(zones[0], None, None, tension)
        self.middle = piece(flexible, bending, shear, tension)
        self.head_zone = piece(zones[1], None, None, tension)
        self.matrix = ends_matrix(self.head_zone @ self.middle @ self.foot_zone)
        self.checked = lambda: guard(ends_matrix(self.middle), flexible, bending, shear, tension)

    def answer(self, moved):
        """Foot, head, foot face and head face moment, shear."""
        forces = self.matrix @ moved
        state = np.array([moved[0], moved[1], -forces[1], -forces[0]], dtype=object)
        foot_face = self.foot_zone @ state
        head_face = self.middle @ foot_face
        return [forces[1], forces[3], -foot_face[2], head_face[2], forces[2]]


class Beam:
    """Freedoms at the joints (w downwards, turn, w, turn); inner ones: the turns of the flexible part's ends."""

    def __init__(self, length, zones, bending, shear, springs):
        own = ends_matrix(piece(length - zones[0] - zones[1], bending, shear, ZERO))
        # (w, turn) at both joints, then both inner turns -> (w, turn) at the ends of the flexible part.
        reach = np.full((4, 6), ZERO)
        reach[0, 0], reach[0, 1], reach[1, 4] = ONE, MPF(zones[0]), ONE
        reach[2, 2], reach[2, 3], reach[3, 5] = ONE, -MPF(zones[1]), ONE
        whole = reach.T @ own @ reach
        tied = np.full((6, 4), ZERO)
        tied[:4, :4] = np.diag([ONE] * 4)
        free = []
        for end, spring in enumerate(springs):
            joint, inner = 1 + 2 * end, 4 + end
            if spring is RIGID:
                tied[inner, joint] = ONE
                continue
            free.append(inner)
            for row, column, sign in [(joint, joint, 1), (inner, inner, 1), (joint, inner, -1), (inner, joint, -1)]:
                whole[row, column] += sign * MPF(spring)
        # Inner turns that are free: whole[free] x movements = 0.
        if free:
            right = -whole[free] @ tied
            tied[free] = small_solve(whole[np.ix_(free, free)], right)
        self.matrix = tied.T @ whole @ tied
        self.faces = own @ reach @ tied

    def answer(self, moved):
        """Left, right, left face and right face moment."""
        forces, faces = self.matrix @ moved, self.faces @ moved
        return [forces[1], forces[3], faces[1], faces[3]]


def small_solve(matrix, right):
    if len(matrix) == 1:
        return right / matrix[0, 0]
    (a, b), (c, d) = matrix
    return np.array([[d, -b], [-c, a]], dtype=object) @ right / (a * d - b * c)


# --- the frame -----------------------------------------------------------------------------------------------------


class Unstable(Exception):
    pass


class Model:
    def __init__(self, drawn):
        self.drawn = drawn
        self.lines, self.storeys = len(drawn["bays"]) + 1, len(drawn["storeys"])
        self.modulus = MPF(drawn["modulus"])
        self.feet_turn = drawn["feet"] != "fixed"
        self.first = self.lines if self.feet_turn else 0
        self.size = self.first + self.storeys * (1 + 2 * self.lines)
        self.beams = [self.beam(index) for index in range(self.storeys * (self.lines - 1))]

    def rigidity(self, kind, index):
        modulus, area = self.drawn["shear_modulus"], self.drawn[f"{kind}_shear_area"][index]
        return None if modulus is None or area is None else MPF(modulus) * MPF(area)

    def beam(self, index):
        drawn, width = self.drawn, MPF(self.drawn["bays"][index % (self.lines - 1)])
        zones = [MPF(zone) for zone in drawn["beam_zones"][index]]
        bending = self.modulus * MPF(drawn["beams"][index])
        return Beam(width, zones, bending, self.rigidity("beam", index), drawn["beam_springs"][index])

    def columns(self, tension):
        drawn = self.drawn
        for index, force in enumerate(tension):
            zones = [MPF(zone) for zone in drawn["column_zones"][index]]
            bending = self.modulus * MPF(drawn["columns"][index][0])
            height = MPF(drawn["storeys"][index // self.lines])
            yield Column(height, zones, bending, self.rigidity("column", index), force)

    def gravity(self):
        """Compression from gravity in every column."""
        drawn, total = self.drawn["gravity"], []
        for index in range(self.storeys * self.lines):
            above = range(index, self.storeys * self.lines, self.lines)
            total.append(sum((MPF(drawn[floor]) for floor in above), ZERO) if drawn else ZERO)
        return total

    # Numbers of the freedoms; None where held.
    def sway(self, level):
        return None if level == 0 else self.first + (level - 1) * (1 + 2 * self.lines)

    def rise(self, level, line):
        return None if level == 0 else self.sway(level) + 1 + 2 * line

    def turn(self, level, line):
        return (line if self.feet_turn else None) if level == 0 else self.sway(level) + 2 + 2 * line

    def column_ends(self, index):
        storey, line = divmod(index, self.lines)
        ends = [self.sway(storey), self.turn(storey, line), self.sway(storey + 1), self.turn(storey + 1, line)]
        return ends, [self.rise(storey, line), self.rise(storey + 1, line)]

    def beam_ends(self, index):
        floor, bay = divmod(index, self.lines - 1)
        level = floor + 1
        return [self.rise(level, bay), self.turn(level, bay), self.rise(level, bay + 1), self.turn(level, bay + 1)]

    def axial(self, index):
        height = MPF(self.drawn["storeys"][index // self.lines])
        return self.modulus * MPF(self.drawn["columns"][index][1]) / height

    def assembled(self, columns):
        matrix = np.full((self.size, self.size), ZERO)

        def add(freedoms, own):
            held = [(row, freedom) for row, freedom in enumerate(freedoms) if freedom is not None]
            for row, freedom in held:
                for column, other in held:
                    matrix[freedom, other] += own[row][column]

        for index, column in enumerate(columns):
            ends, rises = self.column_ends(index)
            add(ends, column.matrix)
            stiffness = self.axial(index)
            add(rises, [[stiffness, -stiffness], [-stiffness, stiffness]])
        for index, beam in enumerate(self.beams):
            add(self.beam_ends(index), DOWN @ beam.matrix @ DOWN)
        if isinstance(self.drawn["feet"], list):
            for line, spring in enumerate(self.drawn["feet"]):
                matrix[line, line] += MPF(spring)
        return matrix

    def solve(self, tension):
        columns = list(self.columns(tension))
        right = np.full(self.size, ZERO)
        for floor, force in enumerate(self.drawn["lateral"]):
            right[self.sway(floor + 1)] = MPF(force)
        return columns, eliminate(self.assembled(columns), right)

    def critical(self):
        """Lowest factor on gravity at which the frame can move without resistance."""
        gravity = self.gravity()
        bounds = []
        for index, force in enumerate(gravity):
            if force > 0:
                bending = self.modulus * MPF(self.drawn["columns"][index][0])
                zones = sum(MPF(zone) for zone in self.drawn["column_zones"][index])
                flexible = MPF(self.drawn["storeys"][index // self.lines]) - zones
                clamped = 4 * mpmath.pi**2 * bending / flexible**2
                rigidity = self.rigidity("column", index)
                bounds.append((clamped if rigidity is None else clamped / (1 + clamped / rigidity)) / force)
        low, high = ZERO, min(bounds) * MPF("0.9999")

        def last_pivot(factor):
            columns = self.columns([-factor * force for force in gravity])
            return eliminate(self.assembled(columns), None)

        # Until only the last pivot is negative at the upper end: from there down to the root it has no jump.
        alone = False
        while not (alone and high < low * MPF("1.02")):
            middle = (low + high) / 2 if low > 0 else high / 4
            negative, last = last_pivot(middle)
            if negative > 0:
                high, alone = middle, negative == 1 and last < 0
            else:
                low = middle
        return root(lambda factor: last_pivot(factor)[1], low, high)


DOWN = np.diag([-ONE, ONE, -ONE, ONE])


def root(function, low, high):
    """The zero of a function that falls from `low` to `high`, by the Illinois form of false position."""
    at_low, at_high = function(low), function(high)
    for _ in range(200):
        step = (low * at_high - high * at_low) / (at_high - at_low)
        value = function(step)
        if abs(high - low) < MPF(10) ** -24 * high or abs(value) < MPF(10) ** -30 * abs(at_low):
            return step
        if value > 0:
            low, at_low, at_high = step, value, at_high / 2
        else:
            high, at_high, at_low = step, value, at_low / 2
    return (low + high) / 2


def eliminate(matrix, right):
    """Solves by elimination without exchange; without a right side, (number of negative pivots, last pivot)."""
    matrix = matrix.copy()
    right_side = None if right is None else right.copy()
    size, negative = len(matrix), 0
    last = [max(column for column in range(size) if column == row or matrix[row, column] != 0) for row in range(size)]
    for row in range(1, size):
        last[row] = max(last[row], last[row - 1])
    for pivot in range(size):
        end = last[pivot] + 1
        diagonal = matrix[pivot, pivot]
        if diagonal <= 0:
            negative += 1
            if right_side is not None:
                raise Unstable
        for row in range(pivot + 1, end):
            if matrix[row, pivot] != 0:
                share = matrix[row, pivot] / diagonal
                matrix[row, pivot:end] -= share * matrix[pivot, pivot:end]
                if right_side is not None:
                    right_side[row] -= share * right_side[pivot]
    if right_side is None:
        return negative, matrix[-1, -1]
    for row in range(size - 1, -1, -1):
        end = last[row] + 1
        above = matrix[row, row + 1 : end] @ right_side[row + 1 : end] if end > row + 1 else ZERO
        right_side[row] = (right_side[row] - above) / matrix[row, row]
    return right_side


def answer(model, tension):
    """Everything the file stores, and the column axial forces of the lateral answer in full."""
    columns, moved = model.solve(tension)
    value = lambda freedoms: np.array([ZERO if freedom is None else moved[freedom] for freedom in freedoms])
    stored_columns, axial, stored_beams = [], [], []
    for index, column in enumerate(columns):
        ends, rises = model.column_ends(index)
        below, above = value(rises)
        axial.append(model.axial(index) * (above - below))
        stored_columns.append(column.answer(value(ends)) + [axial[-1]])
    for index, beam in enumerate(model.beams):
        stored_beams.append(beam.answer(DOWN @ value(model.beam_ends(index))))
    sway = [ZERO] + [moved[model.sway(level + 1)] for level in range(model.storeys)]
    drifts = [above - below for below, above in zip(sway, sway[1:])]
    balanced(model, tension, stored_columns, stored_beams, drifts)
    return columns, axial, {
        "columns": [[float(number) for number in column] for column in stored_columns],
        "beams": [[float(number) for number in beam] for beam in stored_beams],
        "drifts": [float(drift) for drift in drifts],
    }


def balanced(model, tension, columns, beams, drifts):
    """Joints, storeys and members in the moved position, from the numbers alone."""
    tiny = MPF(10) ** -24 * max(abs(column[0]) + abs(column[1]) for column in columns)
    lines, bays = model.lines, model.lines - 1
    for index, column in enumerate(columns):
        storey, line = divmod(index, lines)
        height = MPF(model.drawn["storeys"][storey])
        assert abs(column[4] * height + column[0] + column[1] - tension[index] * drifts[storey]) < tiny
        over = columns[index + lines] if storey + 1 < model.storeys else [ZERO] * 6
        moment, lift = column[1] + over[0], over[5] - column[5]
        for bay in [line - 1, line]:
            if 0 <= bay < bays:
                beam = beams[storey * bays + bay]
                moment += beam[0] if bay == line else beam[1]
                lift += (1 if bay == line else -1) * (beam[0] + beam[1]) / MPF(model.drawn["bays"][bay])
        assert abs(moment) < tiny and abs(lift) < tiny, (float(moment), float(lift))
    for storey in range(model.storeys):
        shear = sum(column[4] for column in columns[storey * lines : (storey + 1) * lines])
        assert abs(shear - sum(model.drawn["lateral"][storey:])) < tiny


def analyse(drawn):
    model = Model(drawn)
    nothing = [ZERO] * (model.storeys * model.lines)
    columns, _, drawn["first_order"] = answer(model, nothing)
    for column in columns:
        column.checked()
    if drawn["gravity"] is None:
        drawn["second_order"] = None
        return "no gravity"
    gravity = model.gravity()
    tension, rounds = [-force for force in gravity], 0
    while True:
        columns, axial, found = answer(model, tension)
        follows = [force - weight for force, weight in zip(axial, gravity)]
        off = max(abs(a - b) for a, b in zip(follows, tension)) / max(gravity)
        tension, rounds = follows, rounds + 1
        if off < MPF(10) ** -25:
            break
        assert rounds < 200, "axial forces do not settle"
    for column in columns:
        column.checked()
    drawn["second_order"] = found
    drawn["critical_load_factor"] = float(model.critical())
    most = max(a / b for a, b in zip(found["drifts"], drawn["first_order"]["drifts"]))
    return f"critical at {drawn['critical_load_factor']:.3f}, drifts times up to {most:.3f}, {rounds} rounds"


def stored(number):
    drawn = draw(number)
    while True:
        try:
            report = analyse(drawn)
            return drawn, f"frame {number}: {len(drawn['storeys'])} storeys, {len(drawn['bays'])} bays, {report}"
        except Unstable:
            # Axial forces of the lateral load itself were too much.
            drawn["lateral"] = [force / 4 for force in drawn["lateral"]]


def main():
    frames = []
    with multiprocessing.Pool(2) as pool:
        for drawn, report in pool.imap(stored, range(FRAMES)):
            frames.append(drawn)
            print(report, flush=True)
    lines = ",\n".join(json.dumps(frame, separators=(",", ":")) for frame in frames)
    path = pathlib.Path(__file__).with_name("options.json")
    path.write_text(f"[\n{lines}\n]\n", encoding="utf-8", newline="\n")


if __name__ == "__main__":
    main()
