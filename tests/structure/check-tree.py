"""Sizes, sources and headers of the tree.

Usage: check-tree.py SOURCE_ROOT
- no file of code over 800 lines (NAME-cases.h holds data), no line over 100 columns, no function over 60 lines;
- every row of every table under resources/ has a source;
- every header compiles alone;
- nothing at the top level that does not belong there.
"""
import concurrent.futures
import os
import pathlib
import re
import subprocess
import sys
import tempfile

TOP = {'src', 'ui', 'resources', 'tests', 'sample-sets', 'meson.build', 'README.md', 'DEVELOPERS.md',
       'LICENSE'}
FLAGS = ['-std=c17', '-D_GNU_SOURCE', '-Wall', '-Wextra', '-Wpedantic', '-Werror', '-fsyntax-only']


def code_files(root):
    for folder in ('src', 'tests'):
        yield from (p for p in sorted((root / folder).rglob('*')) if p.suffix in ('.c', '.h', '.cpp'))


def size_faults(root):
    faults, seen = [], 0
    for path in code_files(root):
        lines = path.read_text(encoding='utf-8').splitlines()
        name, seen = path.relative_to(root), seen + 1
        if len(lines) > 800 and not path.name.endswith('-cases.h'):  # tables of test cases are data
            faults.append('%s has %d lines' % (name, len(lines)))
        faults += ['%s:%d is wider than 100 columns' % (name, n) for n, line in enumerate(lines, 1)
                   if len(line) > 100]
        start = None
        for number, line in enumerate(lines, 1):
            if line == '{':
                start = number
            elif line == '}' and start:
                if number - start > 61:
                    faults.append('%s:%d: function of %d lines' % (name, start, number - start - 1))
                start = None
    return faults, seen


def table_faults(root):
    faults, seen = [], 0
    for path in sorted((root / 'resources').glob('*.tsv')):
        rows = [(n, line.split('\t')) for n, line in enumerate(path.read_text(encoding='utf-8').split('\n'), 1)
                if line and not line.startswith('#')]
        columns = [i for i, name in enumerate(rows[0][1]) if 'source' in name.lower()]
        if not columns:
            faults.append('%s has no source column' % path.name)
        for number, row in rows[1:]:
            seen += 1
            if not any(i < len(row) and row[i].strip() for i in columns):
                faults.append('%s:%d has no source' % (path.name, number))
    return faults, seen


def compile_alone(root, header, cflags):
    with tempfile.TemporaryDirectory() as folder:
        unit = pathlib.Path(folder) / 'one.c'
        unit.write_text('#include "%s"\ntypedef int unit_is_not_empty;\n' % header)
        run = subprocess.run(['cc', *FLAGS, '-I', str(root), '-I', str(root / 'src'), *cflags, str(unit)],
                             capture_output=True, text=True)
    return run.stderr.strip().split('\n')[0] if run.returncode else ''


def header_faults(root):
    headers = [h.relative_to(root) for folder in ('src', 'resources')
               for h in sorted((root / folder).rglob('*.h'))]
    cflags = subprocess.run(['pkg-config', '--cflags', 'gtk4', 'jansson', 'gsl'], check=True,
                            capture_output=True, text=True).stdout.split()
    with concurrent.futures.ThreadPoolExecutor(os.cpu_count()) as pool:
        answers = list(pool.map(lambda h: compile_alone(root, h, cflags), headers))
    return ['%s does not compile alone: %s' % pair for pair in zip(headers, answers) if pair[1]], len(headers)


def top_faults(root):
    extra = [p.name for p in root.iterdir()
             if p.name not in TOP and not p.name.startswith('.') and not re.match(r'_?build', p.name)]
    return ['%s does not belong at the top level' % name for name in sorted(extra)], len(TOP)


def main():
    root, faults = pathlib.Path(sys.argv[1]), []
    for check in (size_faults, table_faults, header_faults, top_faults):
        found, seen = check(root)
        print('%s: %d looked at, %d faults' % (check.__name__.replace('_faults', ''), seen, len(found)))
        if seen == 0:
            sys.exit('nothing was looked at')
        faults += found
    print('\n'.join(faults))
    sys.exit(1 if faults else 0)


if __name__ == '__main__':
    main()
