"""Flow laws of the links of a network document, written from their published formulas. SI units, temperatures in kelvin.

Every law takes the link (a dict as in the document), the temperatures of its two ends and the pressure, and returns the heat
flow from `from` to `to` [W]. `Joints` collects the links that work near a joint of a law published in pieces, where any smooth
transition is as good as another, and those whose law is the greatest of several that are nearly as great.
"""

from math import cos, exp, log1p, radians, sin, sqrt, tanh

GRAVITY = 9.80665
STEFAN_BOLTZMANN = 5.670374419e-8
GAS_CONSTANT = 287.05


class Joints:
    def __init__(self):
        self.links = set()
        self.close = set()

    def note(self, link, value, joint, factor=3.0):
        if joint / factor < abs(value) < joint * factor:
            self.links.add(link["id"])

    def mark(self, link, near):
        if near:
            self.links.add(link["id"])


def heat_capacity(t):
    """Ideal-gas c_p of dry air [J/(kg K)] as a molar polynomial with two Planck-Einstein terms (Lemmon et al. 2000, from memory)."""
    tau = 132.6312 / t
    parts = 2.490888032
    for share, theta in ((0.791309509, 25.36365), (0.212236768, 16.90741)):
        u = theta * tau
        parts += share * u * u * exp(u) / (exp(u) - 1) ** 2
    parts -= 12 * 0.6057194e-7 / tau**3 - 6 * 0.210274769e-4 / tau**2 - 2 * 0.158860716e-3 / tau
    parts += 0.75 * 0.19536342e-3 * tau**1.5
    return 8.31451 / 0.0289586 * (1 + parts)


class Air:
    """Dry air at one temperature and pressure: ideal gas, Sutherland's laws."""

    def __init__(self, t, pressure):
        self.t = t
        self.density = pressure / (GAS_CONSTANT * t)
        self.viscosity = 1.716e-5 * (t / 273.15) ** 1.5 * (273.15 + 110.4) / (t + 110.4)
        self.conductivity = 0.0241 * (t / 273.15) ** 1.5 * (273.15 + 194) / (t + 194)
        self.heat_capacity = heat_capacity(t)
        self.nu = self.viscosity / self.density
        self.alpha = self.conductivity / (self.density * self.heat_capacity)
        self.pr = self.nu / self.alpha

    def rayleigh(self, difference, length, gravity=GRAVITY):
        return gravity * abs(difference) * length**3 / (self.t * self.nu * self.alpha)

    def reynolds(self, speed, length):
        return speed * length / self.nu


def laminar(pr):
    return 0.671 / (1 + (0.492 / pr) ** (9 / 16)) ** (4 / 9)


def thick(thin, c):
    """Correction of a thin boundary layer's Nusselt number for its thickness."""
    return c / log1p(c / thin) if thin > 0 else 0.0


# Natural convection: Nu(Ra, Pr), by shape and id.


def vertical_raithby_hollands(ra, pr):
    if ra == 0:
        return 0.0
    layer = thick(laminar(pr) * ra**0.25, 2)
    turbulent = 0.13 * pr**0.22 / (1 + 0.61 * pr**0.81) ** 0.42 * ra ** (1 / 3) / (1 + 1.4e9 * pr / ra)
    return (layer**6 + turbulent**6) ** (1 / 6)


def up_raithby_hollands(ra, pr):
    return (thick(0.835 * laminar(pr) * ra**0.25, 1.4) ** 10 + (0.14 * ra ** (1 / 3)) ** 10) ** 0.1


def down_raithby_hollands(ra, pr):
    return thick(0.527 * ra**0.2 / (1 + (1.9 / pr) ** 0.9) ** (2 / 9), 2.45)


def churchill_chu(ra, pr):
    return (0.825 + 0.387 * ra ** (1 / 6) / (1 + (0.492 / pr) ** (9 / 16)) ** (8 / 27)) ** 2


def churchill_chu_laminar(ra, pr):
    return 0.68 + 0.670 * ra**0.25 / (1 + (0.492 / pr) ** (9 / 16)) ** (4 / 9)


def lloyd_moran(ra, pr):
    return 0.54 * ra**0.25 if ra <= 1e7 else 0.15 * ra ** (1 / 3)


def mcadams(ra, pr):
    return 0.27 * ra**0.25


def fifth_power(ra, pr):
    return 0.52 * ra**0.2


def churchill_chu_cylinder(ra, pr):
    return (0.60 + 0.387 * ra ** (1 / 6) / (1 + (0.559 / pr) ** (9 / 16)) ** (8 / 27)) ** 2


MORGAN = ((1e-2, 0.675, 0.058), (1e2, 1.02, 0.148), (1e4, 0.850, 0.188), (1e7, 0.480, 0.250), (1e12, 0.125, 0.333))


def morgan(ra, pr):
    for limit, c, n in MORGAN:
        if ra <= limit:
            return c * ra**n
    return c * ra**n


def churchill_sphere(ra, pr):
    return 2 + 0.589 * ra**0.25 / (1 + (0.469 / pr) ** (9 / 16)) ** (4 / 9)


VERTICAL = {
    "raithby-hollands": vertical_raithby_hollands,
    "churchill-chu": churchill_chu,
    "churchill-chu-laminar": churchill_chu_laminar,
}
UP = {"raithby-hollands": up_raithby_hollands, "lloyd-moran": lloyd_moran}
DOWN = {"raithby-hollands": down_raithby_hollands, "mcadams": mcadams, "fifth-power": fifth_power}
CYLINDER = {"churchill-chu-cylinder": churchill_chu_cylinder, "morgan": morgan}
MATES = {"lloyd-moran": "mcadams", "mcadams": "lloyd-moran", "fifth-power": "lloyd-moran"}


def natural_film(link, surface, air_t, air, joints):
    """Film coefficient of still air [W/(m2 K)]."""
    shape, length = link["shape"], link["lengthM"]
    difference = surface - air_t
    chosen = link.get("correlation")
    ra = air.rayleigh(difference, length)
    if shape == "vertical-plate":
        nu = VERTICAL[chosen or "raithby-hollands"](ra, air.pr)
    elif shape in ("plate-facing-up", "plate-facing-down"):
        law = chosen or "raithby-hollands"
        table = UP if shape == "plate-facing-up" else DOWN
        if difference < 0:
            table = DOWN if table is UP else UP
            law = MATES.get(law, law)
        if law == "lloyd-moran":
            joints.note(link, ra, 1e7)
        nu = table[law](ra, air.pr)
    elif shape == "inclined-plate":
        tilt = link["tiltDeg"] if difference >= 0 else 180 - link["tiltDeg"]
        from_vertical = radians(abs(90 - tilt))
        width = link["areaM2"] / length
        flat = link["areaM2"] / (2 * (length + width))
        standing = vertical_raithby_hollands(air.rayleigh(difference, length, GRAVITY * cos(from_vertical)), air.pr) / length
        lying_law = up_raithby_hollands if tilt < 90 else down_raithby_hollands
        lying = lying_law(air.rayleigh(difference, flat, GRAVITY * sin(from_vertical)), air.pr) / flat
        return (standing**10 + lying**10) ** 0.1 * air.conductivity
    elif shape == "horizontal-cylinder":
        law = chosen or "churchill-chu-cylinder"
        if law == "morgan":
            for limit, _, _ in MORGAN:
                joints.note(link, ra, limit)
        nu = CYLINDER[law](ra, air.pr)
    elif shape == "vertical-cylinder":
        thin = laminar(air.pr) * ra**0.25
        if thin == 0:
            return 0.0
        zeta = 1.8 * (length / link["diameterM"]) / thin
        nu = vertical_raithby_hollands(ra, air.pr) * zeta / log1p(zeta)
    elif shape == "sphere":
        nu = churchill_sphere(ra, air.pr)
    else:
        raise ValueError(f"no such shape: {shape}")
    return nu * air.conductivity / length


def forced_film(link, surface, air_t, air, pressure, joints):
    """Film coefficient of moved air [W/(m2 K)]."""
    shape, speed = link["shape"], link["airSpeedMPerS"]
    if shape in ("horizontal-cylinder", "vertical-cylinder"):
        length = link["lengthM"] if shape == "horizontal-cylinder" else link["diameterM"]
        re = air.reynolds(speed, length)
        nu = 0.3 + 0.62 * re**0.5 * air.pr ** (1 / 3) / (1 + (0.4 / air.pr) ** (2 / 3)) ** 0.25 * (
            1 + (re / 282000) ** (5 / 8)
        ) ** (4 / 5)
    elif shape == "sphere":
        length = link["lengthM"]
        # Whitaker's properties are those of the free stream; only the viscosity at the surface is not.
        air = Air(air_t, pressure)
        re = air.reynolds(speed, length)
        ratio = air.viscosity / Air(surface, pressure).viscosity
        nu = 2 + (0.4 * re**0.5 + 0.06 * re ** (2 / 3)) * air.pr**0.4 * ratio**0.25
    else:
        length = link.get("flowLengthM", link["lengthM"])
        re = air.reynolds(speed, length)
        joints.note(link, re, 5e5)
        factor = 0.664 * re**0.5 if re <= 5e5 else 0.037 * re**0.8 - 871
        nu = factor * air.pr ** (1 / 3)
    return nu * air.conductivity / length


def convection(link, surface, air_t, pressure, joints):
    air = Air((surface + air_t) / 2, pressure)
    film = natural_film(link, surface, air_t, air, joints)
    if link.get("airSpeedMPerS", 0) > 0:
        forced = forced_film(link, surface, air_t, air, pressure, joints)
        if link.get("flow", "transverse") == "opposing":
            greater, lesser = max(forced, film), min(forced, film)
            opposed = (greater**3 - lesser**3) ** (1 / 3)
            joints.mark(link, 0.55 * greater < opposed < 0.9 * greater)
            joints.close.add(link["id"])
            film = max(opposed, 0.7 * greater)
        else:
            film = (forced**3 + film**3) ** (1 / 3)
    return link.get("scale", 1) * film * link["areaM2"] * (surface - air_t)


def conduction(link, a, b, pressure, joints):
    k = link["conductivityWPerMK"]
    if isinstance(k, list):
        mean = (a + b) / 2 - 273.15
        joints.mark(link, any(abs(mean - point) < 1 for point, _ in k))
        for (t0, k0), (t1, k1) in zip(k, k[1:]):
            if t0 <= mean <= t1:
                k = k0 + (k1 - k0) * (mean - t0) / (t1 - t0)
                break
        else:
            k = k[0][1] if mean < k[0][0] else k[-1][1]
    return k * link["areaM2"] * (a - b) / link["lengthM"]


def radiation(link, a, b, pressure, joints):
    area, emissivity = link["areaM2"], link["emissivity"]
    view = link.get("viewFactor", 1)
    if "emissivityTo" in link:
        other, area_to = link["emissivityTo"], link.get("areaToM2", area)
        if 0 in (area, emissivity, other, area_to, view):
            return 0.0
        resistance = (1 - emissivity) / (emissivity * area) + 1 / (area * view) + (1 - other) / (other * area_to)
        return STEFAN_BOLTZMANN * (a**4 - b**4) / resistance
    return STEFAN_BOLTZMANN * area * emissivity * view * (a**4 - b**4)


def opening(link):
    inlet, outlet = link.get("inletAreaM2", 0), link.get("outletAreaM2", 0)
    if inlet == 0 or outlet == 0:
        return 0.0
    return link["dischargeCoefficient"] / sqrt(1 / inlet**2 + 1 / outlet**2)


def ventilation(link, inside, outside, pressure, joints):
    """Air that leaves at the inside temperature; buoyancy through two openings, a given flow, or a fan against the openings."""
    mean = Air((inside + outside) / 2, pressure)
    density = Air(inside, pressure).density
    if "flowM3PerS" in link:
        flow = link["flowM3PerS"]
    elif "fanCurve" in link:
        flow = fan_flow(link, density)
    else:
        flow = opening(link) * sqrt(2 * GRAVITY * link["heightM"] * abs(inside - outside) / outside)
    return density * mean.heat_capacity * flow * (inside - outside)


def fan_flow(link, density):
    """Where the fan's pressure equals the openings' loss, density/2 (flow/(C_d A))^2, by bisection."""
    curve, area = link["fanCurve"], opening(link)
    if area == 0:
        return 0.0

    def surplus(flow):
        for (v0, p0), (v1, p1) in zip(curve, curve[1:]):
            if v0 <= flow <= v1:
                return p0 + (p1 - p0) * (flow - v0) / (v1 - v0) - density / 2 * (flow / area) ** 2
        return -1.0

    low, high = 0.0, curve[-1][0]
    for _ in range(200):
        middle = (low + high) / 2
        low, high = (middle, high) if surplus(middle) > 0 else (low, middle)
    return low


def gap_vertical(ra, aspect):
    """The three laws of ElSherbiny, Raithby & Hollands (1982); the greatest holds."""
    return (
        0.0605 * ra ** (1 / 3),
        (1 + (0.104 * ra**0.293 / (1 + (6310 / ra) ** 1.36)) ** 3) ** (1 / 3) if ra > 0 else 1.0,
        0.242 * (ra / aspect) ** 0.272,
    )


def gap_below(ra, tilt):
    """Hollands, Unny, Raithby & Konicek (1976)."""
    steep = ra * cos(radians(tilt))
    if steep == 0:
        return 1.0
    first = max(0.0, 1 - 1708 / steep)
    second = 1 - 1708 * sin(radians(1.8 * tilt)) ** 1.6 / steep
    third = max(0.0, (steep / 5830) ** (1 / 3) - 1)
    return 1 + 1.44 * first * second + third


def air_gap(link, a, b, pressure, joints):
    air = Air((a + b) / 2, pressure)
    tilt = link["tiltDeg"] if a >= b else 180 - link["tiltDeg"]
    ra = air.rayleigh(a - b, link["gapM"])
    nu = 1.0
    if tilt > 60:
        aspect = link["heightM"] / link["gapM"]
        three = sorted(gap_vertical(ra, aspect))
        # Where two of the three laws cross, within a factor 3 either way.
        near = [gap_vertical(ra * 3 ** (n / 8), aspect) for n in range(-8, 9)]
        joints.mark(link, len({laws.index(max(laws)) for laws in near}) > 1)
        if three[-2] > 0.85 * three[-1]:
            joints.close.add(link["id"])
        nu = max(three[-1], 1.0)
    if tilt < 90:
        steep = ra * cos(radians(min(tilt, 60)))
        joints.note(link, steep, 1708)
        joints.note(link, steep, 5830)
        lying = gap_below(ra, min(tilt, 60))
        nu = lying if tilt <= 60 else lying + (nu - lying) * (tilt - 60) / 30
    elif tilt > 90:
        nu = 1 + (nu - 1) * sin(radians(tilt))
    return nu * air.conductivity / link["gapM"] * link["areaM2"] * (a - b)


def channel_film(air, difference, spacing, height, law, gravity=GRAVITY):
    """Film coefficient of two isothermal parallel plates, on the wall's excess over the inlet."""
    elenbaas = air.rayleigh(difference, spacing, gravity) * spacing / height
    if elenbaas == 0:
        return 0.0
    if law == "elenbaas":
        nu = elenbaas / 24 * (1 - exp(-35 / elenbaas)) ** 0.75
    else:
        nu = (576 / elenbaas**2 + 2.873 / sqrt(elenbaas)) ** -0.5
    return nu * air.conductivity / spacing


def channel(link, wall, inlet, pressure, joints):
    air = Air((wall + inlet) / 2, pressure)
    film = channel_film(air, wall - inlet, link["spacingM"], link["heightM"], link.get("correlation"))
    return film * link["areaM2"] * (wall - inlet)


def fin_array(link, base, inlet, pressure, joints):
    air = Air((base + inlet) / 2, pressure)
    count, thickness, height = link["finCount"], link["finThicknessM"], link["baseHeightM"]
    spacing = (link["baseWidthM"] - count * thickness) / (count - 1)
    gravity = GRAVITY * cos(radians(link.get("tiltDeg", 0)))
    film = channel_film(air, base - inlet, spacing, height, link.get("correlation"), gravity)
    corrected = link["finHeightM"] + thickness / 2
    ml = sqrt(2 * film / (link["conductivityWPerMK"] * thickness)) * corrected
    efficiency = tanh(ml) / ml if ml > 0 else 1.0
    area = 2 * count * corrected * height * efficiency + (count - 1) * spacing * height
    return film * area * (base - inlet)


LAWS = {
    "resistance": lambda link, a, b, pressure, joints: (a - b) / link["resistanceKPerW"],
    "film": lambda link, a, b, pressure, joints: link["coefficientWPerM2K"] * link["areaM2"] * (a - b),
    "conduction": conduction,
    "convection": convection,
    "radiation": radiation,
    "ventilation": ventilation,
    "air-gap": air_gap,
    "channel": channel,
    "fin-array": fin_array,
}
