"""Weigh-out and report at the terminal.

Usage: check-weigh.py ENOLITH_CLI
Amounts are worked by hand: molar masses from IUPAC abridged atomic weights, commercial forms as in
resources/bases.tsv (n-BuLi 2.5 mol/L, NaH 60 %, LDA 2.0 mol/L).
"""
import csv
import io
import json
import os
import pathlib
import subprocess
import sys
import tempfile

CLI = sys.argv[1]
failures = []
count = 0


def run(*arguments, code=0, binary=False):
    done = subprocess.run([CLI, *arguments], capture_output=True, timeout=120)
    out, err = done.stdout.decode(), done.stderr.decode(errors='replace')
    expect('%s: exit code %d' % (' '.join(arguments)[:70], code), done.returncode == code,
           'got %d, %s' % (done.returncode, err[:300]))
    return out, err


def expect(what, fact, detail=''):
    global count
    count += 1
    if not fact:
        failures.append('%s (%s)' % (what, detail))


def weigh(*arguments):
    out, _ = run('weigh', '--format', 'tsv', *arguments)
    return list(csv.DictReader(io.StringIO(out), delimiter='\t'))


def amounts(rows):
    return [(r['base'], r['amount'], r['unit']) for r in rows]


def check_weigh():
    out, _ = run('weigh', '--format', 'tsv', '--base', 'nah', '--mmol', '10', '--equiv', '1', 'acetylacetone')
    expect('columns of weigh', out.splitlines()[0].split('\t') ==
           ['substrate', 'base', 'equiv', 'mmol', 'molar_mass', 'amount', 'unit'], out)
    rows = weigh('--base', 'nah', '--mmol', '10', '--equiv', '1', 'acetylacetone')
    expect('NaH 60 %, 10 mmol: 400 mg', amounts(rows) == [('nah', '400', 'mg')] and rows[0]['mmol'] == '10.0', rows)
    rows = weigh('--base', 'nbuli', '--titre', '2.5', '--equiv', '1.05', '--mmol', '5', '--solvent', 'thf', 'CC(C)=O')
    expect('n-BuLi 2.5 mol/L, 1.05 equiv of 5.00 mmol: 2.10 mL', amounts(rows) == [('nbuli', '2.10', 'mL')] and
           rows[0]['equiv'] == '1.05' and rows[0]['mmol'] == '5.25' and rows[0]['molar_mass'] == '64.06', rows)
    rows = weigh('--base', 'kotbu', '--base', 'lda', '--mmol', '10', '--solvent', 'thf', 'acetophenone')
    expect('two bases: KOtBu 1180 mg, LDA 5.25 mL', amounts(rows)[:2] == [('kotbu', '1180', 'mg'), ('lda', '5.25', 'mL')],
           rows)
    rows = weigh('--base', 'nah', '--grams', '1.3014', '--dispersion', '57', '--equiv', '1.1', 'ethyl acetoacetate')
    expect('grams of substrate (130.14 g/mol), NaH 57 %: 463 mg', amounts(rows) == [('nah', '463', 'mg')], rows)
    rows = weigh('--base', 'lda', '--mmol', '2', '--solvent', 'thf', 'CC(=O)Cc1ccc(O)cc1')
    expect('a phenol takes one equivalent: 2.1 by default', rows[0]['equiv'] == '2.10', rows)
    rows = weigh('--base', 'nbuli', '--mmol', '5', '--equiv', '1.05', '--water', '0.15', 'acetylacetone')
    expect('water adds to it: 6.00 mmol', rows[0]['mmol'] == '6.00' and rows[0]['amount'] == '2.40', rows)
    rows = weigh('--base', 'soft_mgcl2_et3n', '--mmol', '5', '--equiv', '2', 'diethyl malonate')
    expect('a set names its other part without an amount', rows[-1]['base'] == 'soft_mgcl2_et3n: magnesium chloride'
           and rows[-1]['amount'] == '' and rows[-1]['molar_mass'] == '95.21', rows)


def check_weigh_words():
    out, _ = run('weigh', '--base', 'nah', '--mmol', '5', '--solvent', 'thf', 'diethyl malonate')
    expect('text: why, form, cautions, deferral', all(word in out for word in (
        'why: 1 counted and 5 % more', '60\u00a0% by mass', '[H05] Evolves hydrogen', 'qualified person')), out)
    out, _ = run('weigh', '--base', 'et3n', '--mmol', '5', 'acetophenone')
    expect('text: a base that is too weak says so', 'does not work' in out and 'by count alone' in out, out)
    out, _ = run('weigh', '--base', 'nah', '--mmol', '5', '--format', 'json', '--solvent', 'thf', 'diethyl malonate')
    row = json.loads(out.splitlines()[0])
    expect('json: exact amount, reason, hazards', abs(row['exact'] - 5.25 * 23.998 / 0.6) < 0.05 and row['unit'] == 'mg'
           and 'counted' in row['reason'] and 'H05' in row['hazard'] and 'qualified person' in row['deferral'], row)


def check_weigh_usage():
    for bad in (['--mmol', '0'], ['--mmol', '-3'], ['--mmol', 'nan'], ['--mmol', '1e9'], ['--mmol', 'much'],
                ['--grams', '0'], ['--mmol', '5', '--grams', '1'], [], ['--mmol', '5', '--equiv', '0'],
                ['--mmol', '5', '--titre', '0'], ['--mmol', '5', '--dispersion', '120'], ['--mmol', '5', '--water', '-1']):
        out, err = run('weigh', '--base', 'nbuli', *bad, 'acetone', code=2)
        expect('%s: one line with advice' % bad, out == '' and len(err.splitlines()) == 1 and '--help' in err, err)
    run('weigh', '--mmol', '5', 'acetone', code=2)
    _, err = run('weigh', '--base', 'unobtainium', '--mmol', '5', 'acetone', code=1)
    expect('an unknown base is named', "'unobtainium'" in err and 'bases' in err, err)
    _, err = run('weigh', '--base', 'lda', '--mmol', '5', '--atom', '2', 'CC(=O)C', code=1)
    expect('an atom that is no site', 'atom 2' in err, err)
    _, err = run('weigh', '--base', 'lda', '--mmol', '5', 'benzophenone', code=1)
    expect('nothing to deprotonate', 'no acidic hydrogen' in err, err)
    _, err = run('weigh', '--base', 'kotbu', '--base', 'nah', '--titre', '1', '--mmol', '5', 'acetone', code=1)
    expect('whose titre?', 'whose titre' in err, err)
    _, err = run('weigh', '--base', 'nah', '--titre', '2', '--mmol', '5', 'acetone', code=1)
    expect('a titre of a dispersion', 'dispersion in mineral oil' in err and 'no solution' in err, err)
    _, err = run('weigh', '--base', 'LDA', '--dispersion', '60', '--mmol', '5', 'acetone', code=1)
    expect('a mass per cent of a solution', 'give the titre' in err, err)
    _, err = run('weigh', '--base', 'BuLi', '--mmol', '5', 'acetone', code=1)
    expect('the nearest bases', 'nbuli, sbuli, tbuli' in err, err)
    out, _ = run('weigh', '--base', 'n-BuLi', '--mmol', '5', 'acetone')
    expect('a usual spelling', 'nbuli' in out, out)


def check_own_base():
    own = {'name': 'ours', 'class': 'amidine', 'pKaH': {'dmso': 24.0}, 'sigma': {'dmso': 0.5}}
    with tempfile.TemporaryDirectory() as folder:
        path = os.path.join(folder, 'own.enolith')

        def write(**more):
            pathlib.Path(path).write_text(json.dumps({
                'format': 'enolith-set', 'version': 1, 'bases': [dict(own, **more)],
                'substrates': [{'name': 'ester', 'structure': 'CC(=O)CC(=O)OCC'}]}))
        write()
        _, err = run('weigh', '--base', 'ours', '--mmol', '4', path, code=1)
        expect('an own base without molar mass', 'no molar mass' in err and 'titre' in err, err)
        rows = weigh('--base', 'ours', '--mmol', '4', '--equiv', '1.25', '--titre', '0.5', path)
        expect('by its titre 10.0 mL', amounts(rows) == [('ours', '10.0', 'mL')], rows)
        write(molar_mass=312.0, density=0.96)
        rows = weigh('--base', 'ours', '--mmol', '4', '--equiv', '1.25', path)
        expect('by its molar mass and density', amounts(rows) == [('ours', '1.63', 'mL'), ('ours', '1560', 'mg')], rows)
        write(molar_mass=-1)
        _, err = run('weigh', '--base', 'ours', '--mmol', '4', path, code=1)
        expect('an impossible molar mass', 'molar mass' in err, err)


def pdf_text(path):
    return subprocess.run(['pdftotext', '-layout', path, '-'], check=True, capture_output=True, text=True).stdout


def check_report():
    substrates = [{'name': 'ester', 'structure': 'CC(=O)CC(=O)OCC'}, {'name': 'no hydrogen', 'structure': 'benzophenone'},
                  {'name': 'broken', 'structure': 'CC(=O)C1CC'}, {'name': 'own', 'structure': 'acetophenone'}]
    lab = [{'structure': 'CC(=O)c1ccccc1', 'atom': 1, 'solvent': 'dmso', 'pka': 24.4, 'sigma': 0.1}]
    with tempfile.TemporaryDirectory() as folder:
        path = os.path.join(folder, 'campaign.enolith')

        def write(rows):
            pathlib.Path(path).write_text(json.dumps({'format': 'enolith-set', 'version': 1, 'substrates': rows, 'lab': lab}))
        write(substrates)
        pdf, html = os.path.join(folder, 'a.pdf'), os.path.join(folder, 'a.html')
        out, err = run('report', '--out', pdf, path, code=1)
        expect('a structure that cannot be read is told, the report is written', 'broken: line 1, column' in err and
               out == '' and os.path.exists(pdf), err)
        info = subprocess.run(['pdfinfo', pdf], check=True, capture_output=True, text=True).stdout
        expect('two A4 pages', 'Pages:           2' in info and '(A4)' in info and 'campaign' in info, info)
        fonts = subprocess.run(['pdffonts', pdf], check=True, capture_output=True, text=True).stdout.splitlines()[2:]
        expect('fonts are embedded', fonts and all(line.split()[-5] == 'yes' for line in fonts), fonts)
        text = pdf_text(pdf)
        expect('what a report holds', all(word in text for word in (
            'pKa 14.2 in DMSO, measured [1]', '90 % interval', 'lab', 'No enolate', 'Cannot be read', 'Cautions', 'Sources',
            'recommended', 'Olmstead', 'qualified person', 'page 2 of 2')), text)
        write(substrates[:2])
        run('report', '--out', pdf, path)
        first = pathlib.Path(pdf).read_bytes()
        run('report', '--out', pdf, path)
        expect('the same bytes again', pathlib.Path(pdf).read_bytes() == first)
        run('report', '--out', html, path)
        page = pathlib.Path(html).read_text()
        expect('one HTML file with pictures inside', page.startswith('<!DOCTYPE html>') and page.count('<svg') >= 4 and
               'http://' not in page.replace('http://www.w3.org/', '') and 'pKa 14.2 in DMSO, measured' in page, len(page))
        run('report', '--out', pdf, '--solvent', 'water', 'acetone', 'acetophenone')
        expect('structures without a set', 'pKa 19.3 in water, measured' in pdf_text(pdf), pdf_text(pdf)[:400])
        for bad in (['--out', os.path.join(folder, 'a.png')], [], ['--out', pdf, path]):
            run('report', *bad, path, code=2)
        run('report', '--out', '/no/such/folder/a.pdf', path, code=1)
        pathlib.Path(path).write_text('{"format": "enolith-set", "version"')
        _, err = run('report', '--out', pdf, path, code=1)
        expect('a damaged set has its place', 'line 1, column' in err, err)
        run('report', '--out', pdf, os.path.join(folder, 'missing.enolith'), code=1)


def main():
    for check in (check_report, check_weigh, check_weigh_words, check_weigh_usage, check_own_base):
        check()
    print('%d checks, %d failed' % (count, len(failures)))
    print('\n'.join(failures))
    sys.exit(1 if failures else 0)


if __name__ == '__main__':
    main()
