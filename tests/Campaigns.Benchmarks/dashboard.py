#!/usr/bin/env python3
"""Measures how long the dashboard lets people wait: a real terminal (tmux), the real program, a real catalog.

usage: dashboard.py PROGRAM CATALOG CODE [--size 120x40] [--times N] [--opens N]
  PROGRAM    the published executable
  CATALOG    a catalog with a large campaign, for example made by 'campaigns run' of a folder that
             'Campaigns.Benchmarks generate 100000x4x5 FOLDER --plan' wrote
  CODE       its code
  --size     columns and rows of the terminal (default 120x40)
  --times    repetitions of every key (default 15)
  --opens    starts of the program (default 7)

Prints a table in Markdown: median, 90th percentile and longest time, in milliseconds, from the key to the screen that
shows what it did; for opening, from the command to the first page. The program looks for keys 100 times a second while they
come and 25 times after two seconds without one, so up to 10 ms belong to every key here.
'seen' is what looking at the screen takes by itself. 'CPU' is the median of the processor time that the program itself took
meanwhile, all threads together: what remains of the figures where the machine is shared.
"""
import argparse
import os
import re
import statistics
import subprocess
import sys
import time

PATIENCE = 60


class Terminal:
    """A tmux server of its own, driven through one control connection, so that looking at the screen costs a millisecond."""

    def __init__(self, command, columns, rows, number):
        self.socket = f"campaigns-dashboard-{os.getpid()}-{number}"
        self.tmux = ["tmux", "-L", self.socket, "-f", "/dev/null"]
        subprocess.run(self.tmux + ["new-session", "-d", "-x", str(columns), "-y", str(rows), "sleep 3600"], check=True)
        self.control = subprocess.Popen(self.tmux + ["-C", "attach", "-f", "no-output,ignore-size"], stdin=subprocess.PIPE, stdout=subprocess.PIPE, text=True)
        self.ask("display-message -p ready")
        self.ask("set -g remain-on-exit on")
        self.command = command

    def ask(self, line):
        self.control.stdin.write(line + "\n")
        self.control.stdin.flush()
        answer, number = None, None
        while True:
            text = self.control.stdout.readline()
            if not text:
                raise SystemExit("tmux went away")
            text = text.rstrip("\n")
            if text.startswith("%begin"):
                # The flag is 1 for answers to this connection.
                if text.split()[-1] == "1":
                    answer, number = [], text.split()[2]
            elif text.startswith(("%end", "%error")) and answer is not None and text.split()[2] == number:
                return answer
            elif answer is not None:
                answer.append(text)

    def start(self):
        self.ask(f"respawn-pane -k 'exec {self.command}'")
        self.process = self.ask("display-message -p '#{pane_pid}'")[0]

    def cpu(self):
        """Seconds of processor time of the program so far; threads that have ended count as well where others wait for them."""
        total = 0
        try:
            for thread in os.listdir(f"/proc/{self.process}/task"):
                with open(f"/proc/{self.process}/task/{thread}/schedstat", encoding="ascii") as stat:
                    total += int(stat.read().split()[0])
        except FileNotFoundError:
            pass
        return total / 1e9

    def screen(self):
        return "\n".join(self.ask("capture-pane -p"))

    def press(self, key):
        self.ask(f"send-keys {key}")

    def wait(self, shows):
        """Seconds until the screen shows something; the screen itself."""
        began = time.perf_counter()
        while True:
            screen = self.screen()
            if shows(screen):
                return time.perf_counter() - began, screen
            if time.perf_counter() - began > PATIENCE:
                raise SystemExit("waited in vain; the screen was:\n" + screen)
            # Looking more often would take a core from the program.
            time.sleep(0.005)

    def close(self):
        subprocess.run(self.tmux + ["kill-server"], check=False)
        self.control.wait()


def caption(screen):
    """Where the list stands: the line that says which row is selected."""
    found = re.search(r"(row [0-9]+ of [^│]*|none of [0-9]+ shown[^│]*)", screen)
    return found.group(1).strip() if found else None


def key_times(terminal, keys):
    """Seconds of each key, and of the processor, until the caption of the list changes."""
    times = []
    for key in keys:
        before = caption(terminal.screen())
        began, cpu = time.perf_counter(), terminal.cpu()
        terminal.press(key)
        terminal.wait(lambda screen: caption(screen) not in (None, before))
        times.append((time.perf_counter() - began, terminal.cpu() - cpu))
        time.sleep(0.25)
    return times


def page_times(terminal, names, times):
    """Seconds of turning to each page, first and later, until its name stands in brackets and until nothing is awaited on it."""
    first, later = {}, {}
    for turn in range(times):
        for digit, name in names:
            began, cpu = time.perf_counter(), terminal.cpu()
            terminal.press(digit)
            terminal.wait(lambda screen: f"[{digit} {name}]" in screen)
            shown = (time.perf_counter() - began, terminal.cpu() - cpu)
            terminal.wait(lambda screen: "moment" not in screen)
            whole = (time.perf_counter() - began, terminal.cpu() - cpu)
            (first if turn == 0 else later).setdefault(name, []).append((shown, whole))
            time.sleep(0.15)
    return first, later


def line(what, seconds, target=""):
    ordered = sorted(1000 * wall for wall, _ in seconds)
    ninth = ordered[min(len(ordered) - 1, int(0.9 * len(ordered)))]
    cpu = 1000 * statistics.median(cpu for _, cpu in seconds)
    print(f"| {what} | {len(ordered)} | {statistics.median(ordered):.0f} | {ninth:.0f} | {ordered[-1]:.0f} | {cpu:.0f} | {target} |", flush=True)


def main():
    parser = argparse.ArgumentParser(usage=__doc__)
    parser.add_argument("program")
    parser.add_argument("catalog")
    parser.add_argument("code")
    parser.add_argument("--size", default="120x40")
    parser.add_argument("--times", type=int, default=15)
    parser.add_argument("--opens", type=int, default=7)
    options = parser.parse_args()
    columns, rows = options.size.split("x")
    command = f"{os.path.abspath(options.program)} dashboard {options.code} --catalog {os.path.abspath(options.catalog)}"
    terminal = Terminal(command, int(columns), int(rows), 0)
    try:
        print(f"{options.size}, load of the machine {os.getloadavg()[0]:.1f}\n")
        print("| | times | median ms | 90 % | longest | CPU | at most |\n|---|---|---|---|---|---|---|")
        opens, reads = [], []
        for turn in range(options.opens):
            if turn > 0:
                # A program that is still ending would take its share of the machine.
                terminal.press("q")
                terminal.wait(lambda _: terminal.ask("display-message -p '#{pane_dead}'")[0] == "1")
                time.sleep(0.5)
            began = time.perf_counter()
            terminal.start()
            terminal.wait(lambda screen: screen.strip() and "Pane is dead" not in screen)
            reads.append((time.perf_counter() - began, terminal.cpu()))
            _, screen = terminal.wait(lambda screen: re.search(r"\[[0-9] [A-Z]", screen))
            opens.append((time.perf_counter() - began, terminal.cpu()))
        line("something is seen", reads)
        line("open, to the first page", opens, "750, never above 1500")
        names = [(d, n) for d, n in re.findall(r"([0-9]) ([A-Z][a-z]+)", screen)]
        experiments = next(d for d, n in names if n == "Experiments")
        terminal.press(experiments)
        terminal.wait(lambda screen: caption(screen))
        began = time.perf_counter()
        for _ in range(100):
            terminal.screen()
        line("seen", [((time.perf_counter() - began) / 100, 0)])
        line("page down", key_times(terminal, ["NPage"] * options.times), "50")
        line("to the end and back", key_times(terminal, ["End", "Home"] * (options.times // 2)), "50")
        terminal.press("/")
        time.sleep(0.3)
        typed = []
        for _ in range(max(1, options.times // 3)):
            typed += key_times(terminal, ["9", "8", "7"])
            key_times(terminal, ["BSpace"] * 3)
        line("filter, each letter", typed, "200")
        terminal.press("Escape")
        time.sleep(0.5)
        line("sort", key_times(terminal, ["s"] * options.times), "200")
        line("reverse", key_times(terminal, ["r"] * options.times), "200")
        line("mark", mark_times(terminal, options.times), "200")
        first, later = page_times(terminal, names, 1 + max(1, options.times // 3))
        for name in first:
            line(f"{name}, first time", [t[0] for t in first[name]], "200")
            if first[name][0][1][0] - first[name][0][0][0] > 0.02:
                line(f"{name}, first time, with all that is reckoned beside", [t[1] for t in first[name]])
            line(f"{name}, later", [t[0] for t in later[name]], "200")
        terminal.press("q")
    finally:
        terminal.close()
    return 0


def mark_times(terminal, times):
    """Seconds of marking one experiment more, until the count of the marked changes."""
    seconds = []

    def marked(screen):
        found = re.search(r"marked ([0-9]+)", screen)
        return found.group(1) if found else None

    for _ in range(times):
        before = marked(terminal.screen())
        began, cpu = time.perf_counter(), terminal.cpu()
        terminal.press("m")
        terminal.wait(lambda screen: marked(screen) not in (None, before))
        seconds.append((time.perf_counter() - began, terminal.cpu() - cpu))
        terminal.press("Down")
        time.sleep(0.2)
    return seconds


if __name__ == "__main__":
    sys.exit(main())
