"""The layers of the source tree, checked by includes and by undefined symbols.

Usage: check-layers.py SOURCE_ROOT BUILD_ROOT
Arrows point down only: app and cli may use draw and core, draw uses core, core uses neither; inside
core the order is base, molecule, notation, layout, acidity, bases, workset. Core may not use GIO,
cairo, Pango or GTK, draw may not use GTK: proven by the symbols of the archives, since an include
alone compiles even without a declared dependency.
"""
import pathlib
import re
import subprocess
import sys

CORE = ['base', 'molecule', 'notation', 'layout', 'acidity', 'bases', 'workset']
FORBIDDEN_INCLUDE = {
    'core': r'<(cairo|pango|gtk|gdk|gsk|gio)',
    'draw': r'<(gtk|gdk|gsk|gio)',
    'cli': r'<(gtk|gdk|gsk)',
    'fit': r'<(cairo|pango|gtk|gdk|gsk|gio)',
}
UPPER = {'core': [], 'draw': ['core'], 'cli': ['core', 'draw'], 'app': ['core', 'draw'],
         'fit': ['core']}
FORBIDDEN_LIBRARY = {
    'libcore.a': ['gio-2.0', 'cairo', 'pango-1.0', 'pangocairo-1.0', 'gtk-4'],
    'libdraw.a': ['gio-2.0', 'gtk-4'],
}


def layer_faults(root):
    faults, seen = [], 0
    for path in sorted((root / 'src').rglob('*.[ch]*')):
        parts = path.relative_to(root / 'src').parts
        if path.suffix not in ('.c', '.h', '.cpp'):
            continue
        layer, seen = parts[0], seen + 1
        for number, line in enumerate(path.read_text(encoding='utf-8').splitlines(), 1):
            place = '%s:%d' % (path.relative_to(root), number)
            if layer in FORBIDDEN_INCLUDE and re.match(r'\s*#\s*include\s*' + FORBIDDEN_INCLUDE[layer], line):
                faults.append('%s: %s is not for this layer' % (place, line.strip()))
            match = re.match(r'\s*#\s*include\s*"([^"]+)"', line)
            if match:
                faults += project_include(place, layer, parts, match.group(1))
    return faults, seen


def project_include(place, layer, parts, name):
    target = name.split('/')
    if target[0] == 'resources':
        return []
    if target[0] not in UPPER or '..' in target:
        return ['%s: "%s" is not a path from src/' % (place, name)]
    if target[0] != layer and target[0] not in UPPER[layer]:
        return ['%s: %s may not use "%s"' % (place, layer, name)]
    if layer == 'core' and CORE.index(target[1]) > CORE.index(parts[1]):
        return ['%s: core/%s may not use "%s"' % (place, parts[1], name)]
    return []


def symbols(command):
    text = subprocess.run(command, check=True, capture_output=True, text=True).stdout
    return {line.split()[-1].split('@')[0] for line in text.splitlines() if line.strip() and not line.endswith(':')}


def library_exports(name):
    folder = subprocess.run(['pkg-config', '--variable=libdir', 'glib-2.0'], check=True,
                            capture_output=True, text=True).stdout.strip()
    stem = 'lib%s.so' % name
    return symbols(['nm', '-D', '--defined-only', '--extern-only', str(pathlib.Path(folder) / stem)])


def symbol_faults(build):
    faults, seen = [], 0
    for archive, libraries in FORBIDDEN_LIBRARY.items():
        used = symbols(['nm', '-u', str(build / 'src' / archive)])
        seen += len(used)
        for library in libraries:
            # A symbol that another, allowed library exports too (glib's own) is no proof.
            wrong = used & library_exports(library) - library_exports('glib-2.0')
            faults += ['%s uses %s of %s' % (archive, name, library) for name in sorted(wrong)]
    return faults, seen


def main():
    root, build = pathlib.Path(sys.argv[1]), pathlib.Path(sys.argv[2])
    faults, files = layer_faults(root)
    more, used = symbol_faults(build)
    for fault in faults + more:
        print(fault)
    print('%d source files and %d undefined symbols looked at, %d faults' % (files, used, len(faults + more)))
    if files < 20 or used < 50:
        sys.exit('too little was looked at for the check to mean anything')
    sys.exit(1 if faults or more else 0)


if __name__ == '__main__':
    main()
