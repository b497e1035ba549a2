#!/usr/bin/env python3
"""Writes the invented campaign "adhesion-screen": campaign.json, plan.csv, measurements/*.csv and truth.csv.

Usage: python3 generate.py [FOLDER]     (default: the folder of this script)

Everything is invented: formulations, responses and numbers. Python's standard library only; all arithmetic on
measurements is on integers (splitmix64, and a sum of twelve uniforms for the bell shape), so that the files come
out byte for byte the same on every machine and version.
"""
import json
import pathlib
import sys

SEED = 20260023
MASK = (1 << 64) - 1
PER_WEEK = 4


class Draws:
    """A splitmix64 stream (Steele, Lea and Flood 2014) with a bell-shaped draw made of integers."""

    def __init__(self, seed):
        self.state = seed & MASK

    def bits(self):
        self.state = (self.state + 0x9E3779B97F4A7C15) & MASK
        x = self.state
        x = ((x ^ (x >> 30)) * 0xBF58476D1CE4E5B9) & MASK
        x = ((x ^ (x >> 27)) * 0x94D049BB133111EB) & MASK
        return x ^ (x >> 31)

    def bell(self):
        """Mean 0, standard deviation 65,536 (to 1 part in 10^9): twelve 16-bit uniforms less their mean."""
        total = 0
        for _ in range(3):
            x = self.bits()
            total += (x & 0xFFFF) + (x >> 16 & 0xFFFF) + (x >> 32 & 0xFFFF) + (x >> 48)
        return total - 6 * 65535

    def shuffle(self, items):
        for i in range(len(items) - 1, 0, -1):
            j = self.bits() % (i + 1)
            items[i], items[j] = items[j], items[i]


def decimal_text(value, decimals):
    """An integer count of units of the last decimal, as a decimal number."""
    if decimals == 0:
        return str(value)
    sign, digits = ("-", -value) if value < 0 else ("", value)
    whole, rest = divmod(digits, 10 ** decimals)
    return f"{sign}{whole}.{rest:0{decimals}d}"


class Experiment:
    """One invented experiment. Means and standard deviations are integers in units of the last decimal that the gauge shows."""

    def __init__(self, title, response, unit, decimals, groups, mean, sd, shifts=None, n=6, planned=True,
                 spread=None, smallest=None, missing=None, coarse=None, data=True):
        self.title, self.response, self.unit, self.decimals = title, response, unit, decimals
        self.groups = groups.split("|")
        self.mean, self.sd = mean, sd
        self.shifts = shifts or [0] * len(self.groups)      # true shift of each group's mean, in tenths of sd
        self.sizes = n if isinstance(n, list) else [n] * len(self.groups)
        self.planned = planned                               # whether the plan fixes the number of replicates
        self.spread = spread or [10] * len(self.groups)      # each group's standard deviation, in tenths of sd
        self.smallest = smallest                             # smallest effect of interest, in units of the last decimal
        self.missing = missing                               # (group, replicate) of a reading that was lost
        self.coarse = coarse                                 # one reading per group, repeated: a gauge too coarse to vary
        self.data = data
        self.code = ""

    @property
    def real(self):
        return self.data and (any(s != self.shifts[0] for s in self.shifts) or self.coarse is not None)

    def text(self, value):
        return decimal_text(value, self.decimals)

    def readings(self, draws):
        """Rows (group, replicate, value as text) in run order."""
        rows = []
        for g, group in enumerate(self.groups):
            for replicate in range(1, self.sizes[g] + 1):
                scaled = self.sd * (self.spread[g] * draws.bell() + self.shifts[g] * 65536)
                value = self.mean + (scaled + 5 * 65536) // (10 * 65536)
                if self.coarse:
                    value = self.coarse[g]
                lost = self.missing == (group, replicate)
                rows.append((group, replicate, "NA" if lost else self.text(value)))
        draws.shuffle(rows)
        return rows


PULL, CREEP, GLOSS = ("pull-off strength", "MPa", 2), ("creep from the scribe", "mm", 1), ("gloss at 60 degrees", "GU", 1)
WATER, HARD, DRY = ("water uptake in 24 h", "%", 2), ("pendulum hardness", "s", 0), ("tack-free time", "min", 1)
VISC, BEND, SETTLE = ("viscosity at 100/s", "mPa s", 0), ("bend radius without cracks", "mm", 1), ("settled layer after 28 days", "mm", 1)
OPACITY, WET, FOAM = ("contrast ratio", "%", 1), ("wet adhesion", "N/25 mm", 1), ("foam height", "mm", 0)
E = Experiment

EXPERIMENTS = [
    E("Adhesion promoter: type at 1 % on binder", *PULL, "control|aminosilane|epoxysilane|phosphate ester", 412, 48, [0, 24, 18, 6], smallest=60),
    E("Adhesion promoter: aminosilane dose", *PULL, "control|0.5 %|1.0 %|2.0 %", 405, 50, [0, 10, 20, 22], smallest=60),
    E("Deionised or mains water in the letdown", *PULL, "control|mains", 420, 47, n=8, smallest=50),
    E("Defoamer: four candidates", *FOAM, "control|mineral oil|silicone|polymer|wax", 38, 6, [0, -26, -31, -9, -4]),
    E("Coalescent: amount in the standard binder", *DRY, "control|-2 %|+2 %", 425, 46, n=8, smallest=50),
    E("Binder lots of one year", *WET, "lot A|lot B|lot C|lot D", 184, 17),
    E("Flash-rust inhibitor: dose", *CREEP, "control|0.2 %|0.4 %|0.8 %", 74, 9, [0, -8, -17, -15], n=8, smallest=10),
    E("Stirring speed at the letdown", *VISC, "400 rpm|800 rpm|1200 rpm", 880, 55),
    E("Anti-corrosive pigment: zinc phosphate and substitutes", *CREEP, "control|modified zinc phosphate|calcium silicate|strontium-free blend|none", 62, 8, [0, -6, 14, 1, 33], n=8, smallest=10),
    E("Anti-corrosive pigment: loading", *CREEP, "control|6 %|9 %|12 %", 60, 9, [0, 2, -9, -7], n=8, smallest=10),
    E("Dispersant: residence time in the mill", *OPACITY, "10 min|20 min|40 min", 942, 9),
    E("Wetting agent: ionic or not", *WET, "control|anionic|non-ionic", 180, 16),
    E("Gloss after change of extender", *GLOSS, "control|talc|barytes|mica", 452, 21, [0, 3, 27, -19]),
    E("Extender: particle size of the barytes", *GLOSS, "control|2 um|5 um|10 um", 448, 22, [0, 4, -4, -10]),
    E("Storage at 40 degrees before application", *PULL, "fresh|2 weeks|4 weeks|8 weeks", 418, 49),
    E("Supplier of titanium dioxide", *OPACITY, "control|supplier B|supplier C", 945, 8, n=6),
    E("Cure temperature", *HARD, "20 C|40 C|60 C|80 C", 74, 7, [0, 11, 24, 36], n=6),
    E("Cure time at 60 C", *HARD, "10 min|20 min|30 min", 96, 8, [0, 5, 9], n=8),
    E("Humidity while drying", *HARD, "30 %|55 %|80 %", 81, 8, [0, 0, -9], n=6),
    E("Film build: readings of a coarse comb", "wet film thickness", "um", 0, "one pass|two passes|thinned", 60, 5, coarse=[60, 120, 40], n=5),
    E("Thickener: associative types", *VISC, "control|type U|type H|type A", 910, 60, [0, -2, 16, -14], n=6),
    E("Thickener: order of addition", *VISC, "before pigment|after pigment", 905, 58, n=8),
    E("Preservative package", *PULL, "control|package B|package C|package D", 415, 47),
    E("Neutralising amine", *DRY, "control|amine B|amine C|ammonia", 431, 45, [0, 3, -6, -12], n=6, planned=False, missing=("amine C", 4)),
    E("pH of the letdown", *WET, "pH 8.0|pH 8.5|pH 9.0|pH 9.5", 182, 17, [0, 2, 4, 2]),
    E("Filler ratio, three mixes and the standard", *BEND, "control|1:1|1:2|2:1", 61, 7, [0, 3, 12, -3], n=[9, 6, 5, 6], planned=False),
    E("Crosslinker: carbodiimide dose", *WATER, "control|0.5 %|1.0 %|1.5 %", 612, 52, [0, -11, -21, -24], n=6, smallest=60),
    E("Crosslinker: pot life after mixing", *WATER, "0 h|2 h|4 h|8 h", 598, 55),
    E("Degreasing of the zinc surface", *PULL, "alkaline|solvent wipe|none", 422, 50, [0, -2, -23], n=6, spread=[10, 10, 24]),
    E("Zinc surface: spangle", *PULL, "small|regular|large", 417, 49, n=6),
    E("Conversion layer under the primer", *PULL, "control|zirconium|none", 420, 46, [0, 7, -11], n=8, smallest=50),
    E("Roller or spray application", *OPACITY, "spray|roller", 944, 9, n=10),
    E("Substrate temperature at application", *DRY, "10 C|20 C|30 C", 436, 44, [0, -9, -13], n=6),
    E("Wax emulsion against blocking", *GLOSS, "control|1 %|2 %", 455, 20, [0, -1, -9], n=8),
    E("Second supplier of the acrylic binder", *PULL, "control|supplier B|supplier C|supplier D", 419, 47),
    E("Recycled deionised water", *FOAM, "control|one cycle|three cycles", 36, 6),
    E("Plasticiser-free binder", *BEND, "control|binder F|binder G", 60, 6, [0, 3, 12], n=6),
    E("Bio-based binder share", *PULL, "control|20 %|40 %|60 %", 416, 48, [0, -2, -6, -12], n=8, smallest=50),
    E("Bio-based binder: wet adhesion", *WET, "control|20 %|40 %|60 %", 181, 17, [0, -3, -8, -16], n=8),
    E("Freeze-thaw cycles", *VISC, "0 cycles|3 cycles|5 cycles", 895, 57, n=6, spread=[10, 13, 20]),
    E("Settling with three clays", *SETTLE, "control|clay B|clay C|clay D", 52, 8, [0, -3, 6, -5]),
    E("Grinding medium", *GLOSS, "steel|zirconia|glass", 451, 22),
    E("Pigment volume concentration", *PULL, "control|30 %|35 %|40 %", 417, 48, [0, 2, -4, -15], n=6, spread=[8, 10, 10, 16]),
    E("Operator at the spray booth", *PULL, "operator 1|operator 2|operator 3", 419, 49, n=8),
    E("Oven: position of the panel", *HARD, "top|middle|bottom", 95, 7, n=6),
    E("Ultraviolet absorber", *GLOSS, "control|absorber B|absorber C", 453, 21, n=6),
    E("Drier: manganese in place of cobalt", *DRY, "control|manganese 0.02 %|manganese 0.04 %|iron complex", 428, 44, [0, -4, -8, 6], n=6),
    E("Outdoor panels, first year", *CREEP, "control|candidate A|candidate B", 88, 12, n=10, data=False),
]

# What each weekly file records beside experiment, group and value, and its separator.
WEEKS = [([], ","), (["order"], ","), (["specimen", "order"], ","), ([], ","), (["block"], ","), (["specimen"], ","),
         (["order"], ";"), ([], ","), (["specimen", "block", "order"], ","), (["order"], ","), ([], ","), (["specimen"], ",")]

CAMPAIGN = {
    "code": "adhesion-screen",
    "title": "INVENTED DEMO: primer for galvanised steel, adhesion screen",
    "purpose": "Invented data for trying the program out; no such products, readings or laboratory exist. "
               "The story: which of 48 changes to a waterborne primer make a difference large enough to carry forward?",
    "errorRate": "false-discovery",
    "level": 0.05,
    "correction": "bh",
    "test": "f",
    "followUp": "tukey-kramer",
}


def quoted(cell):
    return '"' + cell.replace('"', '""') + '"' if any(c in cell for c in ',"') else cell


def write(path, lines):
    path.parent.mkdir(parents=True, exist_ok=True)
    path.write_bytes(("\n".join(lines) + "\n").encode("utf-8"))


def plan_row(e):
    control = "control" if "control" in e.groups else ""
    replicates = str(min(e.sizes)) if e.planned else ""
    follow_up = "dunnett" if control else ""             # else the campaign's own: all pairs
    smallest = e.text(e.smallest) if e.smallest else ""
    assumed = e.text(e.sd) if e.smallest else ""
    cells = [e.code, e.title, e.response, e.unit, "|".join(e.groups), control, "", follow_up, replicates, smallest, assumed, "", ""]
    return ",".join(quoted(c) for c in cells)


def week_lines(number, experiments, draws):
    recorded, separator = WEEKS[number - 1]
    lines = [separator.join(["experiment", "group", *recorded, "value"])]
    for e in experiments:
        if not e.data:
            continue
        rows = e.readings(draws)
        for order, (group, replicate, value) in enumerate(rows, start=1):
            extra = {
                "order": str(order),
                "specimen": f"{e.code}-{order:02d}",
                "block": f"oven run {1 + (replicate - 1) * 2 // max(e.sizes)}",
            }
            lines.append(separator.join([e.code, group, *(extra[c] for c in recorded), value]))
    return lines


def truth_row(e):
    if not e.data:
        return f"{e.code},not measured,"
    if e.coarse:
        return f"{e.code},yes,{e.text(max(e.coarse) - min(e.coarse))}"
    largest = (max(e.shifts) - min(e.shifts)) * e.sd      # in tenths of the last decimal
    return f"{e.code},yes,{decimal_text(largest, e.decimals + 1)}" if e.real else f"{e.code},no,0"


def main():
    folder = pathlib.Path(sys.argv[1]) if len(sys.argv) > 1 else pathlib.Path(__file__).resolve().parent
    for number, e in enumerate(EXPERIMENTS, start=1):
        e.code = f"GS-{number:02d}"
    write(folder / "campaign.json", [json.dumps(CAMPAIGN, indent=2)])
    write(folder / "plan.csv",
          ["experiment,title,response,unit,groups,control,test,follow_up,replicates,smallest_effect,assumed_sd,weight,family"]
          + [plan_row(e) for e in EXPERIMENTS])
    draws = Draws(SEED)
    for week in range(1, len(EXPERIMENTS) // PER_WEEK + 1):
        chosen = EXPERIMENTS[(week - 1) * PER_WEEK:week * PER_WEEK]
        write(folder / "measurements" / f"week-{week:02d}.csv", week_lines(week, chosen, draws))
    write(folder / "truth.csv", ["experiment,means_differ,largest_difference"] + [truth_row(e) for e in EXPERIMENTS])


if __name__ == "__main__":
    main()
