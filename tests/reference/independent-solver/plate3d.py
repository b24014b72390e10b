"""Finite-volume model of heat conduction in a rectangular plate, three-dimensional and steady.

Reads a JSON array of cases on standard input and writes a JSON array of answers. SI units; temperatures are excesses over the
coolant [K]. A case:

    {"lx": m, "ly": m, "t": m, "kxy": W/(m K), "kz": W/(m K), "hNear": W/(m2 K), "hFar": W/(m2 K),
     "sources": [{"x0": m, "y0": m, "lx": m, "ly": m, "heat": W}, ...]}

Each source puts an even flux into the near side (z = 0); the edges are adiabatic; both sides give heat to a coolant at 0. The
cells are equal in the plane and grow away from the near side through the thickness. The equations are assembled as a sparse
matrix and solved by conjugate gradients; the preconditioner solves nearly the same matrix by cosine transforms in the plane
and one tridiagonal system for each pair of waves, so that few steps are needed. Answers are taken only when the residual of the
sparse matrix itself is small.
"""

import json
import sys

import numpy as np
from scipy.fft import dctn, idctn
from scipy.sparse import diags, identity, kron
from scipy.sparse.linalg import LinearOperator, cg

CELLS_PER_SOURCE = 40
CELLS_AT_MOST = 1_200_000
CELLS_THROUGH = 16


def overlaps(edges, low, high):
    """Length of each cell that lies between low and high."""
    return np.clip(np.minimum(edges[1:], high) - np.maximum(edges[:-1], low), 0, None)


def layers(thickness, first_at_most):
    """Thicknesses of the cells from the near side: equal where that is fine enough, else growing by a constant ratio."""
    n = 2 * CELLS_THROUGH
    if thickness <= n * first_at_most:
        n = max(CELLS_THROUGH, int(np.ceil(thickness / first_at_most)))
        return np.full(n, thickness / n)
    low, high = 1.0 + 1e-9, 3.0
    for _ in range(100):
        ratio = (low + high) / 2
        total = first_at_most * (ratio**n - 1) / (ratio - 1)
        low, high = (ratio, high) if total < thickness else (low, ratio)
    sizes = ratio ** np.arange(n)
    return sizes * thickness / sizes.sum()


def plane_counts(case, through):
    """Numbers of cells in both directions: so many per source side, fewer where that would be too many."""
    shortest = min(min(s["lx"], s["ly"]) for s in case["sources"])
    size = max(shortest / CELLS_PER_SOURCE, np.sqrt(case["lx"] * case["ly"] * through / CELLS_AT_MOST))
    return [max(12, int(round(case[side] / size))) for side in ("lx", "ly")]


def second_difference(n):
    """Matrix of a row of n cells with unit conductances between neighbours."""
    main = np.full(n, 2.0)
    main[0] = main[-1] = 1.0
    return diags([np.full(n - 1, -1.0), main, np.full(n - 1, -1.0)], [-1, 0, 1])


def solve(case):
    shortest = min(min(s["lx"], s["ly"]) for s in case["sources"])
    dz = layers(case["t"], shortest / CELLS_PER_SOURCE)
    nz = len(dz)
    nx, ny = plane_counts(case, nz)
    dx, dy = case["lx"] / nx, case["ly"] / ny
    area = dx * dy

    # Conductances: through the thickness between cell middles, and from the outer cells to the coolants.
    between = case["kz"] * area / ((dz[:-1] + dz[1:]) / 2)
    far = 1 / (dz[-1] / 2 / (case["kz"] * area) + 1 / (case["hFar"] * area)) if case["hFar"] > 0 else 0.0
    half_near = dz[0] / 2 / (case["kz"] * area)
    film_near = case["hNear"] * area
    near = 1 / (half_near + 1 / film_near) if film_near > 0 else 0.0
    column = np.zeros(nz)
    column[:-1] += between
    column[1:] += between
    column[0] += near
    column[-1] += far
    vertical = diags([-between, column, -between], [-1, 0, 1])
    along_x = diags(case["kxy"] * dz * dy / dx)
    along_y = diags(case["kxy"] * dz * dx / dy)
    eye_x, eye_y = identity(nx), identity(ny)
    matrix = (
        kron(vertical, kron(eye_x, eye_y))
        + kron(along_x, kron(second_difference(nx), eye_y))
        + kron(along_y, kron(eye_x, second_difference(ny)))
    ).tocsr()

    # Even flux of each source, by the share of each cell that it covers. The flux enters at the surface: what the film of the near
    # side takes at once does not reach the cell.
    edges_x = np.linspace(0, case["lx"], nx + 1)
    edges_y = np.linspace(0, case["ly"], ny + 1)
    covers = []
    heat = np.zeros((nx, ny))
    for s in case["sources"]:
        cover = np.outer(
            overlaps(edges_x, s["x0"], s["x0"] + s["lx"]), overlaps(edges_y, s["y0"], s["y0"] + s["ly"])
        ) / area
        covers.append(cover)
        heat += cover * area * s["heat"] / (s["lx"] * s["ly"])
    reaches = 1 / (1 + film_near * half_near)
    right = np.zeros((nz, nx, ny))
    right[0] = heat * reaches

    waves_x = 2 - 2 * np.cos(np.pi * np.arange(nx) / nx)
    waves_y = 2 - 2 * np.cos(np.pi * np.arange(ny) / ny)
    plane = case["kxy"] * (waves_x[:, None] * dy / dx + waves_y[None, :] * dx / dy)

    def by_waves(vector):
        wave = dctn(vector.reshape(nz, nx, ny), axes=(1, 2), norm="ortho")
        diagonal = column[0] + plane * dz[0]
        upper = np.empty((nz, nx, ny))
        for i in range(nz):
            if i > 0:
                upper[i - 1] = -between[i - 1] / diagonal
                diagonal = column[i] + plane * dz[i] + between[i - 1] * upper[i - 1]
                wave[i] += between[i - 1] * wave[i - 1]
            wave[i] /= diagonal
        for i in range(nz - 2, -1, -1):
            wave[i] -= upper[i] * wave[i + 1]
        return idctn(wave, axes=(1, 2), norm="ortho").ravel()

    size = nz * nx * ny
    flat = right.ravel()
    answer, failed = cg(matrix, flat, tol=1e-10, atol=0, maxiter=50, M=LinearOperator((size, size), matvec=by_waves))
    residual = float(np.linalg.norm(matrix @ answer - flat) / np.linalg.norm(flat))
    if failed or not residual < 1e-8:
        raise RuntimeError(f"the plate did not converge: residual {residual}")

    cells = answer.reshape(nz, nx, ny)
    near_side = (cells[0] + heat * half_near) * reaches
    far_flow = far * cells[-1]
    far_side = far_flow / (case["hFar"] * area) if case["hFar"] > 0 else cells[-1]
    out = {
        "sources": [
            {"peak": float(near_side[cover > 0.5].max()), "mean": float((near_side * cover).sum() / cover.sum())}
            for cover in covers
        ],
        "nearMean": float(near_side.mean()),
        "nearPeak": float(near_side.max()),
        "farMean": float(far_side.mean()),
        "farPeak": float(far_side.max()),
        "heatIn": float(heat.sum()),
        "heatOut": float(far_flow.sum() + (film_near * near_side).sum()),
        "cells": [nx, ny, nz],
        "residual": residual,
    }
    return out


if __name__ == "__main__":
    json.dump([solve(case) for case in json.load(sys.stdin)], sys.stdout)
