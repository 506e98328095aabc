"""The model is made from its tables alone, with the same numbers on every machine.

Usage: check-reproducible.py ENOLITH_FIT ACIDS.tsv ESTIMATOR.tsv NUMBERS.tsv
- building twice gives the same bytes; the CPU time of a build is printed;
- a few steps of tuning, run twice, give the same bytes;
- values, deviations and intervals agree with the stored numbers within 1e-6 pK units.
After a change of the model or its tables: meson compile -C BUILD model-numbers
"""
import os
import resource
import subprocess
import sys
import tempfile

TOLERANCE = 1e-6
STEPS = '2'


def cpu_seconds():
    used = resource.getrusage(resource.RUSAGE_CHILDREN)
    return used.ru_utime + used.ru_stime


def run(*arguments):
    start = cpu_seconds()
    subprocess.run(arguments, check=True, stderr=subprocess.DEVNULL)
    return cpu_seconds() - start


def content(path):
    with open(path, 'rb') as stream:
        return stream.read()


def rows(path):
    with open(path, encoding='utf-8') as stream:
        lines = [line.rstrip('\n').split('\t') for line in stream if not line.startswith('#')]
    return lines[0], lines[1:]


def check_twice(what, folder, make):
    first, second = os.path.join(folder, 'first'), os.path.join(folder, 'second')
    seconds = [make(first), make(second)]
    print('%s: %.2f and %.2f s of CPU' % (what, *seconds))
    return [] if content(first) == content(second) else ['%s: two runs give two results' % what]


def check_numbers(path, stored):
    names, new = rows(path)
    old_names, old = rows(stored)
    if names != old_names or [r[:2] for r in new] != [r[:2] for r in old]:
        return ['the table of acids has changed']
    worst = max((abs(float(x) - float(y)), names[k + 2], a[0])
                for a, b in zip(new, old) for k, (x, y) in enumerate(zip(a[2:], b[2:])))
    print('%d rows, largest difference %.1e (%s of %s)' % (len(new), *worst))
    return [] if worst[0] <= TOLERANCE and len(new) > 50 else ['the numbers differ from the stored ones']


def main():
    fit, acids, hyper, stored = sys.argv[1:]
    with tempfile.TemporaryDirectory() as folder:
        faults = check_twice('build', folder, lambda out: run(fit, 'build', acids, hyper, out))
        faults += check_twice('%s steps of tuning' % STEPS, folder,
                              lambda out: run(fit, 'tune', acids, out, STEPS, hyper))
        numbers = os.path.join(folder, 'numbers')
        run(fit, 'numbers', acids, hyper, numbers)
        stale = check_numbers(numbers, stored)
    if stale:
        faults += stale + ['If the model was meant to change: meson compile -C BUILD model-numbers, and commit '
                           'tests/data/model-numbers.tsv']
    print('\n'.join(faults))
    sys.exit(1 if faults else 0)


if __name__ == '__main__':
    main()
