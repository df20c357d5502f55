"""Writes frames.json: random frames and their exact member forces, computed apart from the Rust code.

Direct stiffness method in its plainest form: a 6x6 matrix for every member in its own axes, turned into the axes of the
frame, added up over three freedoms at every joint. Floors rigid in their own plane, columns of unchanging length and the
feet are imposed by a transformation to the freedoms that are left, so nothing is imitated by a huge number. All sums are
done with 40 digits and rounded once at the end; a second solution in ordinary floating point guards against slips in that.

Run `python3 tests/reference/generate.py` from the root of the project; it needs numpy and mpmath. The result depends on
nothing but this file: the draws use only random.random of a seeded generator, which Python keeps stable.

Axes here: x to the right, y up, rotation and end moments anticlockwise. The file holds the signs of the crate: end moments
clockwise, axial force tension positive, lateral forces and drifts to the right. Units N and m.
"""

import json
import math
import pathlib
import random

import mpmath
import numpy as np

mpmath.mp.dps = 40
MPF = mpmath.mpf
FRAMES = 64


def draw(number):
    """Frame `number`: sizes spread over two orders of magnitude, every kind of feet, odd loads."""
    rng = random.Random(20_000 + number)

    def uniform(low, high):
        return float(f"{low + (high - low) * rng.random():.4g}")

    def spread(low, high):
        return float(f"{low * math.exp(math.log(high / low) * rng.random()):.6g}")

    bays = 1 + number % 6
    storeys = 1 + (number * 5 + number // 12) % 12
    frame = {
        "bays": [uniform(3, 10) for _ in range(bays)],
        "storeys": [uniform(2.5, 6) for _ in range(storeys)],
        "modulus": 3.0e10,
        "columns": [[spread(2e-4, 2e-2), spread(0.01, 1.0)] for _ in range(storeys * (bays + 1))],
        "beams": [spread(2e-4, 2e-2) for _ in range(storeys * bays)],
    }
    kind = number % 3
    springs = [spread(1e6, 1e9) for _ in range(bays + 1)]
    frame["feet"] = ["fixed", "pinned", springs][kind]
    if number % 7 == 3:
        # Beams that carry nothing: a bay left open. One beam of the roof always stays.
        for beam in range(storeys * bays - 1):
            if rng.random() < 0.3:
                frame["beams"][beam] = 0.0
    frame["lateral"] = draw_forces(rng, storeys, uniform, number % 4)
    return frame


def draw_forces(rng, storeys, uniform, kind):
    """Forces from the ground up: all positive (kind 0), else some zero or negative; storey shears always positive."""
    forces, shear = [], 0.0
    for _ in range(storeys):
        force = round(uniform(5e3, 9e4))
        if kind > 0 and shear > 0 and rng.random() < 0.5:
            force = 0 if rng.random() < 0.4 else -round(0.7 * shear * rng.random())
        shear += force
        forces.append(force)
    return forces[::-1]


def member_matrix(modulus, inertia, area, length):
    """The 6x6 stiffness of a straight member in its own axes: x along it, freedoms u, v, turn at each end."""
    flexural = modulus * inertia
    axial = modulus * area / length
    shear, mixed = 12 * flexural / length**3, 6 * flexural / length**2
    near, far = 4 * flexural / length, 2 * flexural / length
    zero = MPF(0)
    return np.array(
        [
            [axial, zero, zero, -axial, zero, zero],
            [zero, shear, mixed, zero, -shear, mixed],
            [zero, mixed, near, zero, -mixed, far],
            [-axial, zero, zero, axial, zero, zero],
            [zero, -shear, -mixed, zero, shear, -mixed],
            [zero, mixed, far, zero, -mixed, near],
        ],
        dtype=object,
    )


def rotation(cosine, sine):
    """Takes joint movements in the axes of the frame to those of a member that points along (cosine, sine)."""
    turn = np.array([[cosine, sine, 0], [-sine, cosine, 0], [0, 0, 1]], dtype=object)
    both = np.zeros((6, 6), dtype=object)
    both[:3, :3] = turn
    both[3:, 3:] = turn
    return both


class Frame:
    """A drawn frame with its joints numbered level by level, the ground being level 0."""

    def __init__(self, drawn, strained):
        self.drawn = drawn
        self.strained = strained
        self.lines = len(drawn["bays"]) + 1
        self.levels = len(drawn["storeys"]) + 1
        self.modulus = MPF(drawn["modulus"])

    def freedoms(self, level, line):
        joint = level * self.lines + line
        return [3 * joint, 3 * joint + 1, 3 * joint + 2]

    def members(self):
        """Each member as (kind, its freedoms, stiffness in its own axes, rotation)."""
        for storey, height in enumerate(self.drawn["storeys"]):
            for line in range(self.lines):
                inertia, area = self.drawn["columns"][storey * self.lines + line]
                area = MPF(area) if self.strained else MPF(0)
                own = member_matrix(self.modulus, MPF(inertia), area, MPF(height))
                ends = self.freedoms(storey, line) + self.freedoms(storey + 1, line)
                yield "column", ends, own, rotation(0, 1)
        for floor in range(1, self.levels):
            for bay, width in enumerate(self.drawn["bays"]):
                inertia = MPF(self.drawn["beams"][(floor - 1) * (self.lines - 1) + bay])
                own = member_matrix(self.modulus, inertia, MPF(0), MPF(width))
                ends = self.freedoms(floor, bay) + self.freedoms(floor, bay + 1)
                yield "beam", ends, own, rotation(1, 0)

    def assembled(self):
        size = 3 * self.levels * self.lines
        matrix = np.full((size, size), MPF(0), dtype=object)
        for _, ends, own, turn in self.members():
            matrix[np.ix_(ends, ends)] += turn.T @ own @ turn
        if isinstance(self.drawn["feet"], list):
            for line, spring in enumerate(self.drawn["feet"]):
                turning = self.freedoms(0, line)[2]
                matrix[turning, turning] += MPF(spring)
        return matrix

    def kept(self):
        """For every freedom that is left, the freedoms of the joints that move with it."""
        groups = []
        if self.drawn["feet"] != "fixed":
            groups += [[self.freedoms(0, line)[2]] for line in range(self.lines)]
        for level in range(1, self.levels):
            joints = [self.freedoms(level, line) for line in range(self.lines)]
            groups.append([joint[0] for joint in joints])
            for joint in joints:
                groups += [[joint[1]], [joint[2]]] if self.strained else [[joint[2]]]
        return groups


def solve(matrix, right):
    """Elimination without pivots, which a positive definite matrix allows; zeros outside the band are skipped."""
    matrix, right = matrix.copy(), right.copy()
    size = len(right)
    last = [max(column for column in range(size) if matrix[row, column] != 0) for row in range(size)]
    for row in range(1, size):
        last[row] = max(last[row], last[row - 1])
    for pivot in range(size):
        end = last[pivot] + 1
        assert matrix[pivot, pivot] > 0, "the frame cannot stand"
        for row in range(pivot + 1, end):
            if matrix[row, pivot] != 0:
                share = matrix[row, pivot] / matrix[pivot, pivot]
                matrix[row, pivot:end] -= share * matrix[pivot, pivot:end]
                right[row] -= share * right[pivot]
    for row in range(size - 1, -1, -1):
        end = last[row] + 1
        right[row] = (right[row] - sum(matrix[row, row + 1 : end] * right[row + 1 : end])) / matrix[row, row]
    return right


def movements(frame):
    """Movement of every freedom of every joint."""
    full = frame.assembled()
    groups = frame.kept()
    turn = np.full((len(full), len(groups)), MPF(0), dtype=object)
    for column, group in enumerate(groups):
        turn[group, column] = MPF(1)
    loads = np.full(len(full), MPF(0), dtype=object)
    for floor, force in enumerate(frame.drawn["lateral"]):
        loads[frame.freedoms(floor + 1, 0)[0]] = MPF(force)
    matrix, right = reduced(full, groups), turn.T @ loads
    answer = solve(matrix, right)
    guard = np.linalg.solve(matrix.astype(float), right.astype(float))
    worst = np.max(np.abs(guard - answer.astype(float))) / np.max(np.abs(guard))
    assert worst < 1e-8, f"40 digits and 16 digits disagree by {worst}"
    return turn @ answer


def reduced(full, groups):
    """Stiffness against the kept freedoms: sums over the joints that move together."""
    tall = np.array([full[group].sum(axis=0) for group in groups], dtype=object)
    return np.array([tall[:, group].sum(axis=1) for group in groups], dtype=object).T


def analyse(drawn, strained):
    frame = Frame(drawn, strained)
    moved = movements(frame)
    vertical = np.full(frame.levels * frame.lines, MPF(0), dtype=object)
    columns, beams = [], []
    for kind, ends, own, turn in frame.members():
        forces = own @ (turn @ moved[ends])
        if kind == "column":
            columns.append([-forces[2], -forces[5], forces[3]])
        else:
            beams.append([-forces[2], -forces[5]])
            vertical[ends[0] // 3] += forces[1]
            vertical[ends[3] // 3] += forces[4]
    carry_down(frame, columns, vertical)
    sway = [moved[frame.freedoms(level, 0)[0]] for level in range(frame.levels)]
    drifts = [above - below for below, above in zip(sway, sway[1:])]
    return {
        "columns": [[float(number) for number in column] for column in columns],
        "beams": [[float(number) for number in beam] for beam in beams],
        "drifts": [float(drift) for drift in drifts],
    }


def carry_down(frame, columns, vertical):
    """Column axial force from what the beams above need to be held by; where axial strain counts, both must agree."""
    largest = max([abs(column[2]) for column in columns] + [MPF(1)])
    for line in range(frame.lines):
        axial = MPF(0)
        for storey in range(frame.levels - 2, -1, -1):
            axial -= vertical[(storey + 1) * frame.lines + line]
            column = columns[storey * frame.lines + line]
            if frame.strained:
                assert abs(column[2] - axial) < MPF(10) ** -25 * largest
            column[2] = axial


def main():
    frames = []
    for number in range(FRAMES):
        drawn = draw(number)
        drawn["inextensible"] = analyse(drawn, strained=False)
        drawn["axial_strain"] = analyse(drawn, strained=True)
        frames.append(drawn)
        print(f"frame {number}: {len(drawn['storeys'])} storeys, {len(drawn['bays'])} bays")
    lines = ",\n".join(json.dumps(frame, separators=(",", ":")) for frame in frames)
    text = f"[\n{lines}\n]\n"
    pathlib.Path(__file__).with_name("frames.json").write_text(text, encoding="utf-8", newline="\n")


if __name__ == "__main__":
    main()
