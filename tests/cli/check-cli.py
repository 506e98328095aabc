"""The terminal contract: columns, values, exit codes, messages.

Usage: check-cli.py ENOLITH_CLI
Published values: resources/acids.tsv (source named there). Formula and mass of the examples: IUPAC
abridged atomic weights, worked by hand. InChIKeys: from memory of public registries.
"""
import json
import os
import pathlib
import re
import subprocess
import sys
import tempfile

CLI = sys.argv[1]
failures = []
count = 0


def run(*arguments, text=None, code=0):
    raw = text.encode() if isinstance(text, str) else text
    done = subprocess.run([CLI, *arguments], input=raw or b'', capture_output=True, timeout=60)
    out, err = done.stdout.decode(), done.stderr.decode(errors='replace')
    expect('%s: exit code %d' % (' '.join(arguments)[:60], code), done.returncode == code,
           'got %d, %s' % (done.returncode, err[:300]))
    return out, err


def expect(what, fact, detail=''):
    global count
    count += 1
    if not fact:
        failures.append('%s (%s)' % (what, detail))


def table(text):
    lines = text.rstrip('\n').split('\n')
    names = lines[0].split('\t')
    rows = [dict(zip(names, line.split('\t'))) for line in lines[1:]]
    return names, rows


def tsv(*arguments, **options):
    return table(run(*arguments[:1], '--format', 'tsv', *arguments[1:], **options)[0])


def check_sites():
    names, rows = tsv('sites', 'CC(=O)CC(=O)OCC')
    expect('columns of sites', names == ['substrate', 'rank', 'atoms', 'element', 'hydrogens', 'position',
                                         'pka', 'low', 'high', 'basis', 'precedents'], names)
    first, second = rows[0], rows[1]
    expect('CH2 between both carbonyls first', first['atoms'] == '4' and first['hydrogens'] == '2', first)
    expect('measured 14.2 in DMSO', first['basis'] == 'measured' and float(first['pka']) == 14.2, first)
    expect('its source among the precedents', 'ethyl acetoacetate 14.2 in DMSO' in first['precedents'] and
           'Olmstead & Bordwell' in first['precedents'], first)
    expect('then the terminal CH3', second['atoms'] == '1' and second['hydrogens'] == '3', second)
    expect('no OCH2', all('8' not in r['atoms'].split(',') for r in rows) and len(rows) == 2, rows)
    for name in ('benzaldehyde', 'benzophenone', 'pivalaldehyde'):
        _, rows = tsv('sites', name)
        expect('%s: a reason in a row of rank 0' % name, rows[0]['rank'] == '0' and len(rows[0]['position']) > 15,
               rows)
    _, rows = tsv('sites', 'acetophenone')
    expect('acetophenone: three alpha hydrogens, 24.7', rows[0]['rank'] == '1' and rows[0]['hydrogens'] == '3'
           and float(rows[0]['pka']) == 24.7, rows)
    _, rows = tsv('sites', '--solvent', 'water', 'ethyl acetoacetate')
    expect('ethyl acetoacetate in water 10.68', float(rows[0]['pka']) == 10.68, rows)
    _, rows = tsv('sites', '--solvent', 'thf', 'ethyl acetoacetate')
    expect('nothing is measured in THF', all(r['basis'] == 'estimated' for r in rows), rows)
    expect('the interval holds the value', all(float(r['low']) < float(r['pka']) < float(r['high']) for r in rows),
           rows)


def check_explain():
    """Published differences in DMSO (resources/acids.tsv): acetone 26.5, acetylacetone 13.3."""
    plain, rows = tsv('sites', 'acetylacetone', '2-indanone', 'benzaldehyde')
    names, explained = tsv('sites', '--explain', 'acetylacetone', '2-indanone', 'benzaldehyde')
    expect('columns of sites --explain', names == plain + ['why', 'interval', 'structures'], names)
    expect('the same table', [[r[n] for n in plain] for r in explained] == [[r[n] for n in plain] for r in rows],
           explained)
    for row in explained:
        if row['rank'] == '0':
            expect('no reasons without a value', row['why'] == row['interval'] == row['structures'] == '', row)
            continue
        parts = [part.rsplit(' ', 1) for part in row['why'].split(' | ')]
        expect('at most six lines', 1 <= len(parts) <= 6 and parts[0][0].startswith('parent'), row['why'])
        expect('they add up', abs(sum(float(v) for _, v in parts) - float(row['pka'])) < 1e-6, row['why'])
        expect('interval in words', '90 %' in row['interval'], row)
        expect('a structure for each precedent', len(row['structures'].split(' | ')) ==
               len(row['precedents'].split(' | ')), row)
    out, _ = run('sites', '--explain', '--format', 'json', 'acetylacetone', 'CC(=O)C=C[CH3:1]', 'benzaldehyde')
    objects = [json.loads(line) for line in out.splitlines()]
    first = objects[0]
    lines = {line['words']: line['value'] for line in first['why']['lines']}
    expect('json: parent and second acyl group', abs(lines['parent: acetone'] - 26.5) < 0.5 and
           abs(lines['second acyl group (acetyl)'] + 13.2) < 0.6, lines)
    expect('json: they add up', abs(sum(lines.values()) - first['pka']) < 1e-6, first)
    precedent = first['why']['precedents'][0]
    expect('json: the published row first', precedent['name'] == 'acetylacetone' and precedent['pka'] == 13.3 and
           precedent['weight'] == 1 and precedent['solvent'] == 'dmso' and precedent['source'], precedent)
    expect('json: a reason without a value', objects[-1]['rank'] == 0 and objects[-1]['why'] is None, objects[-1])
    out, _ = run('sites', '--explain', 'acetylacetone')
    lines = out.splitlines()
    numbers = [float(line[:13]) for line in lines[2:lines.index(next(l for l in lines if '=' in l[:8]))]]
    expect('text: a block under its site', abs(sum(numbers) - 13.3) < 1e-6 and
           'second acyl group (acetyl)' in out, out)
    expect('text: precedents with weight and source', 'weight 1.00' in out and 'Olmstead' in out, out)
    with tempfile.TemporaryDirectory() as folder:
        path = os.path.join(folder, 'own.tsv')
        with open(path, 'w') as stream:
            stream.write('structure\tatom\tsolvent\tpka\tsigma\nO=C1Cc2ccccc2C1\t3\tdmso\t16.4\t0.3\n')
        out, _ = run('sites', '--explain', '--lab', path, '--format', 'json', 'O=C1Cc2ccccc2C1')
        own = json.loads(out.splitlines()[0])
        lines = own['why']['lines']
        expect('an own value closes the sum', own['pka'] == 16.4 and lines[-1]['words'] == 'own value minus model' and
               abs(sum(line['value'] for line in lines) - 16.4) < 1e-6, own)
    run('sites', '--explain=2', 'acetone', code=2)
    run('forms', '--explain', 'acetone', code=2)


def check_forms():
    names, rows = tsv('forms', 'acetylacetone')
    expect('columns of forms', names == ['substrate', 'atom', 'form', 'smiles', 'weight', 'charges'], names)
    listed = [r for r in rows if r['form'] != 'hybrid']
    carbanion = [r for r in listed if '[CH-]' in r['smiles']]
    enolates = [r for r in listed if '[O-]' in r['smiles']]
    expect('one carbanion form', len(carbanion) == 1, rows)
    weights = [float(r['weight']) for r in enolates]
    expect('two enolate forms', len(enolates) == 2, rows)
    expect('equal and above the carbanion', max(weights) - min(weights) < 1e-6 and
           min(weights) > float(carbanion[0]['weight']), rows)
    _, typed = tsv('forms', 'CC(=O)[CH-]C(C)=O')
    expect('the anion as typed has the same forms', [(r['smiles'], r['weight']) for r in typed] ==
           [(r['smiles'], r['weight']) for r in rows], typed)
    _, nitro = tsv('forms', 'C[N+](=O)[O-]')
    expect('a nitro group is no anion', nitro[0]['smiles'].startswith('[CH2-]'), nitro)
    expect('weights add up', abs(sum(float(r['weight']) for r in listed) - 1) < 1e-3, rows)


def check_bases():
    names, rows = tsv('bases', 'ethyl acetoacetate')
    expect('columns of bases', names == ['substrate', 'atom', 'base', 'pkah', 'gap', 'conversion', 'low', 'high',
                                         'selectivity', 'verdict', 'cautions'], names)
    base = {r['base']: r for r in rows}
    expect('every base is there once', len(rows) == len(base) == 80, len(rows))
    expect('ethoxide takes it off', base['naoet']['verdict'] == 'complete', base['naoet'])
    expect('LDA has no number in DMSO', base['lda']['gap'] == '', base['lda'])
    _, rows = tsv('bases', '--solvent', 'thf', '--equiv', '1.1', 'acetophenone')
    lda = [r for r in rows if r['base'] == 'lda'][0]
    expect('LDA in THF: complete', lda['verdict'] == 'complete' and float(lda['gap']) > 8, lda)
    out, _ = run('bases', 'ethyl acetoacetate')
    expect('the deferral stands below', 'qualified person' in out)
    expect('so do the equivalents', '  0.95: ' in out and '  2.10: ' in out, out[-900:])


def check_practice():
    """Textbook pairs, common practice."""
    def base(name, *arguments):
        _, rows = tsv('bases', *arguments)
        return [r for r in rows if r['base'] == name][0]
    row = base('naoet', '--solvent', 'water', 'ethyl acetoacetate')
    expect('acetoacetate with ethoxide in ethanol: full', row['verdict'] == 'complete', row)
    expect('the medium is named', 'in its own alcohol' in row['cautions'], row)
    row = base('naoet', '--solvent', 'water', 'acetone')
    expect('acetone with ethoxide: partial, aldol', row['verdict'].startswith('partial') and
           'self-aldol' in row['cautions'] and float(row['low']) < float(row['conversion']) < float(row['high']), row)
    row = base('naoet', 'COC(=O)Cc1ccccc1')
    expect('ester exchange', '[R10]' in row['cautions'] and row['verdict'] == 'complete, with a caution', row)
    row = base('naome', 'O=C1CCCCC1Cl')
    expect('Favorskii', row['verdict'] == 'reacts otherwise' and row['conversion'] == '' and
           row['cautions'].startswith('Favorskii'), row)
    out, _ = run('bases', '--solvent', 'thf', '--temperature', '-78', '--atom', '4', '--format', 'json',
                 'CC(=O)Cc1ccc(O)cc1')
    objects = [json.loads(line) for line in out.splitlines()]
    lda = [o for o in objects if o['base'] == 'lda'][0]
    expect('phenol takes the first equivalent', lda['needed'] == 2 and abs(lda['recommended'] - 2.1) < 1e-9 and
           lda['competing'] == 'phenol O-H takes the first equivalent', lda)
    expect('at 1.05 and 2.1 equivalents', lda['at_1.05'] < 0.2 and lda['at_2.10'] > 0.99, lda)
    expect('hazard and deferral in json', 'moisture-sensitive' in lda['hazard'] and
           'qualified person' in lda['deferral'] and lda['footing'] and lda['grade'] == 'partial', lda)
    with tempfile.TemporaryDirectory() as folder:
        path = os.path.join(folder, 'own.enolith')
        with open(path, 'w', encoding='utf-8') as file:
            json.dump({'format': 'enolith-set', 'version': 1, 'substrates': [{'structure': 'acetophenone'}],
                       'bases': [{'name': 'ours', 'class': 'amidine', 'pKaH': {'dmso': 24.7},
                                  'sigma': {'dmso': 0.3}}]}, file)
        _, rows = tsv('bases', '--equiv', '1', path)
        own = [r for r in rows if r['base'] == 'ours'][0]
        expect('a base of the set: gap 0 gives one half', len(rows) == 81 and
               abs(float(own['conversion']) - 0.5) < 1e-6, own)
        _, rows = tsv('bases', path, 'acetone')
        expect('it stays with its set', len(rows) == 81 + 80, len(rows))


def check_molecule():
    names, rows = tsv('molecule', 'CC(=O)CC(=O)OCC', 'acetone')
    expect('columns of molecule', names == ['substrate', 'formula', 'molar_mass', 'heavy_atoms', 'hydrogens',
                                            'rings', 'smiles', 'inchikey'], names)
    expect('ethyl acetoacetate C6H10O3', rows[0]['formula'] == 'C6H10O3' and rows[0]['heavy_atoms'] == '9', rows)
    expect('130.143 g/mol', abs(float(rows[0]['molar_mass']) - 130.143) < 0.01, rows)
    expect('hydrogens per atom', rows[0]['hydrogens'] == '3,0,0,2,0,0,0,2,3', rows)
    expect('acetone by its key', rows[1]['inchikey'] == 'CSCPPACGZOOCGX-UHFFFAOYSA-N', rows)
    _, rows = tsv('molecule', 'InChI=1S/C3H6O/c1-3(2)4/h1-2H3')
    expect('InChI is read', rows[0]['formula'] == 'C3H6O', rows)


def check_formats():
    out, _ = run('sites', '--format', 'json', 'acetophenone', 'benzaldehyde')
    objects = [json.loads(line) for line in out.splitlines()]
    expect('json: one object a line', len(objects) >= 2 and objects[0]['pka'] == 24.7, out)
    expect('json: no value is null', objects[-1]['rank'] != 0 or objects[-1]['pka'] is None, out)
    environment = dict(os.environ, LC_ALL='de_DE.UTF-8')
    done = subprocess.run([CLI, 'sites', '--format', 'tsv', 'acetophenone'], capture_output=True, text=True,
                          env=environment)
    expect('a point in every locale', '24.70' in done.stdout, done.stdout)
    out, _ = run('sites', '--format', 'tsv', '-', text='CC=O first one\n\n# remark\nethyl acetoacetate\nCC#N\n')
    substrates = [r['substrate'] for r in table(out)[1]]
    expect('lines, names and remarks', substrates[0] == 'first one' and 'ethyl acetoacetate' in substrates and
           substrates[-1] == 'CC#N', substrates)


def check_failures():
    out, err = run('sites', '--format', 'tsv', 'C1CC', 'acetophenone', code=1)
    expect('place, fault and advice', err.startswith('C1CC: line 1, column 2: ') and ';' in err, err)
    expect('the others are still printed', 'acetophenone' in out, out)
    _, err = run('sites', 'CC(=O)Cx', code=1)
    lines = err.split('\n')
    expect('a caret under the character', lines[1].strip() == 'CC(=O)Cx' and
           lines[2].index('^') - 4 == 7, err)
    _, err = run('sites', '--format', 'tsv', '-', text='CC=O\nC(C\n', code=1)
    expect('the line in the list', 'line 2, column' in err, err)
    for name, data in (('empty input', b''), ('spaces', b'  \n\t\n'), ('binary', bytes(range(256)) * 40),
                       ('10 MB of noise', b'qZ7)(=#' * 1500000), ('10 MB of lines', b'q(Z7\n' * 100000),
                       ('5,000 atoms', b'C' * 5000), ('100,000 brackets', b'(' * 100000)):
        _, err = run('sites', '--format', 'tsv', '-', text=data, code=1)
        expect('%s: a message' % name, len(err) > 10, err[:200])
    with tempfile.TemporaryDirectory() as folder:
        for name, data in (('a.mol', b'nothing\n'), ('b.sdf', b'\x00\x01\x02'), ('c.enolith', b'{"format"'),
                           ('d.smi', b'')):
            path = os.path.join(folder, name)
            with open(path, 'wb') as stream:
                stream.write(data)
            _, err = run('molecule', path, code=1)
            expect('%s: a message' % name, name in err or 'record' in err, err)
        _, err = run('molecule', os.path.join(folder, 'missing.smi'), code=1)
        expect('a missing file', 'missing.smi' in err, err)


LAB = '''structure\tatom\tsolvent\tpka\tsigma\tname\tnote
O=C(CC(C)C)c1ccc(CCC)cc1\t3\tdmso\t30.0\t0.2\tblock K\trun 1
CC(=O)c1ccccc1\t1\tdmso\t23.1\t0.2\t\t
CCCC(=O)CC(=O)OC\t6\twater\t9.9\t0.1\tester\tmorning
CCCC(=O)CC(=O)OC\t6\twater\t11.9\t0.2\tester\tevening
'''


def check_lab():
    near, own = 'O=C(CC(C)CC)c1ccc(CC)cc1', 'O=C(CC(C)C)c1ccc(CCC)cc1'
    with tempfile.TemporaryDirectory() as folder:
        path = os.path.join(folder, 'own.tsv')
        with open(path, 'w') as stream:
            stream.write(LAB)
        plain = run('sites', '--format', 'tsv', near, own)[0]
        out, err = run('sites', '--lab', path, '--format', 'tsv', near, own)
        names, rows = table(out)
        expect('lab: the columns stay', names == table(plain)[0], names)
        mine = [r for r in rows if r['substrate'] == own and '3' in r['atoms'].split(',')][0]
        expect('lab: the own value stands', mine['basis'] == 'lab' and float(mine['pka']) == 30.0, mine)
        expect('lab: it leads the precedents', mine['precedents'].startswith('lab: block K 30 in DMSO'), mine)
        before = [r for r in table(plain)[1] if r['atoms'] == '3'][0]
        after = [r for r in rows if r['atoms'] == '3'][0]
        expect('lab: the neighbour moves', after['basis'] == 'estimated' and
               float(after['pka']) > float(before['pka']) + 0.5, (before, after))
        expect('lab: without it the old numbers', run('sites', '--format', 'tsv', near, own)[0] == plain)
        expect('lab: contradictions are warned of', err.count('warning: ') == 2 and 'published 24.7' in err and
               '9.9 (sigma 0.1, line 4, morning) and 11.9 (sigma 0.2, line 5, evening)' in err, err)
        out, _ = run('sites', '--lab', path, '--solvent', 'water', '--format', 'json', 'CCCC(=O)CC(=O)OC')
        found = [json.loads(line) for line in out.splitlines()]
        expect('lab: json has the remark', found[0]['basis'] == 'lab' and found[0]['pka'] == 9.9 and
               found[0]['low'] < 9.9 and found[0]['high'] > 11.9 and 'disagree' in found[0]['remark'], found)
        out, _ = run('bases', '--lab', path, '--format', 'tsv', 'acetophenone')
        dimsyl = [r for r in table(out)[1] if r['base'] == 'kotbu'][0]
        expect('lab: bases are set against it', abs(float(dimsyl['gap']) - (float(dimsyl['pkah']) - 23.1)) < 1e-6,
               dimsyl)
        with open(path, 'a') as stream:
            stream.write('C1CC\t\tdmso\t20\n')
        out, err = run('sites', '--lab', path, 'acetone', code=1)
        expect('lab: a fault has its place, and nothing is printed', 'own.tsv: line 6, column 2: ' in err and
               out == '', (out, err))
        _, err = run('sites', '--lab', os.path.join(folder, 'none.tsv'), 'acetone', code=1)
        expect('lab: a missing file', 'none.tsv' in err, err)
        path = os.path.join(folder, 'own.enolith')
        values = [{'structure': 'CC(=O)c1ccccc1', 'atom': 1, 'solvent': 'dmso', 'pka': 24.6}]
        with open(path, 'w') as stream:
            json.dump({'format': 'enolith-set', 'version': 1, 'substrates': [{'structure': 'acetophenone'}],
                       'lab': values}, stream)
        _, rows = tsv('sites', path, 'acetophenone')
        expect('lab: a set brings its own, for itself only', [r['basis'] for r in rows] == ['lab', 'measured'],
               rows)
        values.append({'structure': 'CC(=O)C', 'solvent': 'thf', 'pka': 26})
        with open(path, 'w') as stream:
            json.dump({'format': 'enolith-set', 'version': 1, 'substrates': [{'structure': 'acetophenone'}],
                       'lab': values}, stream)
        out, err = run('sites', '--format', 'tsv', path, code=1)
        expect('lab: a bad value of a set is told, the rest is used', 'lab value 2: ' in err and 'THF' in err and
               '\tlab\t' in out, (out, err))


def check_footing():
    out, _ = run('sites', '--solvent', 'thf', 'CC(=O)c1ccc(O)cc1', 'dimethyl sulfone')
    expect('THF: the footing is named', out.count('DMSO-based footing') == 3, out)
    expect('THF: a localised carbanion is told', 'localised carbanion' in out, out)
    out, _ = run('sites', '--solvent', 'thf', '--format', 'json', 'acetophenone')
    expect('THF: json, too', json.loads(out)['footing'].startswith('DMSO-based footing'), out)
    out, _ = run('bases', '--solvent', 'thf', 'acetophenone')
    expect('THF: bases, too', 'THF (DMSO-based footing)' in out, out)
    out, _ = run('bases', '--solvent', 'thf', '--format', 'json', 'acetophenone')
    expect('THF: bases in json, too', all('DMSO-based footing' in json.loads(line)['site_footing'] for line in out.splitlines()))
    out, _ = run('sites', '--format', 'json', 'acetophenone')
    expect('DMSO has no footing', json.loads(out)['footing'] is None, out)


def check_usage():
    for arguments in ((), ('boil', 'CC'), ('sites',), ('sites', '--solvent', 'tar', 'CC'),
                      ('sites', '--colour', 'CC'), ('sites', '--format'), ('bases', '--equiv', '-1', 'CC=O'),
                      ('bases', '--equiv', 'nan', 'CC=O'), ('forms', '--atom', '0', 'CC=O'),
                      ('figure', 'CC=O'), ('figure', '--view', 'forms', '--out', 'x.gif', 'CC=O'),
                      ('validate', '--fold', 'paper'), ('validate', 'CC'),
                      ('validate', '--plot', 'x.gif'), ('validate', '--rows', '--pairs'), ('validate', '--rows=3')):
        _, err = run(*arguments, code=2)
        expect('%s: explained' % (arguments,), len(err) > 10, err)
    for arguments in (('--help',), ('--version',), ('sites', '--help')):
        out, _ = run(*arguments)
        expect('%s prints' % (arguments,), len(out) > 5)
    _, err = run('forms', '--atom', '2', 'CC(=O)C', code=1)
    expect('an atom that is no site', 'no acidic site' in err, err)


def check_figures():
    with tempfile.TemporaryDirectory() as folder:
        for view in ('substrates', 'forms', 'bases', 'curve'):
            for ending, magic in (('png', b'\x89PNG'), ('svg', b'<?xml'), ('pdf', b'%PDF')):
                path = os.path.join(folder, '%s.%s' % (view, ending))
                run('figure', '--view', view, '--out', path, '--width-mm', '120', 'acetylacetone', 'camphor')
                with open(path, 'rb') as stream:
                    data = stream.read()
                expect('%s as %s' % (view, ending), data.startswith(magic) and len(data) > 2000, len(data))
        path = os.path.join(folder, 'two.svg')
        run('figure', '--view', 'curve', '--atom', '1', '--base', 'naotbu', '--base', 'DBU', '--water', '0.1',
            '--out', path, 'CC(=O)c1ccccc1')
        with open(path, 'rb') as stream:
            both = stream.read()
        run('figure', '--view', 'curve', '--base', 'naotbu', '--out', path, 'CC(=O)c1ccccc1')
        with open(path, 'rb') as stream:
            expect('a curve for every base', len(both) > len(stream.read()) + 2000)
        _, err = run('figure', '--view', 'curve', '--base', 'nothing', '--out', path, 'acetone', code=1)
        expect('an unknown base is named', "no base 'nothing'" in err, err)
        run('figure', '--view', 'forms', '--out', '/no/such/folder/a.png', 'acetone', code=1)


def check_validate():
    names, rows = tsv('validate')
    expect('columns of validate', names == ['class', 'solvent', 'n', 'mae', 'median', 'rmse', 'max', 'cover90'], names)
    found = {(r['class'], r['solvent']): r for r in rows}
    expect('alpha C-H of carbonyls in DMSO', int(found[('alpha C-H of carbonyls', 'dmso')]['n']) >= 70, rows)
    for solvent in ('dmso', 'water'):
        parts = [int(found[(name, solvent)]['n']) for name in ('alpha C-H of carbonyls', 'C-H other')]
        expect('C-H in %s add up' % solvent, sum(parts) == int(found[('all C-H', solvent)]['n']), parts)
    _, families = tsv('validate', '--fold', 'cluster')
    expect('families left out are harder', float(families[-1]['mae']) > float(rows[-1]['mae']), families[-1])
    text, _ = run('validate')
    expect('the order stands in the plain report', 'compounds of one family' in text, text[-400:])
    total = sum(int(found[('all', solvent)]['n']) for solvent in ('dmso', 'water'))
    check_order()
    check_rows(total)
    check_plot(total)


def check_order():
    names, rows = tsv('validate', '--ranking')
    expect('columns of --ranking', names == ['pairs', 'solvent', 'n', 'fitted', 'left_out'], names)
    everything = rows[-1]
    expect('all pairs', everything['pairs'] == 'all' and int(everything['n']) > 2000, everything)
    expect('shares', all(0 < float(r[c]) <= 1 for r in rows for c in ('fitted', 'left_out')), rows)
    names, families = tsv('validate', '--families')
    expect('columns of --families', names == ['family', 'parent', 'solvent', 'n', 'fitted', 'left_out'], names)
    pairs = [r for r in rows if r['pairs'].startswith('compounds') and r['solvent'] == 'both']
    expect('families add up', sum(int(r['n']) for r in families) == int(pairs[0]['n']), pairs)
    expect('phenols are a family', any(r['parent'] == 'phenol' and r['solvent'] == 'water' for r in families))
    names, wrong = tsv('validate', '--pairs')
    expect('columns of --pairs', names == ['pairs', 'family', 'parent', 'solvent', 'first', 'second', 'published',
                                           'fitted', 'left_out'], names)
    counted = sum(round(int(r['n']) * (1 - float(r['left_out']))) for r in rows[-1:])
    listed = sum(float(r['published']) * float(r['left_out']) <= 0 for r in wrong)
    expect('wrong pairs are listed', abs(listed - counted) <= 0.001 * int(everything['n']) + 1, (listed, counted))


def check_rows(total):
    names, rows = tsv('validate', '--rows')
    expect('columns of --rows', names == ['name', 'smiles', 'solvent', 'published', 'left_out', 'low', 'high',
                                          'residual', 'class'], names)
    expect('all rows', len(rows) == total, len(rows))
    sizes = [abs(float(r['residual'])) for r in rows]
    expect('largest residual first', sizes == sorted(sizes, reverse=True), sizes[:5])
    inside = [float(r['low']) <= float(r['published']) <= float(r['high']) for r in rows]
    expect('residual and interval agree', all((z < 1.6449) == held or abs(z - 1.6449) < 0.05
                                              for z, held in zip(sizes, inside)))


def shapes_of(picture):
    """Painted shapes of an SVG; the letters stand in its definitions and are used by name."""
    drawn = re.sub(rb'<defs>.*?</defs>', b'', picture, flags=re.S)
    return len(re.findall(rb'<(?:path|rect|circle) ', drawn))


def check_readme_picture(fresh):
    """Bytes depend on versions of fonts, the number of marks does not."""
    stored = pathlib.Path(__file__).parents[2] / 'resources' / 'pictures' / 'reliability.svg'
    expect('the picture in README shows the rows of today: meson compile -C BUILD reliability-picture',
           shapes_of(stored.read_bytes()) == shapes_of(fresh), (shapes_of(stored.read_bytes()), shapes_of(fresh)))


def check_plot(total):
    with tempfile.TemporaryDirectory() as folder:
        for ending, magic in (('png', b'\x89PNG'), ('svg', b'<?xml'), ('pdf', b'%PDF')):
            path = os.path.join(folder, 'reliability.' + ending)
            out, _ = run('validate', '--plot', path)
            with open(path, 'rb') as stream:
                data = stream.read()
            expect('reliability as %s' % ending, data.startswith(magic) and out == '', (len(data), out[:80]))
            if ending == 'svg':
                expect('two marks for every row', 2 * total < shapes_of(data) < 2 * total + 200, shapes_of(data))
                check_readme_picture(data)
                run('validate', '--plot', path)
                with open(path, 'rb') as stream:
                    expect('the same picture every time', stream.read() == data)
        run('validate', '--plot', '/no/such/folder/a.svg', code=1)


def main():
    for check in (check_sites, check_explain, check_forms, check_bases, check_practice, check_molecule, check_formats,
                  check_failures, check_lab, check_footing, check_usage, check_figures, check_validate):
        check()
    print('%d checks, %d failed' % (count, len(failures)))
    print('\n'.join(failures))
    sys.exit(1 if failures else 0)


if __name__ == '__main__':
    main()
