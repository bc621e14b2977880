"""A second solution of the air split: every unknown at once by a general root finder.

Written from the equations alone. It reads the metal's plain numbers and calls nothing of the
package. Both flow directions, swirlers, static- or total-fed rows, plain and plunged holes.

Unknowns: flow of each row; total pressure and Mach number of each annulus node; static pressure
and velocity of each liner node; static pressure at the dome face; the outer annulus's share of the
dome air where two annuli feed it.
"""

import math

import numpy as np
from scipy.optimize import root

CUTS = 12  # cells between neighbouring rows


def line(profile, x):
    return np.interp(x, profile.station, profile.value)


def twice_at(rows, kinks, end):
    """Nodes with every row there twice, and the pair indices of each row."""
    fixed = sorted({0.0, end, *rows, *kinks})
    nodes, pairs = [], {}
    for number, x in enumerate(fixed):
        if x in rows:
            pairs[x] = len(nodes)
            nodes += [x, x]
        else:
            nodes.append(x)
        if number + 1 < len(fixed):
            nodes += list(np.linspace(x, fixed[number + 1], CUTS + 1)[1:-1])
    return np.array(nodes), pairs


def solve(hardware, inlet, gas=None):
    """Return flows by name, loss, and the largest residual."""
    g, R, T3 = inlet.heat_capacity_ratio, inlet.gas_constant, inlet.temperature
    P3, W3, n_cans = inlet.pressure, inlet.mass_flow, hardware.cans
    cp = g * R / (g - 1)
    rows = hardware.openings
    n = len(rows)
    reverse = hardware.flow == "reverse"
    at_dome = np.array([row.side == "dome" for row in rows])
    shared = reverse and len(hardware.annuli) == 2

    # compressor exit head by its own iteration on the static pressure
    p = P3
    for _ in range(200):
        T = T3 * (p / P3) ** ((g - 1) / g)
        speed = W3 * R * T / (p * hardware.diffuser.inlet_area)
        p = P3 * (1 - speed**2 / (2 * cp * T3)) ** (g / (g - 1))
    P_dump = P3 - hardware.diffuser.loss_coefficient * (P3 - p)

    end = hardware.liner_length
    sides = []
    for passage in hardware.annuli:
        own = [i for i in range(n) if rows[i].side == passage.side]
        kinks = [k for k in passage.area.station if 0 < k < end]
        x, pairs = twice_at({rows[i].station for i in own}, kinks, end)
        before = {i: pairs[rows[i].station] for i in own}
        if reverse:
            x = x[::-1]
            before = {i: x.size - 2 - k for i, k in before.items()}
        sides.append(
            {
                "own": own,
                "x": x,
                "before": before,
                "A": line(passage.area, x) * n_cans,
                "D": line(passage.hydraulic_diameter, x),
                "draw": np.array(
                    [[1.0 if k <= before[i] else 0.0 for i in own] for k in range(x.size)]
                ),
            }
        )
    kinks = [k for k in hardware.liner.area.station if 0 < k < end]
    x, pairs = twice_at({row.station for row in rows}, kinks, end)
    A = line(hardware.liner.area, x) * n_cans
    before = np.array([pairs[row.station] for row in rows])
    into = np.array([[1.0 if k > before[i] else 0.0 for i in range(n)] for k in range(x.size)])
    if gas is None:
        T_gas, R_gas = np.full(x.size, T3), np.full(x.size, R)
        g_gas, fuel = np.full(x.size, g), np.zeros(x.size)
    else:
        T_gas = np.interp(x, gas.station, gas.temperature)
        R_gas = np.interp(x, gas.station, gas.gas_constant)
        g_gas = np.interp(x, gas.station, gas.heat_capacity_ratio)
        fuel = gas.fuel_flow * (np.arange(x.size) > pairs[gas.fuel_station])
    cp_gas = g_gas * R_gas / (g_gas - 1)

    mu = 1.716e-5 * (T3 / 273.15) ** 1.5 * (273.15 + 110.4) / (T3 + 110.4)
    area = np.array([row.count * row.area * n_cans for row in rows])
    rest = np.array([0.825 if row.edge == "plunged" else 0.625 for row in rows])
    hole = np.array([row.edge in ("plain", "plunged") for row in rows])
    static = np.array([row.feed == "static" for row in rows])
    fixed = np.array([given_area(row, a, A[0]) for row, a in zip(rows, area, strict=True)])

    sizes = [n] + [2 * side["x"].size for side in sides] + [2 * x.size + 1, int(shared)]
    cuts = np.cumsum(sizes)[:-1]

    def equations(u):
        parts = np.split(u, cuts)
        W = parts[0] * W3
        out = []
        P_row, p_row, W_up = np.full(n, P_dump), np.full(n, P_dump), np.full(n, np.inf)
        share = parts[-1][0] if shared else 1.0
        fed = []
        for number, (side, values) in enumerate(zip(sides, parts[1:-2], strict=True)):
            P, M = values[: side["x"].size] * P3, values[side["x"].size :]
            W_an = side["draw"] @ W[side["own"]]
            if reverse:
                W_an = W_an + W[at_dome].sum() * (share if number == 0 else 1 - share)
            bracket = 1 + 0.5 * (g - 1) * M**2
            p = P * bracket ** (-g / (g - 1))
            passed = side["A"] * P * math.sqrt(g / (R * T3)) * M
            passed *= bracket ** (-0.5 * (g + 1) / (g - 1))
            out.append((passed - W_an) / W3)
            q = 0.5 * g * p * M**2
            Re = np.maximum(W_an / side["A"] * side["D"] / mu, 100.0)
            f = (1.8 * np.log10(6.9 / Re + (hardware.roughness / side["D"] / 3.7) ** 1.11)) ** -2
            slope = f / side["D"] * q
            drop = 0.5 * np.abs(np.diff(side["x"])) * (slope[1:] + slope[:-1])
            out.append(np.concatenate([[P[0] - P_dump], np.diff(P) + drop]) / P3 * 100)
            at = [side["before"][i] for i in side["own"]]
            P_row[side["own"]], p_row[side["own"]] = P[at], p[at]
            W_up[side["own"]] = W_an[at]
            fed.append(P[-1] - 0.2 * (P[-1] - p[-1]))
        if reverse:
            P_row[at_dome] = p_row[at_dome] = fed[0]
        if shared:
            out.append([(fed[0] - fed[1]) / P3 * 100])
        p_L, U, head = parts[-2][: x.size] * P3, parts[-2][x.size : -1] * 100, parts[-2][-1] * P3
        p_out = p_L[before]
        q_up = np.maximum(P_row - p_row, 1e-12 * P_row)
        K = (P_row - p_out) / q_up
        row_flow = np.array(
            [
                sum(W[j] for j in range(n) if same(rows[i], rows[j]))
                for i in range(n)
            ]
        )  # fmt: skip
        a = row_flow / W_up
        Cd = 2 * rest * (K - 1) / np.sqrt(4 * K**2 - K * (2 - a) ** 2)
        drive = np.where(static, p_row, P_row)
        r = p_out / drive
        V = np.sqrt(2 * cp * T3 * (1 - r ** ((g - 1) / g)))
        rho = drive / (R * T3) * r ** (1 / g)
        law = np.where(hole, Cd * area, fixed) * rho * V
        out.append((W - law) / W3)
        # axial momentum of what comes in
        axial = np.zeros(n)
        for i, row in enumerate(rows):
            if row.edge == "swirler":
                share = math.cos(row.swirler.vane_angle)
                axial[i] = V[i] * share * min(1.0, fixed[i] / (area[i] * share))
            elif row.role == "film":
                lip = row.slot.height * row.slot.length * n_cans
                axial[i] = W[i] / (p_out[i] / (R * T3) * lip)
            elif row.side == "dome":
                axial[i] = V[i]
            elif hole[i]:
                axial[i] = V[i] * math.sqrt(1 - Cd[i] / rest[i])
        m = into @ W + fuel
        rho_gas = p_L / (R_gas * (T_gas - U**2 / (2 * cp_gas)))
        out.append((rho_gas * U * A - m) / W3)
        force = np.zeros(x.size - 1)
        np.add.at(force, before, W * axial)
        momentum = np.diff(p_L * A + m * U) - 0.5 * (p_L[1:] + p_L[:-1]) * np.diff(A) - force
        out.append(np.concatenate([[(p_L[0] - head)], momentum / A[1:]]) / P3 * 100)
        out.append([W.sum() / W3 - 1])
        return np.concatenate(out)

    start = np.concatenate(
        [np.full(n, 1 / n)]
        + [np.concatenate([np.full(s["x"].size, P_dump / P3), np.full(s["x"].size, 0.05)])
           for s in sides]
        + [np.full(x.size, 0.955), np.full(x.size, 0.3), [0.955], np.full(int(shared), 0.5)]
    )  # fmt: skip
    found = root(equations, start, method="hybr", tol=1e-13, options={"maxfev": 200000})
    if np.max(np.abs(equations(found.x))) > 1e-9:
        found = root(equations, found.x, method="lm", tol=1e-14)
    values = np.split(found.x, cuts)
    p_end, U_end = values[-2][x.size - 1] * P3, values[-2][2 * x.size - 1] * 100
    T_static = T_gas[-1] - U_end**2 / (2 * cp_gas[-1])
    P_exit = p_end * (T_gas[-1] / T_static) ** (g_gas[-1] / (g_gas[-1] - 1))
    return (
        {row.name: w * W3 for row, w in zip(rows, values[0], strict=True)},
        1 - P_exit / P3,
        float(np.max(np.abs(equations(found.x)))),
    )


def same(one, other):
    return one.side == other.side != "dome" and one.station == other.station


def given_area(row, area, liner_area):
    if row.edge == "swirler":
        K, sec = row.swirler.vane_loss, 1 / math.cos(row.swirler.vane_angle)
        # P - p_L = [K ((sec/A)^2 - 1/A_L^2) + 1/A_L^2] W^2 / (2 rho)
        return (K * ((sec / area) ** 2 - 1 / liner_area**2) + 1 / liner_area**2) ** -0.5
    if row.edge == "metering":
        return (0.68 if row.feed == "static" else 0.80) * area
    if row.edge == "orifice":
        return (0.77 if row.role == "dome" else math.pi / (math.pi + 2)) * area
    return math.nan
