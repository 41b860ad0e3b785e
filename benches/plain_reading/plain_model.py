#!/usr/bin/env python3
"""A plain reading of the loss model of a step-down stage, and a complete ranking: the baseline of `benches/evaluations.rs`.

Written from the model's text, not from the Rust program; standard library only.  Where the text leaves a choice, the choice taken
is in `docs/readings.md`.

  plain_model.py account   RAIL.toml CATALOG_DIR STAGE.json
  plain_model.py shortlist RAIL.toml CATALOG_DIR [--top N] [--distinct triple|stage|switches]
  plain_model.py bench     RAIL.toml CATALOG_DIR N
"""
import csv, itertools, json, math, os, re, sys, time, tomllib

SLOTS = ("high_switch", "rectifier", "inductor", "input_bank", "output_bank")
REL = 1e-9

# ------------------------------------------------------------------------------------------------ units

PREFIX = {"": 1.0, "p": 1e-12, "n": 1e-9, "u": 1e-6, "µ": 1e-6, "μ": 1e-6, "m": 1e-3, "k": 1e3, "M": 1e6, "G": 1e9}
BASES = ["K/W", "°C/W", "V/K", "V/°C", "Ω", "\u2126", "ohm", "Ohm", "Hz", "V", "A", "F", "H", "C", "s", "W", "K", "J"]
WHOLE = {"mm²": 1.0, "mm2": 1.0, "cm²": 100.0, "cm2": 100.0, "m²": 1e6, "m2": 1e6, "mm": 1.0, "cm": 10.0, "µm": 1e-3,
         "°C": 1.0, "%": 0.01, "": 1.0}


def unit_factor(unit):
    """Factor to SI (lengths and areas: mm, mm²; temperatures: °C or K)."""
    unit = unit.strip()
    if unit in WHOLE:
        return WHOLE[unit]
    for base in BASES:
        if unit.endswith(base) and unit[: len(unit) - len(base)] in PREFIX:
            return PREFIX[unit[: len(unit) - len(base)]]
    raise ValueError(f"unknown unit {unit!r}")


NUMBER = re.compile(r"^\s*([+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?)\s*(.*?)\s*$")


def quantity(text):
    if isinstance(text, (int, float)):
        return float(text)
    m = NUMBER.match(text)
    if not m:
        raise ValueError(f"not a quantity: {text!r}")
    return float(m.group(1)) * unit_factor(m.group(2))


# ------------------------------------------------------------------------------------------------ catalogs

CURVES = {  # column -> condition that a plain column stands for (None: a condition must be given)
    "switches": {"on_resistance": None, "on_resistance_max": None, "gate_charge": None, "output_charge": 12.0,
                 "hot_resistance_ratio": 125.0},
    "diodes": {"forward_drop": None, "leakage": 25.0, "junction_charge": 12.0},
    "inductors": {"inductance": 0.0, "saturation_current": 25.0, "ac_resistance": None},
    "capacitors": {"capacitance": 0.0, "esr": 100e3},
}
TEXT = {"part", "maker", "package", "note", "equivalent_to", "kind", "stock"}


def read_catalog(directory, name):
    path = os.path.join(directory, name + ".csv")
    with open(path, encoding="utf-8-sig", newline="") as handle:
        rows = [r for r in csv.reader(handle) if r and not r[0].lstrip().startswith("#")]
    header = []
    for cell in rows[0]:
        m = re.match(r"^\s*([A-Za-z_]+)\s*(?:\[([^\]]*)\])?\s*(?:@\s*(.*?))?\s*$", cell)
        if not m:
            raise ValueError(f"{path}: header {cell!r}")
        header.append((m.group(1).lower(), m.group(2), None if m.group(3) is None else quantity(m.group(3))))
    parts = []
    for row in rows[1:]:
        part, plain = {}, {}
        for (column, unit, condition), cell in zip(header, row):
            cell = cell.strip()
            if cell == "":
                continue
            if column in TEXT:
                part[column] = cell
                continue
            m = NUMBER.match(cell)
            own = m.group(2)
            value = float(m.group(1)) * unit_factor(own if own else (unit or ""))
            if column in CURVES[name]:
                if condition is None:
                    plain[column] = value
                else:
                    part.setdefault(column, {})[condition] = value
            else:
                part[column] = value
        for column, value in plain.items():
            part.setdefault(column, {}).setdefault(CURVES[name][column], value)
        for column in CURVES[name]:
            if column in part:
                part[column] = sorted(part[column].items())
        if "area" not in part and "length" in part and "width" in part:
            part["area"] = part["length"] * part["width"]
        if name == "diodes":
            part["kind"] = part.get("kind", "schottky").lower()
        if name == "capacitors":
            part["kind"] = part["kind"].lower()
        parts.append(part)
    return parts


def read_catalogs(directory):
    return {name: read_catalog(directory, name) for name in CURVES}


# ------------------------------------------------------------------------------------------------ rail


def read_rail(path):
    with open(path, "rb") as handle:
        return rail_of(tomllib.load(handle))


def rail_of(t):
    r = {"name": t["name"]}
    v = t["input"]["voltage"]
    if isinstance(v, dict):
        r["vin"] = [quantity(v["min"]), quantity(v["typical"]), quantity(v["max"])]
    else:
        r["vin"] = [quantity(v)] * 3
    inp, out = t["input"], t["output"]

    def limit(value, default):
        if value is None:
            return default
        return None if value == "none" else quantity(value)

    r["input_ripple"] = limit(inp.get("ripple"), 0.05 * r["vin"][0])
    r["surge"] = quantity(inp.get("surge", r["vin"][2]))
    r["vo"], r["io"] = quantity(out["voltage"]), quantity(out["current"])
    r["peak"] = quantity(out.get("peak", r["io"]))
    r["output_ripple"] = limit(out.get("ripple"), 0.01 * r["vo"])
    step = out.get("step")
    r["step"] = None if step is None else {k: quantity(step[k]) for k in step}
    r["ta"] = quantity(t.get("ambient", {}).get("temperature", 25.0))
    d = t.get("drive", {})
    r["vdrv"] = quantity(d.get("voltage", 5.0))
    r["pull_up"], r["pull_down"] = quantity(d.get("pull_up", 2.0)), quantity(d.get("pull_down", 1.0))
    r["dead_time"] = quantity(d.get("dead_time", 20e-9))
    r["minimum_on"], r["minimum_off"] = quantity(d.get("minimum_on", 0)), quantity(d.get("minimum_off", 0))
    r["bias"] = quantity(d.get("bias", 0))
    supply = d.get("supply", "input")
    r["supply"] = supply if supply in ("input", "output") else quantity(supply)
    r["supply_limit"] = quantity(d["supply_limit"]) if "supply_limit" in d else None
    s = t.get("stage", {})
    kinds = s.get("rectifier", ["switch", "diode"])
    r["rectifier"] = [kinds] if isinstance(kinds, str) else list(kinds)
    r["light_load"] = s.get("light_load", "forced")
    f = s.get("frequency", 500e3)
    if isinstance(f, dict):
        a, b, n = quantity(f["from"]), quantity(f["to"]), int(f["steps"])
        r["frequency"] = [a] if n == 1 else [a * (b / a) ** (i / (n - 1)) for i in range(n - 1)] + [b]
    elif isinstance(f, list):
        r["frequency"] = [quantity(x) for x in f]
    else:
        r["frequency"] = [quantity(f)]
    p = s.get("parallel", {})
    r["parallel"] = {k: int(p.get(k, 1)) for k in ("high_switch", "rectifier", "input", "output")}
    rr = s.get("ripple_ratio", {})
    r["ripple_ratio"] = (rr.get("min"), rr.get("max"))
    r["ripple_ratio"] = tuple(None if x is None else quantity(x) for x in r["ripple_ratio"])
    loads = t.get("load") or [{"current": r["io"], "share": 1.0}]
    total = sum(quantity(l["share"]) for l in loads)
    shares = {r["io"]: 0.0}
    for l in loads:
        i = quantity(l["current"])
        shares[i] = shares.get(i, 0.0) + quantity(l["share"]) / total
    r["loads"] = sorted(shares.items())
    l = t.get("limits", {})
    r["junction_margin"] = quantity(l.get("junction_margin", 15.0))
    r["voltage_derating"] = quantity(l.get("voltage_derating", 0.8))
    r["current_derating"] = quantity(l.get("current_derating", 0.9))
    r["ringing"] = quantity(l.get("ringing", 1.2))
    r["saturation_margin"] = quantity(l.get("saturation_margin", 1.2))
    r["winding_temperature"] = quantity(l.get("winding_temperature", 125.0))
    cd = l.get("capacitor_voltage_derating", {})
    r["capacitor_voltage_derating"] = {k: quantity(cd.get(k, 0.8)) for k in ("ceramic", "polymer", "electrolytic")}
    for k in ("area", "height", "cost", "efficiency"):
        r["limit_" + k] = quantity(l[k]) if k in l else None
    w = t.get("worth", {})
    r["worth_loss"], r["worth_area"], r["worth_cost"] = (quantity(w.get(k, d)) for k, d in (("loss", 1.0), ("area", 0.0), ("cost", 0.0)))
    r["pin"] = t.get("parts", {}).get("pin", {})
    r["ban"] = t.get("parts", {}).get("ban", [])
    r["corners"] = [(vin, i, share if vin == r["vin"][1] else 0.0)
                    for vin in sorted(set(r["vin"])) for i, share in r["loads"]]
    return r


# ------------------------------------------------------------------------------------------------ curves


def line(points, x):
    """Linear between points, held at the ends."""
    if x <= points[0][0]:
        return points[0][1]
    for (x0, y0), (x1, y1) in zip(points, points[1:]):
        if x <= x1:
            return y0 + (y1 - y0) * (x - x0) / (x1 - x0)
    return points[-1][1]


def line_extended(points, x):
    """Linear through at least two points, end segments extended; on a point the lower pair."""
    for (x0, y0), (x1, y1) in zip(points, points[1:]):
        if x <= x1:
            break
    return y0 + (y1 - y0) * (x - x0) / (x1 - x0)


def loglog(points, x):
    """Log-log between points, held at the ends."""
    if x <= points[0][0]:
        return points[0][1]
    for (x0, y0), (x1, y1) in zip(points, points[1:]):
        if x <= x1:
            if y0 <= 0 or y1 <= 0:
                return y0 + (y1 - y0) * (x - x0) / (x1 - x0)
            return y0 * (y1 / y0) ** (math.log(x / x0) / math.log(x1 / x0))
    return points[-1][1]


def charge_at(points, v):
    """Output or junction charge: root of V outside the given range, log-log inside."""
    if v <= points[0][0]:
        return points[0][1] * math.sqrt(v / points[0][0])
    if v >= points[-1][0]:
        return points[-1][1] * math.sqrt(v / points[-1][0])
    return loglog(points, v)


# ------------------------------------------------------------------------------------------------ parts at the working point (§1)


class Underdriven(Exception):
    pass


class Dropout(Exception):
    pass


class Runaway(Exception):
    pass


class Cycle(Runaway):
    """No fixed point at all: the loss jumps over it."""


def on_resistance(points, v):
    """Linear in 1/V between points, held above; None below the lowest."""
    if v < points[0][0]:
        return None
    for (v0, r0), (v1, r1) in zip(points, points[1:]):
        if v <= v1:
            return r0 + (r1 - r0) * (1 / v - 1 / v0) / (1 / v1 - 1 / v0)
    return points[-1][1]


class SwitchBank:
    """n equal switches at the rail's gate supply.  Plain names are of one device, bank values carry `bank_`."""

    def __init__(self, part, n, rail):
        self.part, self.n, self.kind = part, n, "switch"
        self.name = part["part"]
        self.assumed = []
        vdrv = rail["vdrv"]
        self.lowest_gate = part["on_resistance"][0][0]
        self.ron25 = on_resistance(part["on_resistance"], vdrv)
        self.ron25_worst = self.ron25
        if self.ron25 is not None and part.get("on_resistance_max"):
            worst = on_resistance(part["on_resistance_max"], vdrv)
            if worst is None:
                v0, r0 = part["on_resistance_max"][0]
                worst = self.ron25 * r0 / on_resistance(part["on_resistance"], v0)
            self.ron25_worst = worst
        if part.get("hot_resistance_ratio"):
            t, ratio = part["hot_resistance_ratio"][-1]
        else:
            t, ratio = 125.0, self.default("hot_resistance_ratio", 1.5, "")
        self.alpha = (ratio - 1) / (t - 25)
        self.qgd = part["gate_drain_charge"]
        qgs = part.get("gate_source_charge")
        if "plateau_voltage" in part:
            self.vpl = part["plateau_voltage"]
        else:
            self.vpl = self.default("plateau_voltage", part["threshold_voltage"] + 0.8 if "threshold_voltage" in part else 2.5, "V")
        self.vth = part["threshold_voltage"] if "threshold_voltage" in part else self.default("threshold_voltage", self.vpl - 0.8, "V")
        points = part["gate_charge"]
        if len(points) > 1:
            self.qg = line_extended(points, vdrv)
        else:
            v0, q0 = points[0]
            if qgs is not None and v0 > self.vpl:
                self.qg = q0 + (q0 - qgs - self.qgd) / (v0 - self.vpl) * (vdrv - v0)
            else:
                self.qg = q0 * vdrv / v0
        if qgs is not None:
            self.qgs2 = qgs * (1 - self.vth / self.vpl)
            self.qgs = qgs
        else:
            self.qgs2 = self.default("gate_source_charge", self.qgd / 3, "C")
            self.qgs = 3 * self.qgs2
        self.vm = (self.vth + self.vpl) / 2
        if "plateau_current" in part:
            self.gm = n * part["plateau_current"] / (self.vpl - self.vth)
        else:
            self.gm = self.default("plateau_current", rail["io"], "A") / (self.vpl - self.vth)
        self.cg = n * self.qgs2 / (self.vpl - self.vth)
        self.rg = part["gate_resistance"] if "gate_resistance" in part else self.default("gate_resistance", 1.0, "Ω")
        if part.get("output_charge"):
            self.qoss_points = part["output_charge"]
        else:
            self.qoss_points = [(12.0, self.default("output_charge", self.qg, "C"))]
        self.qrr = part["recovery_charge"] if "recovery_charge" in part else self.default("recovery_charge", 1.5 * self.qgd, "C")
        self.vsd = part["body_diode_drop"] if "body_diode_drop" in part else self.default("body_diode_drop", 0.8, "V")
        self.limit = part["junction_limit"] if "junction_limit" in part else self.default("junction_limit", 150.0, "°C")
        self.rth = part["thermal_resistance"]
        self.bank_qg, self.bank_qgd, self.bank_qrr = n * self.qg, n * self.qgd, n * self.qrr
        self.bank_rg = self.rg / n

    def default(self, quantity, value, unit):
        self.assumed.append((quantity, value, unit, "not given in the catalog"))
        return value

    def resistance(self, t, worst):
        return (self.ron25_worst if worst else self.ron25) * (1 + self.alpha * (t - 25)) / self.n

    def bank_charge(self, v):
        return self.n * charge_at(self.qoss_points, v)

    def turn_off_time(self, rail, low):
        over = max(self.qg - self.qgd - self.qgs, 0.0)
        q = 2 * over / (rail["vdrv"] + self.vpl) + self.qgs2 / self.vm
        if not low:
            q += self.qgd / self.vpl
        return (rail["pull_down"] + self.rg / self.n) * self.n * q


class DiodeBank:
    def __init__(self, part, n, rail):
        self.part, self.n, self.kind = part, n, "diode"
        self.name = part["part"]
        self.assumed = []
        self.points = part["forward_drop"]
        silicon = part["kind"] == "silicon"
        self.slope = part["drop_slope"] if "drop_slope" in part else self.default("drop_slope", -2e-3 if silicon else -1e-3, "V/K")
        self.leak_points = part.get("leakage")
        if not self.leak_points:
            self.default("leakage", 0.0, "A")
        self.qj_points = part.get("junction_charge")
        if not self.qj_points:
            self.default("junction_charge", 0.0, "C")
        self.missing_recovery = silicon and "recovery_charge" not in part
        if "recovery_charge" in part:
            self.qrr = part["recovery_charge"]
        else:
            self.qrr = 0.0 if silicon else self.default("recovery_charge", 0.0, "C")
        self.limit = part["junction_limit"] if "junction_limit" in part else self.default("junction_limit", 150.0, "°C")
        self.rth = part["thermal_resistance"]
        self.bank_qg = self.bank_qgd = 0.0
        self.bank_qrr = n * self.qrr

    default = SwitchBank.default

    def drop_pair(self, i):
        """(V0 at 25 °C, Rd of the bank) for the bank current i that brackets."""
        p = self.points
        if len(p) == 1:
            return p[0][1], 0.0
        each = i / self.n
        for (i0, v0), (i1, v1) in zip(p, p[1:]):
            if each <= i1:
                break
        rd = (v1 - v0) / (i1 - i0)
        return v0 - rd * i0, rd / self.n

    def leakage(self, t):
        p = self.leak_points
        if not p:
            return 0.0
        if len(p) == 1:
            return self.n * p[0][1] * 2 ** ((t - p[0][0]) / 10)
        for (t0, y0), (t1, y1) in zip(p, p[1:]):
            if t <= t1:
                break
        return self.n * y0 * math.exp(math.log(y1 / y0) * (t - t0) / (t1 - t0))

    def bank_charge(self, v):
        return self.n * charge_at(self.qj_points, v) if self.qj_points else 0.0


COPPER = 0.003854


class Choke:
    def __init__(self, part, n, rail):
        self.part, self.n, self.name = part, 1, part["part"]
        self.assumed = []
        self.dcr = part["dcr"]
        self.dcr_worst = part.get("dcr_max", part["dcr"])
        self.tolerance = part["tolerance"] if "tolerance" in part else self.default("tolerance", 0.2, "")
        if "heating_current" in part:
            rise = part["heating_rise"] if "heating_rise" in part else self.default("heating_rise", 40.0, "K")
            self.rth = rise / (part["heating_current"] ** 2 * self.dcr * (1 + COPPER * rise))
        else:
            self.rth = self.default("thermal_resistance", 40.0, "K/W")
        self.core = None
        if "core_loss" in part and "core_frequency" in part and "core_ripple" in part:
            a = part["core_alpha"] if "core_alpha" in part else self.default("core_alpha", 1.4, "")
            b = part["core_beta"] if "core_beta" in part else self.default("core_beta", 2.4, "")
            self.core = (part["core_loss"], part["core_frequency"], part["core_ripple"], a, b)
        else:
            self.default("core_loss", 0.0, "W")
        self.ac_points = part.get("ac_resistance")
        if not self.ac_points:
            self.default("ac_resistance", self.dcr, "Ω")

    default = SwitchBank.default

    def inductance(self, i):
        return line(self.part["inductance"], i)

    def dcr_at(self, t, worst):
        return (self.dcr_worst if worst else self.dcr) * (1 + COPPER * (t - 25))

    def rac_at(self, f, t, worst):
        dcr = self.dcr_worst if worst else self.dcr
        if not self.ac_points:
            r = dcr
        else:
            r = loglog(self.ac_points, f)
            last = self.ac_points[-1][0]
            if f > last:
                r *= math.sqrt(f / last)
            r = max(r, dcr)
        return r * (1 + COPPER * (t - 25))

    def core_loss(self, f, ripple, d1, d2):
        if self.core is None:
            return 0.0
        p, f0, r0, a, b = self.core
        return p * (f / f0) ** a * (ripple / r0) ** b * (d1 ** (1 - a) + d2 ** (1 - a)) / 2 ** a

    def saturation(self, t):
        return line(self.part["saturation_current"], t)


class Bank:
    """n equal capacitors."""

    def __init__(self, part, n, rail):
        self.part, self.n, self.name, self.kind = part, n, part["part"], part["kind"]
        self.assumed = []
        self.tolerance = part["tolerance"] if "tolerance" in part else self.default("tolerance", 0.1 if self.kind == "ceramic" else 0.2, "")
        self.esl = (part["esl"] if "esl" in part else self.default("esl", 0.0, "H")) / n
        if "ripple_current" not in part:
            self.default("ripple_current", None, "A")

    default = SwitchBank.default

    def capacitance(self, v):
        points = self.part["capacitance"]
        c = line(points, v)
        last_v, last_c = points[-1]
        if self.kind == "ceramic" and v > last_v:
            vr = self.part["voltage_rating"]
            g = lambda x: 1 / (1 + 4 * (x / vr) ** 2)
            c = last_c * g(v) / g(last_v)
        return self.n * c

    def esr(self, f):
        return loglog(self.part["esr"], f) / self.n


# ------------------------------------------------------------------------------------------------ one state (§2, §3 without the banks)


def continuous(vin, vo, i, f, l, rh, dcr, dt, v, vsd):
    den = vin - i * rh + v
    if den <= 0:
        raise Dropout
    d = (vo + i * dcr + (1 - dt) * v + dt * vsd) / den
    ripple = (vin - vo - i * (rh + dcr)) * d / (l * f)
    return d, ripple


def discontinuous(vin, vo, i, f, l, rh, dcr, drop):
    """Peak from Ip² = 2·I·von·voff/(L·f·(von + voff)): the one root with von > 0.  drop(i) = v at the bank current i."""
    def levels(ip):
        return vin - vo - (rh + dcr) * ip / 2, vo + dcr * ip / 2 + drop(ip / 2)

    def h(ip):
        von, voff = levels(ip)
        return 2 * i * von * voff / (l * f * (von + voff)) - ip * ip

    a, b = 0.0, math.sqrt(2 * i * (vin - vo) / (l * f)) * 1.000001
    if rh + dcr > 0:
        b = min(b, 2 * (vin - vo) / (rh + dcr))
    fa, fb, side = h(a), h(b), 0
    for k in range(300):
        x = (a * fb - b * fa) / (fb - fa) if k % 4 != 3 and fb != fa else (a + b) / 2
        if not a < x < b:
            x = (a + b) / 2
        fx = h(x)
        if fx == 0 or b - a <= 2e-16 * b or x == a or x == b:
            break
        if fx > 0:
            a, fa = x, fx
            if side == 1:
                fb /= 2
            side = 1
        else:
            b, fb = x, fx
            if side == -1:
                fa /= 2
            side = -1
    von, voff = levels(x)
    if von <= 0 or voff <= 0:
        raise Dropout
    d = math.sqrt(2 * l * f * i * voff / (von * (von + voff)))
    ip = von * d / (l * f)
    return d, ip, d * von / voff


def overlap(rail, hs, vin, q, iv, ip):
    """(Eon, Eoff) of the high bank; q: output charge in the loop at Vin."""
    vdrv, gm, vth = rail["vdrv"], hs.gm, hs.vth
    ru, rd = rail["pull_up"] + hs.bank_rg, rail["pull_down"] + hs.bank_rg
    iv = max(iv, 0.0)
    pon, poff = vth + iv / gm, vth + ip / gm
    if vdrv <= pon or vdrv <= poff:
        raise Underdriven
    tri = ru * hs.cg * (iv / gm) / (vdrv - (vth + pon) / 2)
    tv = (ru * hs.bank_qgd + q / gm) / (vdrv - pon)
    u = q / (tv * gm) if q > 0 else 0.0
    lag = ru * hs.cg * u / (vdrv - pon - u / 2) if u > 0 else 0.0
    eon = 0.5 * vin * iv * (tri + tv + lag)
    tr = (rd * hs.bank_qgd + q / gm) / poff
    ch = ip - q / tr if q > 0 else ip
    if ch <= 0:
        return eon, 0.0
    tfi = rd * hs.cg * (ch / gm) / (vth + ch / (2 * gm))
    return eon, 0.5 * vin * ch * (tr + tfi)


def state(rail, core, vin, i, temps, l, worst):
    """Currents and losses of everything but the banks at given temperatures."""
    f, hs, rc, ch = core.f, core.hs, core.rc, core.ch
    th, tr, tl = temps
    vo, ta = rail["vo"], rail["ta"]
    if vin <= vo:
        raise Dropout
    rh, dcr = hs.resistance(th, worst), ch.dcr_at(tl, worst)
    if rc.kind == "switch":
        rr = rc.resistance(tr, worst)
        dt, vsd = 2 * rail["dead_time"] * f, rc.vsd
        v = rr * i
        drop = lambda x: rr * x
    else:
        dt = vsd = 0.0
        shift = rc.slope * (tr - 25)
        v0, rd = rc.drop_pair(i)
        v0 += shift
        v = v0 + rd * i

        def drop(x):
            a, b = rc.drop_pair(x)
            return a + shift + b * x
    d, ripple = continuous(vin, vo, i, f, l, rh, dcr, dt, v, vsd)
    forced = rc.kind == "switch" and rail["light_load"] == "forced"
    s = {}
    if forced or i >= ripple / 2:
        if d + dt >= 1:
            raise Dropout
        mode, iv, ip, d2 = "continuous", i - ripple / 2, i + ripple / 2, 1 - d
        sq = i * i + ripple * ripple / 12
        ih2, ir2, il2 = d * sq, (1 - d - dt) * sq, sq
        icin2, icout2 = d * (1 - d) * i * i + d * ripple * ripple / 12, ripple * ripple / 12
        iavg = (1 - d) * i
    else:
        d, ip, d2 = discontinuous(vin, vo, i, f, l, rh, dcr, drop)
        if d + dt >= 1:
            raise Dropout
        mode, iv, ripple = "discontinuous", 0.0, ip
        if rc.kind == "diode":
            v0, rd = rc.drop_pair(ip / 2)
            v0 += shift
        ih2, ir2, il2 = ip * ip * d / 3, ip * ip * d2 / 3, ip * ip * (d + d2) / 3
        icin2, icout2 = ih2 - (d * ip / 2) ** 2, il2 - i * i
        iavg = ip * d2 / 2
    # losses
    qoss, qx = hs.bank_charge(vin), rc.bank_charge(vin)
    eon, eoff = overlap(rail, hs, vin, qoss + qx, iv, ip)
    p_overlap = f * (eon + eoff)
    if mode == "continuous":
        if iv < 0 and l * iv * iv >= (qoss + qx) * vin:
            p_charge = 0.0
        else:
            p_charge = (qoss / 3 + 2 * qx / 3) * vin * f
    else:
        w = vin - vo
        p_charge = (hs.bank_charge(w) / 3 + 2 * rc.bank_charge(w) / 3) * w * f
    p_recovery = rc.bank_qrr * vin * f if mode == "continuous" and iv >= 0 else 0.0
    p_hs = {"conduction": rh * ih2, "overlap": p_overlap, "output_charge": p_charge, "recovery": p_recovery}
    if rc.kind == "switch":
        p_dead = rc.vsd * rail["dead_time"] * f * (ip + (abs(iv) if mode == "continuous" else 0.0))
        p_rc = {"conduction": rr * ir2, "dead_time": p_dead, "leakage": 0.0}
    else:
        p_rc = {"conduction": v0 * iavg + rd * ir2, "dead_time": 0.0, "leakage": vin * rc.leakage(tr) * d}
    p_ch = {"winding_dc": dcr * i * i, "winding_ac": ch.rac_at(f, tl, worst) * (il2 - i * i),
            "core": ch.core_loss(f, ripple, d, d2)}
    new = (ta + hs.rth * sum(p_hs.values()) / hs.n, ta + rc.rth * sum(p_rc.values()) / rc.n, ta + ch.rth * sum(p_ch.values()))
    return {"mode": mode, "d": d, "d2": d2, "ripple": ripple, "iv": iv, "ip": ip, "iavg": iavg,
            "ih2": ih2, "ir2": ir2, "il2": il2, "icin2": icin2, "icout2": icout2,
            "high_switch": p_hs, "rectifier": p_rc, "inductor": p_ch, "l": l, "vin": vin, "i": i}, new


def solve3(a, b):
    m = [list(a[r]) + [b[r]] for r in range(3)]
    for c in range(3):
        p = max(range(c, 3), key=lambda r: abs(m[r][c]))
        if m[p][c] == 0:
            return None
        m[c], m[p] = m[p], m[c]
        for r in range(3):
            if r != c:
                k = m[r][c] / m[c][c]
                m[r] = [x - k * y for x, y in zip(m[r], m[c])]
    return [m[r][3] / m[r][r] for r in range(3)]


def solve(rail, core, vin, i, l_factor=1.0, worst=False):
    """Lowest fixed point from ambient (§4).  Returns the state with `temps`; raises Dropout, Runaway or Underdriven."""
    if core.hs.ron25 is None or (core.rc.kind == "switch" and core.rc.ron25 is None):
        raise Underdriven
    l = core.ch.inductance(i) * l_factor
    return fixed_point(lambda t: state(rail, core, vin, i, t, l, worst), rail["ta"])


def fixed_point(step, ta):
    """Plain iteration from ambient.  Where that overshoots (a cold diode drops more, so the first step is too long), half steps."""
    try:
        return iterate(step, ta, 1.0)
    except Cycle:
        raise
    except Runaway:
        return iterate(step, ta, 0.5)


def iterate(step, ta, share):
    def relaxed(t):
        return tuple(a + share * (b - a) for a, b in zip(t, step(t)[1]))

    temps = (ta, ta, ta)
    old = None
    first = True
    since = newtons = 0
    for k in range(20000):
        try:
            s, new = step(temps)
        except Dropout:
            raise Dropout if first else Runaway
        first = False
        new = tuple(t + share * (n - t) for t, n in zip(temps, new))
        if max(new) > 500:
            raise Runaway
        res = max(abs(a - b) for a, b in zip(new, temps))
        gain = res / old if old else 1.0
        if res <= (5e-16 if newtons < 2 and k < 300 else 1e-13) * max(100.0, max(temps)) or (gain < 0.9 and since >= 2 and res * gain / (1 - gain) < 1e-13):
            s["temps"] = new
            return s
        old = res
        since += 1
        if since >= 40:  # slow: a Newton step with a numerical Jacobian, only upwards and only while the gain is below 1
            since = 0
            old = None
            if gain < 1:
                h = 1e-4
                cols = []
                try:
                    for j in range(3):
                        bumped = tuple(t + (h if q == j else 0) for q, t in enumerate(temps))
                        cols.append([(x - y) / h for x, y in zip(relaxed(bumped), new)])
                except (Dropout, Underdriven):
                    cols = None
                if cols:
                    a = [[(1.0 if r == c else 0.0) - cols[c][r] for c in range(3)] for r in range(3)]
                    dlt = solve3(a, [x - y for x, y in zip(new, temps)])
                    if dlt is not None:
                        jump = tuple(t + x for t, x in zip(temps, dlt))
                        if all(ta <= t <= 500 for t in jump):
                            try:
                                step(jump)
                                temps = jump
                                newtons += 1
                                continue
                            except (Dropout, Underdriven):
                                pass
        temps = new
    raise Cycle  # around a jump of the loss (mode change, forward-drop pair): booked as runaway, flagged


# ------------------------------------------------------------------------------------------------ ripple


def ripple_exact(segments, c, esr, esl):
    """Peak to peak of v = q/C + ESR·i + ESL·di/dt for a periodic piecewise-linear current: [(seconds, i start, i end)]."""
    q = 0.0
    low, high = math.inf, -math.inf
    for t, i0, i1 in segments:
        if t <= 0:
            continue
        m = (i1 - i0) / t
        times = [0.0, t]
        if m != 0:
            x = -(i0 + m * esr * c) / m
            if 0 < x < t:
                times.append(x)
        for x in times:
            v = (q + i0 * x + m * x * x / 2) / c + esr * (i0 + m * x) + esl * m
            low, high = min(low, v), max(high, v)
        q += (i0 + i1) / 2 * t
    return high - low


def output_ripple(s, f, c, esr, esl):
    t, i = 1 / f, s["i"]
    if s["mode"] == "continuous":
        segments = [(s["d"] * t, s["iv"] - i, s["ip"] - i), ((1 - s["d"]) * t, s["ip"] - i, s["iv"] - i)]
    else:
        segments = [(s["d"] * t, -i, s["ip"] - i), (s["d2"] * t, s["ip"] - i, -i), ((1 - s["d"] - s["d2"]) * t, -i, -i)]
    return ripple_exact(segments, c, esr, esl)


def input_ripple(s, f, c, esr):
    t = 1 / f
    iin = s["d"] * (s["iv"] + s["ip"]) / 2
    return ripple_exact([(s["d"] * t, iin - s["iv"], iin - s["ip"]), ((1 - s["d"]) * t, iin, iin)], c, esr, 0.0)


# ------------------------------------------------------------------------------------------------ limits


def row(limit, slot, part, value, bound, point=None, lower=False, strict=False):
    if lower:
        holds = value >= bound - REL * abs(bound)
        if strict:
            holds = value > bound
        margin = (value - bound) / bound if bound else None
    else:
        holds = value <= bound + REL * abs(bound)
        margin = (bound - value) / bound if bound else (-math.inf if value > 0 else 0.0)
    return {"limit": limit, "slot": slot, "part": part, "value": value, "bound": bound, "margin": margin, "point": point, "holds": holds}


def broken(limit, slot, part, point=None):
    return {"limit": limit, "slot": slot, "part": part, "value": None, "bound": None, "margin": None, "point": point, "holds": False}


def worst_row(rows):
    rows = [r for r in rows if r is not None]
    return [min(rows, key=lambda r: r["margin"])] if rows else []


class Core:
    """A stage without its banks, solved at every corner: nominal, worst parts, least inductance."""

    def __init__(self, rail, f, hs, rc, ch):
        self.rail, self.f, self.hs, self.rc, self.ch = rail, f, hs, rc, ch
        self.nominal, self.worst, self.lmin = [], [], []
        self.modes = []
        self.failed = []
        self.cycle = False
        for k, (vin, i, share) in enumerate(rail["corners"]):
            for which, into, kw in (("nominal", self.nominal, {}), ("worst", self.worst, {"worst": True}),
                                    ("lmin", self.lmin, {"l_factor": 1 - ch.tolerance})):
                try:
                    into.append(solve(rail, self, vin, i, **kw))
                    mode = into[-1]["mode"]
                except (Dropout, Runaway, Underdriven) as e:
                    into.append(None)
                    mode = "runaway" if isinstance(e, Runaway) else type(e).__name__.lower()
                    self.cycle = self.cycle or isinstance(e, Cycle)
                    self.failed.append((mode, k, which))
                if which == "nominal":
                    self.modes.append(mode)
        self.point_losses = [None if s is None else self.drive(s) for s in self.nominal]
        self.core_w = [None if s is None else
                       sum(s["high_switch"].values()) + sum(s["rectifier"].values()) + sum(s["inductor"].values()) + sum(d.values())
                       for s, d in zip(self.nominal, self.point_losses)]
        self.rows = self.limits()

    def drive(self, s):
        rail = self.rail
        supply = rail["supply"]
        vs = s["vin"] if supply == "input" else rail["vo"] if supply == "output" else rail["vdrv"] / supply
        return {"high_gate": self.hs.bank_qg * self.f * vs,
                "rectifier_gate": (self.rc.bank_qg - self.rc.bank_qgd) * self.f * vs, "bias": rail["bias"] * vs}

    def limits(self):
        rail, f, hs, rc, ch = self.rail, self.f, self.hs, self.rc, self.ch
        corners = rail["corners"]
        switches = [("high_switch", hs)] + ([("rectifier", rc)] if rc.kind == "switch" else [])
        out = []
        stress = max(rail["vin"][2], rail["surge"]) * rail["ringing"]
        for slot, b in (("high_switch", hs), ("rectifier", rc)):
            out.append(row("voltage", slot, b.name, stress, rail["voltage_derating"] * b.part["voltage_rating"]))
        for slot, b in switches:
            out.append(row("gate_voltage", slot, b.name, rail["vdrv"], b.lowest_gate, lower=True))
            out.append(row("gate_voltage", slot, b.name, rail["vdrv"], b.vpl, lower=True, strict=True))
            if "gate_rating" in b.part:
                out.append(row("gate_voltage", slot, b.name, rail["vdrv"], b.part["gate_rating"]))
        if rc.kind == "switch":
            out.append(row("dead_time", "high_switch", hs.name, hs.turn_off_time(rail, False), rail["dead_time"]))
            out.append(row("dead_time", "rectifier", rc.name, rc.turn_off_time(rail, True), rail["dead_time"]))
        elif rc.missing_recovery:
            out.append(broken("missing_recovery_charge", "rectifier", rc.name))
        if rail["supply_limit"] is not None:
            out.append(row("drive_current", "drive", None, (hs.bank_qg + rc.bank_qg - rc.bank_qgd) * f + rail["bias"], rail["supply_limit"]))
        seen = set()
        for mode, k, which in self.failed:
            limit = {"underdriven": "gate_voltage"}.get(mode, mode)
            if limit not in seen:
                seen.add(limit)
                out.append(broken(limit, "high_switch" if limit == "gate_voltage" else None, None, k))
        for slot, b, index in (("high_switch", hs, 0), ("rectifier", rc, 1)):
            out += worst_row([s and row("junction", slot, b.name, s["temps"][index], b.limit - rail["junction_margin"], k)
                              for k, s in enumerate(self.worst)])
        out += worst_row([s and row("winding", "inductor", ch.name, s["temps"][2], rail["winding_temperature"], k)
                          for k, s in enumerate(self.worst)])
        sat, cur = [], {slot: [] for slot, b in switches}
        for k, s in enumerate(self.lmin):
            if s is None:
                continue
            peak = s["ip"]
            if corners[k][1] == rail["io"]:
                peak += max(0.0, rail["peak"] - rail["io"])
            sat.append(row("saturation", "inductor", ch.name, peak * rail["saturation_margin"], ch.saturation(s["temps"][2]), k))
            for slot, b in switches:
                if "current_rating" in b.part:
                    cur[slot].append(row("switch_current", slot, b.name, peak / b.n, b.part["current_rating"], k))
        out += worst_row(sat)
        for slot, b in switches:
            out += worst_row(cur[slot])
        if rc.kind == "diode":
            share = 1.3 if rc.n > 1 else 1.0
            out += worst_row([s and row("rectifier_current", "rectifier", rc.name, s["iavg"] / rc.n * share,
                                        rail["current_derating"] * rc.part["current_rating"], k) for k, s in enumerate(self.nominal)])
        low, high = rail["ripple_ratio"]
        for k, s in enumerate(self.nominal):
            if s and corners[k][0] == rail["vin"][1] and corners[k][1] == rail["io"]:
                if low is not None:
                    out.append(row("ripple_ratio", "inductor", ch.name, s["ripple"] / rail["io"], low, k, lower=True))
                if high is not None:
                    out.append(row("ripple_ratio", "inductor", ch.name, s["ripple"] / rail["io"], high, k))
        for name, least, length in (("minimum_on", rail["minimum_on"], lambda d: d / f), ("minimum_off", rail["minimum_off"], lambda d: (1 - d) / f)):
            if least > 0:
                out += worst_row([s and s["mode"] == "continuous" and row(name, None, None, length(s["d"]), least, k, lower=True) or None
                                  for k, s in enumerate(self.nominal)])
        return out


def input_bank(core, bank):
    """(loss at every corner, nominal ripple at every corner, limit rows)."""
    rail, f = core.rail, core.f
    esr = bank.esr(f)
    losses = [s and esr * s["icin2"] for s in core.nominal]
    ripples = [s and input_ripple(s, f, bank.capacitance(s["vin"]), esr) for s in core.nominal]
    rows = [row("capacitor_voltage", "input_bank", bank.name, max(rail["vin"][2], rail["surge"]),
                rail["capacitor_voltage_derating"][bank.kind] * bank.part["voltage_rating"])]
    if "ripple_current" in bank.part:
        rows += worst_row([s and row("capacitor_current", "input_bank", bank.name, math.sqrt(max(s["icin2"], 0.0)) / bank.n,
                                     bank.part["ripple_current"], k) for k, s in enumerate(core.nominal)])
    if rail["input_ripple"] is not None:
        rows += worst_row([s and row("input_ripple", "input_bank", bank.name,
                                     input_ripple(s, f, bank.capacitance(s["vin"]) * (1 - bank.tolerance), esr),
                                     rail["input_ripple"], k) for k, s in enumerate(core.nominal)])
    return losses, ripples, rows


def output_bank(core, bank):
    rail, f = core.rail, core.f
    esr, c = bank.esr(f), bank.capacitance(rail["vo"])
    losses = [s and esr * s["icout2"] for s in core.nominal]
    ripples = [s and output_ripple(s, f, c, esr, bank.esl) for s in core.nominal]
    low_c = c * (1 - bank.tolerance)
    rows = [row("capacitor_voltage", "output_bank", bank.name, rail["vo"],
                rail["capacitor_voltage_derating"][bank.kind] * bank.part["voltage_rating"])]
    if "ripple_current" in bank.part:
        rows += worst_row([s and row("capacitor_current", "output_bank", bank.name, math.sqrt(max(s["icout2"], 0.0)) / bank.n,
                                     bank.part["ripple_current"], k) for k, s in enumerate(core.nominal)])
    if rail["output_ripple"] is not None:
        rows += worst_row([s and row("output_ripple", "output_bank", bank.name, output_ripple(s, f, low_c, esr, bank.esl),
                                     rail["output_ripple"], k) for k, s in enumerate(core.lmin)])
    if rail["step"] is not None:
        step = rail["step"]
        l = core.ch.inductance(rail["io"]) * (1 + core.ch.tolerance)
        found = []
        for k, (vin, i, share) in enumerate(rail["corners"]):
            if i == rail["io"] and vin > rail["vo"]:
                found.append(row("load_step", "output_bank", bank.name,
                                 load_step(vin, rail["vo"], l, low_c, esr, step["current"], step.get("crossover")), step["deviation"], k))
        rows += worst_row(found)
    return losses, ripples, rows


def load_step(vin, vo, l, c, esr, di, crossover):
    worst = 0.0
    for m in ((vin - vo) / l, vo / l):
        t = di / m - esr * c
        dev = di * di / (2 * m * c) + m * esr * esr * c / 2 if t > 0 else esr * di
        worst = max(worst, dev)
    if crossover:
        worst = max(worst, di / (2 * math.pi * crossover * c) + esr * di)
    return worst


# ------------------------------------------------------------------------------------------------ a whole stage


def totals(rail, slots):
    """cost, area, height (None when any is unknown) and rows for what is unknown but needed."""
    out, rows = {}, []
    needed = {"cost": rail["limit_cost"] is not None or rail["worth_cost"] > 0,
              "area": rail["limit_area"] is not None or rail["worth_area"] > 0, "height": rail["limit_height"] is not None}
    for key in ("cost", "area", "height"):
        values = [b.part.get(key) for b in slots]
        if any(v is None for v in values):
            out[key] = None
            if needed[key]:
                rows += [broken("missing_" + key, slot, b.name) for slot, b, v in zip(SLOTS, slots, values) if v is None]
        elif key == "height":
            out[key] = max(values)
        else:
            out[key] = sum(b.n * v for b, v in zip(slots, values))
    return out, rows


def whole(rail, core, bank_in, bank_out, part_in, part_out):
    """Figures of the complete stage: burden, weighted figures, total limits."""
    slots = (core.hs, core.rc, core.ch, bank_in, bank_out)
    tot, rows = totals(rail, slots)
    loss = pin = pout = 0.0
    point_loss = []
    known = True
    for k, (vin, i, share) in enumerate(rail["corners"]):
        if core.nominal[k] is None:
            point_loss.append(None)
            known = known and share == 0
            continue
        p = core.core_w[k] + part_in[0][k] + part_out[0][k]
        point_loss.append(p)
        if share:
            loss += share * p
            pout += share * rail["vo"] * i
            pin += share * (rail["vo"] * i + p)
    res = {"cost": tot["cost"], "area_mm2": tot["area"], "height_mm": tot["height"], "point_loss": point_loss,
           "burden": None, "weighted_loss_w": None, "weighted_efficiency": None}
    if known:
        res["weighted_loss_w"], res["weighted_efficiency"] = loss, pout / pin
        burden = rail["worth_loss"] * loss
        if rail["worth_area"] > 0:
            burden = None if tot["area"] is None else burden + rail["worth_area"] * tot["area"]
        if rail["worth_cost"] > 0 and burden is not None:
            burden = None if tot["cost"] is None else burden + rail["worth_cost"] * tot["cost"]
        res["burden"] = burden
        if rail["limit_efficiency"] is not None:
            rows.append(row("efficiency", None, None, pout / pin, rail["limit_efficiency"], lower=True))
    for key in ("area", "height", "cost"):
        if rail["limit_" + key] is not None and tot[key] is not None:
            rows.append(row(key, None, None, tot[key], rail["limit_" + key]))
    res["rows"] = rows
    return res


def find(catalog, name):
    for p in catalog:
        if p["part"] == name:
            return p
    raise KeyError(f"no part {name!r}")


def build(rail, catalogs, stage):
    hs = SwitchBank(find(catalogs["switches"], stage["high_switch"]["part"]), stage["high_switch"]["count"], rail)
    r = stage["rectifier"]
    if r["kind"] == "switch":
        rc = SwitchBank(find(catalogs["switches"], r["part"]), r["count"], rail)
    else:
        rc = DiodeBank(find(catalogs["diodes"], r["part"]), r["count"], rail)
    ch = Choke(find(catalogs["inductors"], stage["inductor"]["part"]), 1, rail)
    bi = Bank(find(catalogs["capacitors"], stage["input_bank"]["part"]), stage["input_bank"]["count"], rail)
    bo = Bank(find(catalogs["capacitors"], stage["output_bank"]["part"]), stage["output_bank"]["count"], rail)
    return hs, rc, ch, bi, bo


def account(rail, catalogs, stage):
    hs, rc, ch, bi, bo = build(rail, catalogs, stage)
    core = Core(rail, stage["frequency_hz"], hs, rc, ch)
    pi, po = input_bank(core, bi), output_bank(core, bo)
    res = whole(rail, core, bi, bo, pi, po)
    points = []
    for k, (vin, i, share) in enumerate(rail["corners"]):
        s = core.nominal[k]
        p = {"input_v": vin, "load_a": i, "ambient_c": rail["ta"], "share": share, "mode": core.modes[k]}
        if s is None:
            for key in ("duty", "ripple_a", "peak_a", "valley_a", "output_ripple_v", "input_ripple_v", "loss_w", "efficiency"):
                p[key] = None
            p["losses_w"] = {a: dict.fromkeys(b) for a, b in LOSS_KEYS.items()}
            p["rms_a"] = dict.fromkeys(SLOTS)
            p["temperature_c"] = dict.fromkeys(SLOTS[:3])
        else:
            loss = res["point_loss"][k]
            p.update({"duty": s["d"], "ripple_a": s["ripple"], "peak_a": s["ip"], "valley_a": s["iv"], "output_ripple_v": po[1][k],
                      "input_ripple_v": pi[1][k], "loss_w": loss, "efficiency": rail["vo"] * i / (rail["vo"] * i + loss),
                      "losses_w": {"high_switch": s["high_switch"], "rectifier": s["rectifier"], "inductor": s["inductor"],
                                   "input_bank": {"esr": pi[0][k]}, "output_bank": {"esr": po[0][k]}, "drive": core.point_losses[k]},
                      "rms_a": {a: math.sqrt(max(s[b], 0.0)) for a, b in zip(SLOTS, ("ih2", "ir2", "il2", "icin2", "icout2"))},
                      "temperature_c": dict(zip(SLOTS, s["temps"]))})
        points.append(p)
    rows = core.rows + pi[2] + po[2] + res["rows"]
    rows.sort(key=lambda r: r["holds"])
    assumed = [{"slot": slot, "part": b.name, "quantity": q, "value": v, "unit": u, "why": w}
               for slot, b in zip(SLOTS, (hs, rc, ch, bi, bo)) for q, v, u, w in b.assumed]
    return {"schema": "account/1", "rail": rail["name"], "stage": stage, "burden": res["burden"], "cost": res["cost"],
            "area_mm2": res["area_mm2"], "weighted_loss_w": res["weighted_loss_w"], "weighted_efficiency": res["weighted_efficiency"],
            "points": points, "limits": rows, "assumed": assumed,
            "notes": {"failed": [list(x) for x in core.failed], "cycle": core.cycle}}


LOSS_KEYS = {"high_switch": ("conduction", "overlap", "output_charge", "recovery"), "rectifier": ("conduction", "dead_time", "leakage"),
             "inductor": ("winding_dc", "winding_ac", "core"), "input_bank": ("esr",), "output_bank": ("esr",),
             "drive": ("high_gate", "rectifier_gate", "bias")}


# ------------------------------------------------------------------------------------------------ ranking by complete enumeration


def allowed(parts, rail, slot):
    pin = rail["pin"].get(slot)
    out = []
    for p in parts:
        if p["part"] in rail["ban"] or ("maker" in p and "maker:" + p["maker"] in rail["ban"]):
            continue
        if pin is not None and p["part"] != pin:
            continue
        out.append(p)
    return out


def choices(rail, catalogs):
    """Every (part, count) for each slot."""
    def banks(cls, parts, n):
        return [cls(p, k, rail) for p in parts for k in range(1, n + 1)]
    par = rail["parallel"]
    high = banks(SwitchBank, allowed(catalogs["switches"], rail, "high_switch"), par["high_switch"])
    rect = []
    if "switch" in rail["rectifier"]:
        rect += banks(SwitchBank, allowed(catalogs["switches"], rail, "rectifier"), par["rectifier"])
    if "diode" in rail["rectifier"]:
        rect += banks(DiodeBank, allowed(catalogs["diodes"], rail, "rectifier"), par["rectifier"])
    chokes = banks(Choke, allowed(catalogs["inductors"], rail, "inductor"), 1)
    bi = banks(Bank, allowed(catalogs["capacitors"], rail, "input"), par["input"])
    bo = banks(Bank, allowed(catalogs["capacitors"], rail, "output"), par["output"])
    return high, rect, chokes, bi, bo


def stage_object(f, hs, rc, ch, bi, bo):
    return {"frequency_hz": f, "high_switch": {"part": hs.name, "count": hs.n},
            "rectifier": {"kind": rc.kind, "part": rc.name, "count": rc.n}, "inductor": {"part": ch.name, "count": 1},
            "input_bank": {"part": bi.name, "count": bi.n}, "output_bank": {"part": bo.name, "count": bo.n}}


def order_key(burden, loss, f, hs, rc, ch, bi, bo):
    return (burden, loss, *(b.name.encode() for b in (hs, rc, ch, bi, bo)), hs.n, rc.n, 1, bi.n, bo.n, f)


def shortlist(rail, catalogs, top=10, distinct="triple"):
    high, rect, chokes, inputs, outputs = choices(rail, catalogs)
    crossed = len(rail["frequency"]) * len(high) * len(rect) * len(chokes) * len(inputs) * len(outputs)
    best, near, evaluated, cycles = {}, {}, 0, 0

    def names(rows):
        return {r["limit"] for r in rows if not r["holds"]}

    def group(hs, rc, ch, key):
        if distinct == "triple":
            return hs.name, rc.kind, rc.name, ch.name
        if distinct == "switches":
            return hs.name, rc.kind, rc.name
        return key

    for f, hs, rc, ch in itertools.product(rail["frequency"], high, rect, chokes):
        core = Core(rail, f, hs, rc, ch)
        bad_core = names(core.rows)
        cycles += core.cycle
        evaluated += len(inputs) * len(outputs)
        if len(bad_core) > 1:
            continue  # two limits broken whatever the banks: neither passing nor the miss of one limit alone
        ins = [(b, input_bank(core, b)) for b in inputs]
        outs = [(b, output_bank(core, b)) for b in outputs]
        ins = [(b, p, names(p[2])) for b, p in ins]
        outs = [(b, p, names(p[2])) for b, p in outs]
        for (bi, pi, bad_i), (bo, po, bad_o) in itertools.product(ins, outs):
            bad = bad_core | bad_i | bad_o
            if len(bad) > 1:
                continue
            res = whole(rail, core, bi, bo, pi, po)
            bad |= names(res["rows"])
            if not bad:
                key = order_key(res["burden"], res["weighted_loss_w"], f, hs, rc, ch, bi, bo)
                g = group(hs, rc, ch, key)
                if g not in best or key < best[g][0]:
                    best[g] = (key, f, core, bi, bo, pi, po, res)
            elif len(bad) == 1 and not best:
                limit = next(iter(bad))
                rows = [r for r in core.rows + pi[2] + po[2] + res["rows"] if not r["holds"]]
                if any(r["margin"] is None for r in rows):
                    continue
                w = min(rows, key=lambda r: r["margin"])
                key = (-w["margin"], *order_key(0, 0, f, hs, rc, ch, bi, bo)[2:])
                if limit not in near or key < near[limit][0]:
                    near[limit] = (key, w, stage_object(f, hs, rc, ch, bi, bo))
    stages = []
    for rank, (key, f, core, bi, bo, pi, po, res) in enumerate(sorted(best.values(), key=lambda x: x[0])[:top], 1):
        resistance = charge = 0.0
        for k, (vin, i, share) in enumerate(rail["corners"]):
            if share:
                s = core.nominal[k]
                resistance += share * (s["high_switch"]["conduction"] + (s["rectifier"]["conduction"] if core.rc.kind == "switch" else 0.0))
                charge += share * (s["high_switch"]["overlap"] + s["high_switch"]["output_charge"] + s["high_switch"]["recovery"]
                                   + core.point_losses[k]["high_gate"] + core.point_losses[k]["rectifier_gate"])
        tight = min((r for r in core.rows + pi[2] + po[2] + res["rows"] if r["margin"] is not None), key=lambda r: r["margin"])
        stages.append({"rank": rank, "stage": stage_object(f, core.hs, core.rc, core.ch, bi, bo), "burden": res["burden"],
                       "cost": res["cost"], "area_mm2": res["area_mm2"], "weighted_loss_w": res["weighted_loss_w"],
                       "weighted_efficiency": res["weighted_efficiency"], "resistance_w": resistance, "charge_w": charge,
                       "tightest": {"limit": tight["limit"], "margin": tight["margin"]},
                       "assumed": sum(len(b.assumed) for b in (core.hs, core.rc, core.ch, bi, bo))})
    nothing = None
    if not stages:
        nothing = [{"limit": l, "bound": w["bound"], "needed": w["value"], "with": s} for l, (k, w, s) in sorted(near.items())]
    return {"schema": "shortlist/1", "rail": rail["name"], "crossed": str(crossed), "evaluated": evaluated, "proven": True,
            "stages": stages, "nothing_passes": nothing, "notes": {"cores_with_a_cycle": cycles}}


def bench(rail, catalogs, n):
    """n stages spread over the crossing, each fitted and evaluated whole: all corners, all limits, nothing kept between stages."""
    slots = choices(rail, catalogs)
    sizes = [len(rail["frequency"])] + [len(s) for s in slots]
    total = math.prod(sizes)
    stages = []
    for j in range(n):
        x = (j * 2654435761) % total
        index = []
        for size in reversed(sizes):
            index.append(x % size)
            x //= size
        index.reverse()
        stages.append((rail["frequency"][index[0]], [s[i] for s, i in zip(slots, index[1:])]))
    known, loss_w = 0, 0.0
    start = time.perf_counter()
    for f, banks in stages:
        hs, rc, ch, bi, bo = (type(b)(b.part, b.n, rail) for b in banks)
        core = Core(rail, f, hs, rc, ch)
        res = whole(rail, core, bi, bo, input_bank(core, bi), output_bank(core, bo))
        if res["weighted_loss_w"] is not None:
            known += 1
            loss_w += res["weighted_loss_w"]
    seconds = time.perf_counter() - start
    print(f"{n} {seconds:.6f} {known} {loss_w!r}")


def clean(x):
    """No infinities in JSON."""
    if isinstance(x, float) and not math.isfinite(x):
        return None
    if isinstance(x, dict):
        return {k: clean(v) for k, v in x.items()}
    if isinstance(x, list):
        return [clean(v) for v in x]
    return x


def main(argv):
    if len(argv) < 3 or argv[0] not in ("account", "shortlist", "bench"):
        print(__doc__, file=sys.stderr)
        return 2
    rail, catalogs = read_rail(argv[1]), read_catalogs(argv[2])
    if argv[0] == "account":
        with open(argv[3]) as handle:
            stage = json.load(handle)
        stage = stage.get("stage", stage)
        doc = account(rail, catalogs, stage)
        print(json.dumps(clean(doc), indent=1, ensure_ascii=False))
        return 1 if any(not r["holds"] for r in doc["limits"]) else 0
    if argv[0] == "bench":
        bench(rail, catalogs, int(argv[3]))
        return 0
    top, distinct, rest = 10, "triple", argv[3:]
    while rest:
        if rest[0] == "--top":
            top = int(rest[1])
        elif rest[0] == "--distinct":
            distinct = rest[1]
        rest = rest[2:]
    doc = shortlist(rail, catalogs, top, distinct)
    print(json.dumps(clean(doc), indent=1, ensure_ascii=False))
    return 0 if doc["stages"] else 1


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
