#!/usr/bin/env python3
"""Measures the published program against scripts in R that do the same job, in turn on this machine.

usage: compare.py [--install] [--pairs N] [--work FOLDER] [MODE ...]
  --install   first install the Debian packages that the peers need (as root)
  --pairs     runs of each side, one after the other, A B A B (default 5); ratios are medians over the pairs
  --work      where campaigns and catalogs are written (default artifacts/compare; the large ones take 1 GB)
Modes (default: large stored shuffled small growth size arrival results kernels permutations):
  large     run on 100,000 experiments, against data.table that stores nothing
  stored    the same against data.table that stores every reading in SQLite
  usual     the same against aov() per experiment (takes minutes; one run of the peer)
  shuffled  as large, the rows in random order
  small     run on 200 experiments, against aov() per experiment
  growth    200,000 experiments against 100,000
  size      bytes of the catalog of 100,000 experiments
  arrival   one more experiment into 100,000: load, test and review inside one process
  results   results of 200 experiments, against the start of Rscript with data.table
  kernels   adjustments and F tails inside the process, against p.adjust and pf
  permutations  permutation F tests inside the process, against NumPy (peers/permutations.py)

Every run starts with no catalog. Only ratios count: single times drift with the machine.
"""
import argparse
import csv
import multiprocessing
import os
import pathlib
import shutil
import statistics
import subprocess
import sys
import tempfile
import time

HERE = pathlib.Path(__file__).resolve().parent
ROOT = HERE.parent.parent
PEERS = HERE / "peers"
PACKAGES = ["r-base-core", "r-cran-data.table", "r-cran-rsqlite", "python3-numpy", "libopenblas0-pthread"]
# The one that has the NumPy of the packages; another python3 may stand first on the path.
DEBIAN_PYTHON = "/usr/bin/python3"
DEFAULT_MODES = ["large", "stored", "shuffled", "small", "growth", "size", "arrival", "results", "kernels", "permutations"]


class Run:
    def __init__(self, seconds, mebibytes, output):
        self.seconds, self.mebibytes, self.output = seconds, mebibytes, output


def measure(command, before=None):
    """Runs a process to its end: wall seconds, peak resident MiB, standard output."""
    if before:
        before()
    with tempfile.TemporaryFile() as output, tempfile.TemporaryFile() as errors:
        start = time.perf_counter()
        process = subprocess.Popen([str(c) for c in command], stdin=subprocess.DEVNULL, stdout=output, stderr=errors)
        _, status, usage = os.wait4(process.pid, 0)
        seconds = time.perf_counter() - start
        process.returncode = os.waitstatus_to_exitcode(status)
        output.seek(0)
        text = output.read().decode()
        if process.returncode != 0:
            errors.seek(0)
            sys.exit(f"{' '.join(map(str, command))}\nended with {process.returncode}:\n{errors.read().decode()}{text}")
        return Run(seconds, usage.ru_maxrss / 1024, text)


def in_turn(ours, theirs, pairs):
    """Two measured actions in turn; each is a function of the pair's number."""
    a, b = [], []
    for number in range(pairs):
        a.append(ours(number))
        b.append(theirs(number))
    return a, b


def median(runs, what="seconds"):
    return statistics.median(getattr(r, what) for r in runs)


class Comparison:
    def __init__(self, arguments):
        self.pairs = arguments.pairs
        self.work = pathlib.Path(arguments.work or ROOT / "artifacts" / "compare")
        self.work.mkdir(parents=True, exist_ok=True)
        self.program = self.work / "program" / "campaigns"
        self.benchmarks = self.work / "benchmarks" / "Campaigns.Benchmarks"
        self.rows = []

    # -- preparing --------------------------------------------------------------------------------

    def publish(self):
        """The program by the profile by which people install it; the benchmarks in the same way."""
        measure(["dotnet", "publish", ROOT / "src" / "Campaigns.App", "-p:PublishProfile=installed", "-o", self.program.parent])
        measure(["dotnet", "publish", ROOT / "tests" / "Campaigns.Benchmarks", "-c", "Release", "--use-current-runtime", "--self-contained", "false",
                 "-p:PublishReadyToRun=true", "-o", self.benchmarks.parent])

    def campaign(self, size, name, *options):
        folder = self.work / name
        if not (folder / "measurements" / "measurements.csv").exists():
            measure([self.benchmarks, "generate", size, folder, *options])
        return folder

    def catalog(self, name):
        return self.work / f"{name}.db"

    def remove_catalog(self, name):
        for file in self.work.glob(f"{name}.db*"):
            file.unlink()

    # -- the two sides ----------------------------------------------------------------------------

    def ours(self, folder):
        name = folder.name
        return lambda _: measure([self.program, "run", folder, "--catalog", self.catalog(name)], lambda: self.remove_catalog(name))

    def peer(self, script, folder):
        stored = self.work / f"{folder.name}-{script}.sqlite"
        extra = [stored] if script == "sums_stored" else []
        return lambda _: measure(["Rscript", "--vanilla", PEERS / f"{script}.R", folder / "measurements" / "measurements.csv",
                                  self.work / f"{folder.name}-{script}.csv", *extra])

    # -- reporting --------------------------------------------------------------------------------

    def row(self, what, value, target, reach, detail):
        verdict = "met" if value <= reach else "target met" if value <= target else "MISSED"
        self.rows.append((what, f"{value:.3g}", f"{target:g}", f"{reach:g}", verdict, detail))
        print(f"{what}: {value:.3g} (target {target:g}, reach for {reach:g}): {verdict}; {detail}", flush=True)

    def against(self, what, folder, script, target, reach, pairs=None):
        a, b = in_turn(self.ours(folder), self.peer(script, folder), pairs or self.pairs)
        ratio = statistics.median(x.seconds / y.seconds for x, y in zip(a, b))
        self.row(what, ratio, target, reach, f"{median(a):.2f} s / {median(b):.2f} s, peak {median(a, 'mebibytes'):.0f} / {median(b, 'mebibytes'):.0f} MiB")
        self.agree(folder, script)
        return a

    def agree(self, folder, script):
        """Compares the results in a process of its own: a parent that has grown would show in the peak memory of its later children."""
        check = multiprocessing.get_context("fork").Process(target=self.check_agreement, args=(folder, script))
        check.start()
        check.join()
        if check.exitcode != 0:
            sys.exit(1)

    def check_agreement(self, folder, script):
        """Both sides must have done the same job: F and p to 11 digits, and the same survivors by BH."""
        out = measure([self.program, "results", folder.name, "--format", "csv", "--catalog", self.catalog(folder.name)]).output
        ours = {r["experiment"]: r for r in csv.DictReader(out.splitlines())}
        with open(self.work / f"{folder.name}-{script}.csv", newline="") as file:
            theirs = {r["experiment"]: r for r in csv.DictReader(file)}
        if ours.keys() != theirs.keys():
            sys.exit(f"{folder.name}: the two sides tested different experiments.")
        worst, survivors = 0.0, 0
        for code, mine in ours.items():
            other = theirs[code]
            for x, y in [(mine["statistic"], other["F"]), (mine["p"], other["p"]), (mine["adjusted_p"], other["bh"])]:
                worst = max(worst, abs(float(x) - float(y)) / max(abs(float(y)), sys.float_info.min))
            survives = mine["survives"] == "true"
            survivors += survives
            if survives != (float(other["bh"]) <= 0.05):
                sys.exit(f"{folder.name}: the two sides disagree on whether {code} survives.")
        if not worst <= 1e-11:
            sys.exit(f"{folder.name}: F or p differ by {worst:.2g} (relative).")
        print(f"  {len(ours)} experiments agree to {worst:.1e}, {survivors} survivors on both sides", flush=True)

    # -- modes ------------------------------------------------------------------------------------

    def large(self):
        runs = self.against("run on L / data.table, stores nothing", self.campaign("L", "L"), "sums", 0.60, 0.40)
        self.row("peak memory of run on L, MiB", median(runs, "mebibytes"), 150, 80, "")

    def stored(self):
        self.against("run on L / data.table, stores", self.campaign("L", "L"), "sums_stored", 0.20, 0.13)

    def usual(self):
        self.against("run on L / aov per experiment", self.campaign("L", "L"), "aov", 0.02, 0.012, pairs=1)

    def shuffled(self):
        runs = self.against("run on L, random order / data.table, stores nothing", self.campaign("L", "L-shuffled", "--shuffled"), "sums", 0.80, 0.60)
        self.row("peak memory of run on L, random order, MiB", median(runs, "mebibytes"), 450, 350, "")

    def small(self):
        self.against("run on S / aov per experiment", self.campaign("S", "S"), "aov", 0.60, 0.30)

    def growth(self):
        double, single = self.campaign("200000x5x10", "LL"), self.campaign("L", "L")
        a, b = in_turn(self.ours(double), self.ours(single), self.pairs)
        ratio = statistics.median(x.seconds / y.seconds for x, y in zip(a, b))
        self.row("cost of doubling the rows", ratio, 2.1, 2.0, f"{median(a):.2f} s / {median(b):.2f} s, peak {median(a, 'mebibytes'):.0f} / {median(b, 'mebibytes'):.0f} MiB")

    def size(self):
        folder = self.campaign("L", "L")
        self.ours(folder)(0)
        self.row("catalog of L, MB", self.catalog("L").stat().st_size / 1e6, 70, 35, "kept originals included, if any are kept")

    def arrival(self):
        large = self.campaign("L", "L")
        self.ours(large)(0)
        output = measure([self.benchmarks, "arrive", self.catalog("L"), "L", str(self.pairs + 3)]).output
        # The first arrivals still hold the start of the process.
        times = [float(line.split()[1]) for line in output.splitlines()[3:]]
        self.row("one more experiment into L: load + test + review inside a process, ms", statistics.median(times), 60, 25, "")

    def results(self):
        folder = self.campaign("S", "S")
        self.ours(folder)(0)
        a, b = in_turn(lambda _: measure([self.program, "results", "S", "--format", "csv", "--catalog", self.catalog("S")]),
                       lambda _: measure(["Rscript", "-e", "library(data.table)"]), self.pairs)
        ratio = statistics.median(x.seconds / y.seconds for x, y in zip(a, b))
        self.row("results of S / start of Rscript with data.table", ratio, 0.9, 0.4, f"{median(a):.3f} s / {median(b):.3f} s")

    def kernels(self):
        a, b = in_turn(lambda _: self.figures([self.benchmarks, "time"]), lambda _: self.figures(["Rscript", "--vanilla", PEERS / "kernels.R"]), 3)
        for key, what, target, reach in [("adjust", "Bonferroni + Holm + BH of 1e6 / p.adjust", 0.25, 0.10), ("tails", "F tails with log / pf", 0.5, 0.1),
                                          ("range", "1e6 tails of the studentized range with log, one law / ptukey", 0.05, 0.005),
                                          ("range-df", "1e4 such tails, each with its own df / ptukey", 0.05, 0.02)]:
            ratio = statistics.median(x[key] / y[key] for x, y in zip(a, b))
            self.row(what, ratio, target, reach, f"{statistics.median(x[key] for x in a):.0f} ms / {statistics.median(y[key] for y in b):.0f} ms")
        self.row("Hommel of 1e5, s", statistics.median(x["hommel"] for x in a) / 1000, 0.1, 0.03, "")

    def permutations(self):
        a, b = in_turn(lambda _: self.figures([self.benchmarks, "time"]), lambda _: self.figures([DEBIAN_PYTHON, PEERS / "permutations.py"]), 3)
        for key, what, target, reach in [("permute-one", "permutation F of one experiment / the same in NumPy", 0.2, 0.025),
                                         ("permute-shared", "permutation F of 200 experiments / matrix products in NumPy", 0.2, 0.02),
                                         ("permute-max-t", "step-down maxT of 200 responses, one core / matrix products in NumPy", 0.5, 0.1),
                                         ("permute-min-p", "step-down minP of 200 responses, one core / sorted columns in NumPy", 1, 0.3)]:
            ratio = statistics.median(x[key] / y[key] for x, y in zip(a, b))
            self.row(what, ratio, target, reach, f"{statistics.median(x[key] for x in a):.0f} ms / {statistics.median(y[key] for y in b):.0f} ms")

    @staticmethod
    def figures(command):
        pairs = (line.split() for line in measure(command).output.splitlines())
        return {name: float(value) for name, value in pairs}

    def table(self):
        heads = ("what", "measured", "target", "reach", "verdict", "medians, ours / peer")
        widths = [max(len(r[i]) for r in [heads, *self.rows]) for i in range(len(heads))]
        print()
        for r in [heads, tuple("-" * w for w in widths), *self.rows]:
            print(" | ".join(cell.ljust(w) for cell, w in zip(r, widths)).rstrip())


def main():
    parser = argparse.ArgumentParser(description=__doc__, formatter_class=argparse.RawDescriptionHelpFormatter, usage=argparse.SUPPRESS)
    parser.add_argument("--install", action="store_true")
    parser.add_argument("--pairs", type=int, default=5)
    parser.add_argument("--work")
    parser.add_argument("modes", nargs="*", metavar="MODE")
    arguments = parser.parse_args()
    unknown = [m for m in arguments.modes if m not in [*DEFAULT_MODES, "usual"]]
    if unknown or arguments.pairs < 1:
        parser.error(f"no such mode: {', '.join(unknown)}" if unknown else "--pairs is at least 1")
    if arguments.install:
        subprocess.run(["apt-get", "update", "-qq"], check=True)
        subprocess.run(["apt-get", "install", "-y", "-qq", "--no-install-recommends", *PACKAGES], check=True)
    if not shutil.which("Rscript"):
        sys.exit("Rscript is not installed: run with --install, or install " + " ".join(PACKAGES))
    comparison = Comparison(arguments)
    comparison.publish()
    for mode in arguments.modes or DEFAULT_MODES:
        getattr(comparison, mode)()
    comparison.table()


if __name__ == "__main__":
    main()
