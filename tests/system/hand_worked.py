"""A page of `slipledger explain` worked out again from raw readings and plant file, by formulas written here and nowhere
else. Taken from the page are only the filter's states with their standard deviations; everything else on it must come
out as printed, to the last printed digit (or as near as the states' own digits allow)."""
import math
from datetime import datetime, timedelta

from pocket_calculator import DIGITS, USUAL_DIGITS, half_of_last_digit
from proving_ground import want

STATES = ("ln_a", "ln_b", "ln_c", "dV", "z", "k", "x", "v", "u")
SPREADS = ("w_own", "y_q")  # their standard deviations come from the filter's covariance
NOT_BY_HAND = {"H_low", "H_mid", "H_high", "d_R"}  # quadrature; what was seen since the life began
Q90 = 1.2815515655446004  # 90 % quantile of the normal
REGIMES = {"_m": "full-flow", "_k": "compensating"}


def number(text):
    return float(text) if text else None


def instant(text):
    return datetime.fromisoformat(text.replace("Z", "+00:00"))


class Oil:
    """Two points, a density: ASTM D341 and D1250, written out."""

    def __init__(self, facts):
        name = facts["fluid"]
        own = facts["own_fluids"].get(name)
        if own and "points" in own:
            (self.t1, self.nu1), (self.t2, self.nu2) = [(p["temperature_c"], p["viscosity_cst"]) for p in own["points"]]
            self.rho15 = own.get("density_15_kgm3", 875.0)
        else:
            table = facts["fluids"][name]
            self.t1, self.nu1, self.t2 = 40.0, float(table["iso_vg"]), 100.0
            self.nu2 = viscosity_at_100(self.nu1, table["viscosity_index"])
            self.rho15 = table["density_15_kgm3"]
        w1, w2 = (math.log10(math.log10(nu + 0.7)) for nu in (self.nu1, self.nu2))
        x1, x2 = (math.log10(t + 273.15) for t in (self.t1, self.t2))
        self.slope = (w1 - w2) / (x2 - x1)
        self.intercept = w1 + self.slope * x1

    def nu(self, t):
        return 10 ** 10 ** (self.intercept - self.slope * math.log10(t + 273.15)) - 0.7

    def rho(self, t):
        expansion = 0.6278 / self.rho15 * (t - 15)
        return self.rho15 * math.exp(-expansion * (1 + 0.8 * expansion))

    def mu(self, t):
        return self.nu(t) * 1e-6 * self.rho(t)


def viscosity_at_100(at_40, index):
    """ASTM D2270's fit of its table between 6.4 and 9 mm2/s at 100 degC, searched for the index."""
    def index_of(y):
        if y < 7.0:
            low, high = 3.35714 * y * y - 23.5643 * y + 78.466, 0.22619 * y * y + 7.7369 * y - 16.656
        elif y < 7.7:
            low, high = 0.01191 * y * y + 21.475 * y - 72.87, 0.79762 * y * y - 0.7321 * y + 14.61
        else:
            low, high = 0.41858 * y * y + 16.1558 * y - 56.04, 0.05794 * y * y + 10.5156 * y - 28.24
        return 100.0 * (low - at_40) / (low - high)

    below, above = 6.4, 9.0
    for _ in range(60):
        middle = 0.5 * (below + above)
        below, above = (middle, above) if index_of(middle) < index else (below, middle)
    return 0.5 * (below + above)


class Pump:
    """What this test reads off the plant file by itself."""

    def __init__(self, facts, section):
        pump = facts["pump"]
        own = next((s for s in pump.get("sections", []) if s["id"] == section), {})
        said = {**pump, **own}
        self.displacement = float(said["displacement_cm3"])
        rated = said["rated"]
        self.rated = (float(rated["pressure_bar"]), float(rated["speed_rpm"]), float(rated["fluid_temperature_c"]))
        self.reference = (0.75 * self.rated[0], self.rated[1], self.rated[2])
        meter = said["sensors"].get("delivery_flow")
        self.at_pressure = bool(meter) and meter.get("measured_at", "pressure-side") == "pressure-side"
        self.compensator = said.get("compensator_bar")
        self.replacement = said.get("replacement")
        self.makes_up_by = said.get("makes_up_by", "nothing" if said.get("control", "fixed") == "fixed" else "stroke")


def as_of(rows, quantity, at, hold):
    """The last value not older than `hold`."""
    value, taken = None, None
    for row in rows:
        if instant(row["time"]) > at:
            break
        if row[quantity]:
            value, taken = float(row[quantity]), instant(row["time"])
    return value if taken is not None and at - taken <= hold else None


def point_of(rows, at, pump, oil, basis, hold):
    """One operating point, from the raw rows: every symbol of it."""
    flow = "case_drain_flow" if basis == "case-drain" else "delivery_flow"
    read = {q: as_of(rows, q, at, hold) for q in (flow, "outlet_pressure", "shaft_speed", "fluid_temperature")}
    q, p, n, t = read[flow], read["outlet_pressure"], read["shaft_speed"], read["fluid_temperature"]
    p_ref, n_ref, t_ref = pump.reference
    got = {"q": q, "p": p, "n": n, "t": t, "dp": p, "V": pump.displacement, "q_th": pump.displacement * n / 1000}
    if basis == "case-drain":
        got |= {"p_c": 0.0, "q_f": 0.0, "q_s": q}
    else:
        got |= {"p_i": 0.0, "K": 1.4, "q_d": q / (1 - p / 14000) if pump.at_pressure else q}
        got["q_s"] = got["q_th"] - got["q_d"]
    got |= {"nu": oil.nu(t), "rho": oil.rho(t), "mu": oil.mu(t)}
    got["f1"] = (p / got["mu"]) / (p_ref / oil.mu(t_ref))
    got["f2"] = math.sqrt((p / got["rho"]) / (p_ref / oil.rho(t_ref)))
    got["f3"] = n / n_ref
    return got


def trimmed(points):
    """The 5 % at each end of the residuals about a line of leakage on f1 are left out; none under 20 points."""
    cut = int(0.05 * len(points)) if len(points) >= 20 else 0
    mean_y = sum(p["q_s"] for p in points) / len(points)
    mean_f = sum(p["f1"] for p in points) / len(points)
    spread = sum((p["f1"] - mean_f) ** 2 for p in points)
    slope = sum((p["f1"] - mean_f) * (p["q_s"] - mean_y) for p in points) / spread if spread > 0 else 0.0
    by_residual = sorted(points, key=lambda p: p["q_s"] - mean_y - slope * (p["f1"] - mean_f))
    return by_residual[cut:len(by_residual) - cut]


def means_of(points, tag, basis):
    kept = trimmed(points)
    symbols = {"q": "q_s", "f1": "f1", "f2": "f2", "f3": "f3", "dp": "dp", "t": "t", "nu": "nu", "n": "n", "qth": "q_th"}
    if basis == "delivery":
        symbols["qd"] = "q_d"
    return {symbol + tag: sum(p[of] for p in kept) / len(kept) for symbol, of in symbols.items()}, len(kept)


def root(function, below, above):
    for _ in range(200):
        middle = 0.5 * (below + above)
        below, above = (middle, above) if function(middle) < 0 else (below, middle)
    return 0.5 * (below + above)


def ratio_of(means, counts, states, basis):
    """Leakage that wears and healthy leakage, regimes by their points."""
    a, b, c = (math.exp(states[s]) for s in ("ln_a", "ln_b", "ln_c"))
    worn = healthy = 0.0
    for tag, count in counts.items():
        off = states["z"] + (states.get("k", 0.0) if tag == "_k" else 0.0)
        if basis == "delivery":
            off += states["dV"] * means["n" + tag] / 1000
        worn += count * (means["q" + tag] - off)
        healthy += count * (a * means["f1" + tag] + b * means["f2" + tag] + c * means["f3" + tag])
    total = sum(counts.values())
    return worn / total, healthy / total


def verdict_by_hand(page, pump, oil, raw, states):
    """Every symbol that follows from the states and the hour's means."""
    got = {}
    basis = page["basis"]
    a, b, c = (math.exp(states[s]) for s in ("ln_a", "ln_b", "ln_c"))
    got |= {"a": a, "b": b, "c": c}
    got["q_w"], got["h"] = ratio_of(raw["means"], raw["counts"], states, basis)
    got["w_own"] = got["q_w"] / got["h"]
    got["w_own_low"] = got["w_own"] - Q90 * states["sd_w_own"]
    got["w_own_high"] = got["w_own"] + Q90 * states["sd_w_own"]
    w = math.exp(states["x"])
    got |= {"w": w, "w_low": w * math.exp(-Q90 * states["sd_x"]), "w_high": w * math.exp(Q90 * states["sd_x"])}

    at_rated = any(step["symbol"] == "n_R" for step in page["steps"])
    p_ref, n_ref, t_ref = pump.reference
    p, n, t = pump.rated if at_rated else pump.reference
    got["F1"] = p / oil.mu(t) * oil.mu(t_ref) / p_ref
    got["F2"] = math.sqrt(p / oil.rho(t) * oil.rho(t_ref) / p_ref)
    got["F3"] = n / n_ref
    got["h_q"] = a * got["F1"] + b * got["F2"] + c * got["F3"]
    got["q_thq"] = (pump.displacement - states.get("dV", 0.0)) * n / 1000
    got["y_q"] = math.log(got["h_q"]) + states["x"]
    got["eta_0"] = 1 - got["h_q"] / got["q_thq"]
    got["eta"] = 1 - w * got["h_q"] / got["q_thq"]
    got["eta_low"] = 1 - w * got["h_q"] * math.exp(Q90 * states["sd_y_q"]) / got["q_thq"]
    got["eta_high"] = 1 - w * got["h_q"] * math.exp(-Q90 * states["sd_y_q"]) / got["q_thq"]
    for end in ("", "_low", "_high"):
        got["lost" + end] = 100 * got["h_q"] / got["q_thq"] * (got["w" + end] - 1)

    got["e"] = got["q_w"] - got["h"]
    larger = max(raw["counts"], key=raw["counts"].get)
    got["P_w"] = raw["means"]["dp" + larger] * got["q_w"] / 600
    got["g"] = 100 * (root(lambda g: (a * g ** 3 + (b + c) * g) / (a + b + c) - w, 0.0, 20.0) - 1)
    got["w_g"] = w
    for end, drift in (("", 0.0), ("_low", -Q90), ("_high", Q90)):
        got["G" + end] = w * (states["v"] + drift * states["sd_v"]) * 1000 / 24
    got["w_e"] = 1 + 10.0 / (100 * got["h_q"] / got["q_thq"])
    return got


def money_by_hand(page, pump, facts, days):
    """From the stored days of four weeks: power, a year's energy, its price, and when a replacement has paid for itself."""
    four_weeks = days[-28:]
    today, economics = days[-1], facts["economics"]
    w, eta_0 = today["leakage_ratio"], today["efficiency_baseline"]
    got = {"w_d": w, "w_d_low": today["leakage_ratio_low"], "w_d_high": today["leakage_ratio_high"], "eta_d": eta_0,
           "eta_m": economics["motor_efficiency"], "price": economics["energy_price_per_kwh"],
           "l": 100 * (w - 1) * (1 - eta_0) / eta_0}
    got["H"] = sum(day["running_h"] for day in four_weeks) / len(four_weeks) * 365.25
    if pump.makes_up_by == "stroke":
        judged = [day for day in four_weeks if day["judged_h"] > 0 and (day["leakage_lpm"] or 0) > 0]
        hours = sum(day["judged_h"] for day in judged)
        got["P_0"] = sum(day["judged_h"] * day["leakage_kw"] * (1 - day["excess_lpm"] / day["leakage_lpm"])
                         for day in judged) / hours
        share = 1.0
    else:
        got["P_0"] = next((step["value"] for step in page["steps"] if step["symbol"] == "P_0"), 0.0)
        share = (1 - eta_0) / eta_0
    per_ratio = got["P_0"] * share / got["eta_m"]
    got["P_x"] = per_ratio * (w - 1)
    yearly = per_ratio * got["H"] * got["price"]
    for end in ("", "_low", "_high"):
        got["cost" + end] = yearly * (got["w_d" + end] - 1)
    if pump.replacement:
        parts = pump.replacement
        got |= {"C_p": parts["part_cost"], "C_w": parts["work_cost"], "h_d": parts["downtime_h"],
                "c_d": economics["downtime_cost_per_h"], "r": yearly}
        got["C"] = got["C_p"] + got["C_w"] + got["h_d"] * got["c_d"]
        growth = today["trend_per_1000_h"] * got["H"] / 1000
        growth = growth if any(step["symbol"] == "g_y" and step["value"] > 0 for step in page["steps"]) else 0.0
        got["g_y"] = growth
        spent = lambda years: yearly * ((w - 1) * years + growth * years ** 2 / 2) - got["C"]  # noqa: E731
        got["T_p"] = root(spent, 0.0, 1000.0)
    return got


def limits_by_hand():
    """The built-in ladders: their own numbers, written here again."""
    got = {"L_w": 1.4, "L_e": 10.0}
    for symbol, ladder in (("R", {"watch": 1.08, "plan": 1.2, "act": 1.4}), ("E", {"watch": 4, "plan": 7, "act": 10})):
        for level, limit in ladder.items():
            got[f"{symbol}_{level}"] = limit
            got[f"{symbol}_{level}_low"] = 1 + (limit - 1) / 2 if symbol == "R" else limit / 2
    return got


def raw_by_hand(page, rows, pump, oil):
    times = [instant(row["time"]) for row in rows]
    spacing = sorted(b - a for a, b in zip(times, times[1:]))[len(times) // 2]
    hold = 1.5 * spacing + timedelta(seconds=1)
    points = {tag: [] for tag in REGIMES}
    for told in page["points"]:
        tag = next((tag for tag, regime in REGIMES.items() if told["standing"] == regime), None)
        if tag is None:
            continue
        point = point_of(rows, instant(told["time"]), pump, oil, page["basis"], hold)
        points[tag].append(point)
        for symbol, key in (("q_s", "leakage_lpm"), ("f1", "f1"), ("f2", "f2"), ("f3", "f3")):
            want(abs(point[symbol] - told[key]) <= 1.01 * half_of_last_digit(told[key]),
                 f"{told['time']}: {symbol} is told as {told[key]}, by hand {point[symbol]}")
    raw = {"means": {}, "counts": {}}
    for tag, some in points.items():
        if some:
            means, raw["counts"][tag] = means_of(some, tag, page["basis"])
            raw["means"] |= means
    raw["instant"] = point_of(rows, instant(page["at"]), pump, oil, page["basis"], hold)
    return raw


def constants(pump, oil):
    p_ref, n_ref, t_ref = pump.reference
    got = {"t_1": oil.t1, "nu_1": oil.nu1, "t_2": oil.t2, "nu_2": oil.nu2, "A": oil.intercept, "B": oil.slope,
           "rho_15": oil.rho15, "p_r": p_ref, "n_r": n_ref, "t_r": t_ref, "nu_r": oil.nu(t_ref), "rho_r": oil.rho(t_ref),
           "mu_r": oil.mu(t_ref)}
    p, n, t = pump.rated
    got |= {"p_R": p, "n_R": n, "t_R": t, "nu_R": oil.nu(t), "rho_R": oil.rho(t), "mu_R": oil.mu(t)}
    if pump.compensator:
        got["p_k0"] = None  # 3 % below the plateau, which is what was seen the seven days before
    return got


def plateau(printed, got):
    if "p_k" in printed:
        got["p_k0"] = printed["p_k"]["value"] * 0.97


def check(page, rows, facts, days):
    """Compares every printed number. Returns how many were worked out."""
    printed = {step["symbol"]: step for step in page["steps"]}
    pump, oil = Pump(facts, page["section"]), Oil(facts)
    raw = raw_by_hand(page, rows, pump, oil)
    states = {s: printed[s]["value"] for s in STATES if s in printed}
    states |= {"sd_" + s: printed[s]["sd"] for s in (*STATES, *SPREADS) if s in printed}
    days = [day for day in days if day["date"] <= local_date(page, days)]

    def all_symbols(given):
        got = {**constants(pump, oil), **raw["instant"], **raw["means"], **limits_by_hand()}
        got |= verdict_by_hand(page, pump, oil, raw, given)
        got |= money_by_hand(page, pump, facts, days)
        plateau(printed, got)
        return got

    got = all_symbols(states)
    off = {symbol: half_of_last_digit(step["value"], DIGITS.get(symbol, USUAL_DIGITS)) for symbol, step in printed.items()}
    for state, value in states.items():
        nudged = all_symbols({**states, state: value + half_of_last_digit(value)})
        for symbol in off:
            if got.get(symbol) is not None:
                off[symbol] += abs(nudged[symbol] - got[symbol])
    left = set(printed) - set(got) - set(STATES) - NOT_BY_HAND - {"p_k", "L", "L_d"}
    want(not left, f"nothing was worked out by hand for {sorted(left)}")
    compared = [symbol for symbol in printed if got.get(symbol) is not None and symbol not in STATES]
    for symbol in compared:
        value = printed[symbol]["value"]
        want(abs(got[symbol] - value) <= 1.01 * off[symbol],
             f"{page['pump']}: {symbol} ({printed[symbol]['name']}) is printed as {value}; by hand it is {got[symbol]}")
    check_first_limit(printed, got)
    check_level(page, days)
    check_month(page, got)
    return len(compared)


def local_date(page, days):
    """The last day on or before the summary's; the plant is two or three hours ahead of UTC."""
    date = (instant(page["summary"]["to"]) + timedelta(hours=2) - timedelta(milliseconds=1)).date().isoformat()
    return max(day["date"] for day in days if day["date"] <= date)


def check_first_limit(printed, got):
    if "L" not in printed:
        return
    ends = [got["L_w"], got["w_e"]]
    if "L_d" in printed:  # healthy drain share at the reference point, where every feature is 1
        healthy = (got["a"] + got["b"] + got["c"]) / (got["V"] * got["n_r"] / 1000)
        ends.append(printed["L_d"]["value"] / 100 / healthy)
    first = min(end for end in ends if end > 1)
    want(abs(first / printed["L"]["value"] - 1) < 1e-5, f"the first limit is {printed['L']['value']}, by hand {first}")


def check_level(page, days):
    """Two judged days in a row beyond a limit raise a level: told by this test's own eyes, on ratio and efficiency."""
    judged = [day for day in days if day["finished"] and day["judged_h"] > 0 and day["level"] != "unjudged"][-2:]
    raised = "sound"
    for level, limit in (("watch", 1.08), ("plan", 1.2), ("act", 1.4)):
        if all(day["leakage_ratio"] > limit and day["leakage_ratio_low"] > 1 + (limit - 1) / 2 for day in judged):
            raised = level
    title = next(r["chapter"] for r in page["remarks"] if r["chapter"].startswith("The level"))
    order = ["sound", "watch", "plan", "act"]
    want(order.index(title.split(": ")[1]) >= order.index(raised),
         f"{page['pump']}: two judged days call for {raised}, the page says {title}")


def check_month(page, got):
    told = [r["text"] for r in page["remarks"] if "paid for itself in" in r["text"]]
    if not told or "T_p" not in got:
        return
    words = told[0].split()
    since = datetime.fromisoformat(words[words.index("on") + 1])
    month = f"{since + timedelta(days=math.ceil(got['T_p'] * 365.25)):%Y-%m}"
    want(month in told[0], f"a replacement has paid for itself in {month} by hand; the page says: {told[0]}")
