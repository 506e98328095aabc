"""Write an assembler-backed C file that carries resource files inside the program.

Usage: embed.py OUTPUT.c DEPFILE FUNCTION FILE...
The C file defines `const char *FUNCTION (const char *name, size_t *size)`.
"""
import os
import sys


def main():
    output, depfile, function, files = sys.argv[1], sys.argv[2], sys.argv[3], sys.argv[4:]
    lines = ['#include <stddef.h>', '#include <string.h>',
             'const char *%s (const char *name, size_t *size);' % function]
    for index, path in enumerate(files):
        symbol = '%s_%d' % (function, index)
        lines.append('__asm__ (".section .rodata\\n.balign 16\\n%s:\\n.incbin \\"%s\\"\\n'
                     '%s_end:\\n.byte 0\\n.previous");' % (symbol, os.path.abspath(path), symbol))
        lines.append('extern const char %s[] __attribute__ ((visibility ("hidden")));' % symbol)
        lines.append('extern const char %s_end[] __attribute__ ((visibility ("hidden")));' % symbol)
    lines.append('static const struct { const char *name, *start, *end; } entry[] = {')
    for index, path in enumerate(files):
        lines.append('  { "%s", %s_%d, %s_%d_end },' % (os.path.basename(path), function, index,
                                                     function, index))
    lines += ['};', 'const char *', '%s (const char *name, size_t *size)' % function, '{',
              '  for (size_t i = 0; i < sizeof entry / sizeof *entry; i++)',
              '    if (strcmp (entry[i].name, name) == 0) {',
              '      *size = (size_t) (entry[i].end - entry[i].start);',
              '      return entry[i].start;', '    }',
              '  *size = 0;', '  return NULL;', '}']
    with open(output, 'w', encoding='utf-8') as stream:
        stream.write('\n'.join(lines) + '\n')
    with open(depfile, 'w', encoding='utf-8') as stream:
        stream.write('%s: %s\n' % (output, ' '.join(os.path.abspath(p) for p in files)))


if __name__ == '__main__':
    main()
