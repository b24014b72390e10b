"""Steady temperatures of network documents by a general-purpose root finder.

Reads a JSON array of network documents (with an id on every link) on standard input; writes a JSON array of
{"temperaturesC": {node: C}, "flowsW": {link: W}, "nearJoints": [link], "closeLaws": [link], "residualW": W}. Devices and grids are not known here.
"""

import json
import sys

import numpy as np
from laws import LAWS, Joints
from scipy.optimize import root

ZERO = 273.15


class Network:
    def __init__(self, document):
        for part in ("grids", "supplies"):
            if document.get(part):
                raise ValueError(f"{part} are not known here")
        self.pressure = document.get("pressurePa", 101325)
        self.links = document["links"]
        self.ids = [node["id"] for node in document["nodes"]]
        if any("source" in node for node in document["nodes"]):
            raise ValueError("sources are not known here")
        place = {name: i for i, name in enumerate(self.ids)}
        self.ends = [(place[link["from"]], place[link["to"]]) for link in self.links]
        self.temperatures = np.array([node.get("fixedC", np.nan) + ZERO for node in document["nodes"]])
        self.heat = np.array([node.get("heatW", 0.0) for node in document["nodes"]])
        self.free = np.flatnonzero(np.isnan(self.temperatures))
        self.temperatures[self.free] = np.nanmean(self.temperatures) + 10

    def flow(self, link, a, b, joints=None):
        return LAWS[link["kind"]](link, a, b, self.pressure, joints or Joints())

    def full(self, unknown):
        temperatures = self.temperatures.copy()
        temperatures[self.free] = unknown
        return temperatures

    def residual(self, unknown):
        """Heat that stays in each free node [W]."""
        t = self.full(unknown)
        stays = self.heat.copy()
        for link, (i, j) in zip(self.links, self.ends):
            q = self.flow(link, t[i], t[j])
            stays[i] -= q
            stays[j] += q
        return stays[self.free]

    def slopes(self, unknown):
        """Jacobian by central differences, link by link."""
        t = self.full(unknown)
        matrix = np.zeros((len(t), len(t)))
        for link, (i, j) in zip(self.links, self.ends):
            # Small against the difference itself: some laws go with a power of it.
            d = max(1e-7, min(1e-3, abs(t[i] - t[j]) * 1e-2))
            by_i = (self.flow(link, t[i] + d, t[j]) - self.flow(link, t[i] - d, t[j])) / (2 * d)
            by_j = (self.flow(link, t[i], t[j] + d) - self.flow(link, t[i], t[j] - d)) / (2 * d)
            matrix[i, i] -= by_i
            matrix[i, j] -= by_j
            matrix[j, i] += by_i
            matrix[j, j] += by_j
        return matrix[np.ix_(self.free, self.free)]

    def approach(self, steps):
        """Fixed-point iteration: each link as the resistance that it is at the last temperatures."""
        t = self.temperatures.copy()
        for step in range(steps):
            matrix = np.zeros((len(t), len(t)))
            for link, (i, j) in zip(self.links, self.ends):
                difference = t[i] - t[j]
                if abs(difference) < 0.01:
                    difference = 0.01 if step % 2 == 0 else -0.01
                conductance = self.flow(link, t[j] + difference, t[j]) / difference
                matrix[i, i] += conductance
                matrix[j, j] += conductance
                matrix[i, j] -= conductance
                matrix[j, i] -= conductance
            fixed = np.setdiff1d(np.arange(len(t)), self.free)
            right = self.heat[self.free] - matrix[np.ix_(self.free, fixed)] @ t[fixed]
            new = np.linalg.solve(matrix[np.ix_(self.free, self.free)], right)
            t[self.free] = np.clip((t[self.free] + new) / 2 if step > 0 else new, 120, 2000)
        return t[self.free]

    def solve(self):
        """Temperatures of the free nodes with the least heat left over: nearly none, unless a law has a step just there."""
        best, least = self.temperatures[self.free], np.inf
        for steps in (12, 60, 300):
            start = self.approach(steps)
            for method in ("hybr", "lm"):
                found = root(self.residual, start, jac=self.slopes, method=method, tol=1e-13)
                left = np.abs(self.residual(found.x)).max()
                if left < least:
                    best, least = found.x, left
                if least < 1e-8:
                    return best
        return best


def answer(document):
    network = Network(document)
    unknown = network.solve() if len(network.free) else np.array([])
    t = network.full(unknown)
    joints = Joints()
    flows = {
        link["id"]: float(network.flow(link, t[i], t[j], joints)) for link, (i, j) in zip(network.links, network.ends)
    }
    residual = network.residual(unknown)
    return {
        "temperaturesC": {name: float(value - ZERO) for name, value in zip(network.ids, t)},
        "flowsW": flows,
        "nearJoints": sorted(joints.links),
        "closeLaws": sorted(joints.close),
        "residualW": float(np.abs(residual).max()) if len(residual) else 0.0,
    }


if __name__ == "__main__":
    json.dump([answer(document) for document in json.load(sys.stdin)], sys.stdout)
