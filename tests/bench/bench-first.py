"""CPU time to the first estimate after the start, and of a build of the model.

Usage: bench-first.py BENCH_FIRST ENOLITH_FIT ACIDS.tsv ESTIMATOR.tsv
Every run is a new process; the best of five counts. Judged are ratios to a matrix that GSL factors
in the same runs, so that a slow machine is no failure; milliseconds are printed beside them.
"""
import resource
import subprocess
import sys
import tempfile

# An estimate that has to compute every part: several sites, aromatic rings, nothing published.
STRUCTURE = 'CCOC(=O)C(CC(=O)c1ccc(OC)cc1)C(=O)NCc1ccccc1'
# The first estimate may take 50 ms where the reference takes 16 ms; it stays far below that.
FIRST_AT_MOST, OPENING_AT_MOST, BUILD_AT_MOST = 1.0, 6.0, 50.0


def cpu_seconds():
    used = resource.getrusage(resource.RUSAGE_CHILDREN)
    return used.ru_utime + used.ru_stime


def main():
    program, fit, acids, hyper = sys.argv[1:]
    runs = [[float(x) for x in subprocess.run([program, STRUCTURE], check=True, capture_output=True,
                                              text=True).stdout.split()] for _ in range(5)]
    opening, first, second, reference = (min(r[k] for r in runs) for k in range(4))
    builds = []
    for _ in range(3):
        with tempfile.NamedTemporaryFile() as stream:
            start = cpu_seconds()
            subprocess.run([fit, 'build', acids, hyper, stream.name], check=True)
            builds.append(1e3 * (cpu_seconds() - start))
    build = min(builds)
    print('reference: GSL factors 500 rows in    %8.2f ms' % reference)
    failed = 0
    for what, spent, most in (('opening tables and model', opening, OPENING_AT_MOST),
                              ('first estimate', first, FIRST_AT_MOST),
                              ('second estimate', second, FIRST_AT_MOST),
                              ('building the model', build, BUILD_AT_MOST)):
        print('%-26s %8.2f ms = %6.2f references (promised at most %.0f)' % (what, spent, spent / reference, most))
        failed += spent > most * reference
    sys.exit(1 if failed else 0)


if __name__ == '__main__':
    main()
