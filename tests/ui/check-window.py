"""Starts the real window, drives it with real key events and looks at what it shows.

Usage (inside dbus-run-session and xvfb-run): check-window.py PROGRAM OUTPUT_FOLDER
State is read from the window's "state" action over D-Bus; pictures go to OUTPUT_FOLDER.
Expected pKa: resources/acids.tsv, i.e. acetophenone 24.7 (Matthews et al., JACS 1975, 97, 7006),
ethyl acetoacetate 14.2 in DMSO (Olmstead & Bordwell, J. Org. Chem. 1980, 45, 3299) and 10.68 in
water (Pearson & Dillon, JACS 1953, 75, 2439).
"""
import ast
import json
import os
import pathlib
import subprocess
import sys
import tempfile
import time

APP = 'org.enolith.Enolith'
WINDOW = '/org/enolith/Enolith/window/1'
PATIENCE = 30.0


def run(*command, **options):
    return subprocess.run(command, check=True, capture_output=True, text=True, **options).stdout


def call(path, method, *arguments):
    return run('gdbus', 'call', '--session', '--dest', APP, '--object-path', path, '--method',
               'org.gtk.Actions.' + method, *arguments)


def activate(action, parameter='[]'):
    call(WINDOW, 'Activate', action, parameter, '{}')


def state():
    text = call(WINDOW, 'Describe', 'state')
    start = text.index('[<') + 2
    return json.loads(ast.literal_eval(text[start:text.rindex('>]')]))


def wait(what, condition):
    end = time.monotonic() + PATIENCE
    while time.monotonic() < end:
        now = state()
        if not now['busy'] and condition(now):
            print('ok: %s' % what)
            return now
        time.sleep(0.05)
    raise SystemExit('failed: %s\nstate: %s' % (what, json.dumps(state(), indent=1)))


def key(*names):
    run('xdotool', 'key', '--delay', '30', *names)


def type_text(text):
    """Types and waits until the whole text has arrived in the selected substrate."""
    run('xdotool', 'type', '--delay', '15', text)
    wait('typed ' + text, lambda s: s['substrates'][s['substrate']]['text'] == text)


def window_id():
    end = time.monotonic() + PATIENCE
    while time.monotonic() < end:
        found = subprocess.run(['xdotool', 'search', '--onlyvisible', '--name', 'Enolith$'],
                               capture_output=True, text=True).stdout.split()
        if found:
            return found[0]
        time.sleep(0.05)
    raise SystemExit('no window appeared')


class Picture:
    """A picture of the screen, taken anew until `condition` holds or patience ends."""

    def __init__(self, folder, name, condition=None):
        self.path = str(pathlib.Path(folder) / (name + '.png'))
        end = time.monotonic() + PATIENCE
        while True:
            time.sleep(0.5)
            run('import', '-window', 'root', self.path)
            self.good = condition is None or condition(self)
            if self.good or time.monotonic() > end:
                return

    def brightness(self):
        return float(run('convert', self.path, '-colorspace', 'Gray', '-format', '%[fx:mean]', 'info:'))

    def colours(self):
        return int(run('convert', self.path, '-format', '%k', 'info:'))


def expect(what, fact):
    if not fact:
        raise SystemExit('failed: %s\nstate: %s' % (what, json.dumps(state(), indent=1)))
    print('ok: %s' % what)


def top_site(now, index):
    return now['substrates'][index]['sites'][0]


def check_first_start(folder):
    now = wait('the first start shows a worked set', lambda s: s['size'] == 3 and all(
        x['current'] for x in s['substrates']))
    site = top_site(now, 0)
    expect('ethyl acetoacetate is measured, 14.2', site['basis'] == 'measured' and site['pka'] == 14.2
           and site['hydrogens'] == 2)
    expect('an anisyl ketone is estimated', top_site(now, 1)['basis'] == 'estimated')
    light = Picture(folder, 'first-start', lambda p: p.brightness() > 0.7 and p.colours() > 200)
    expect('the light window is bright and not empty', light.good)


def fields(pka, note=None):
    """Types into the panel of own values, keyboard only, and keeps it with Enter."""
    key('ctrl+m')
    key('ctrl+m')
    key('ctrl+a')
    run('xdotool', 'type', '--delay', '15', pka)
    if note is not None:
        key('Tab', 'Tab', 'ctrl+a')
        run('xdotool', 'type', '--delay', '15', note)
    key('Return')


def check_lab(folder):
    before = state()
    key('ctrl+m')
    fields('13.2', 'titration 3')
    now = wait('an own value joins', lambda s: len(s['lab']) == 1 and all(x['current'] for x in s['substrates']))
    site = top_site(now, 0)
    expect('it stands at its site, marked lab', site['basis'] == 'lab' and abs(site['pka'] - 13.2) < 1e-9)
    expect('the contradiction is told', 'published 14.2' in site['remark'] and now['lab'][0]['contradicts'] and
           now['lab'][0]['note'] == 'titration 3' and now['lab'][0]['sigma'] == 0.3)
    expect('others shift', now['substrates'][0]['sites'][1]['pka'] != before['substrates'][0]['sites'][1]['pka'])
    Picture(folder, 'lab-value')
    fields('13,9')
    time.sleep(0.3)
    expect('a typo changes nothing', state()['lab'] == now['lab'])
    Picture(folder, 'lab-typo')
    fields('14.1')
    now = wait('it is changed', lambda s: abs(s['lab'][0]['pka'] - 14.1) < 1e-9 and
               all(x['current'] for x in s['substrates']))
    expect('no contradiction is left', 'remark' not in top_site(now, 0) and not now['lab'][0]['contradicts'])
    key('ctrl+3')
    wait('THF has no lab value', lambda s: s['solvent'] == 'thf' and all(x['current'] for x in s['substrates'])
         and top_site(s, 0)['basis'] == 'estimated')
    Picture(folder, 'lab-thf')
    key('ctrl+1')
    wait('back in DMSO', lambda s: s['solvent'] == 'dmso' and all(x['current'] for x in s['substrates'])
         and top_site(s, 0)['basis'] == 'lab')
    with tempfile.TemporaryDirectory() as place:
        path = os.path.join(place, 'own.tsv')
        head = 'structure\tatom\tsolvent\tpka\tsigma\tnote\n'
        rows = 'COc1ccc(cc1)C(=O)CC\t11\tdmso\t25.1\t0.2\tmorning\nCOc1ccc(cc1)C(=O)CC\t11\tdmso\t27.9\t0.2\t\n'
        pathlib.Path(path).write_text(head + rows + 'C1CC\t\tdmso\t20\n')
        activate('open-path', "[<'%s'>]" % path)
        time.sleep(0.3)
        expect('a table with a fault changes nothing', len(state()['lab']) == 1)
        pathlib.Path(path).write_text(head + rows)
        activate('open-path', "[<'%s'>]" % path)
        now = wait('a table joins', lambda s: len(s['lab']) == 3 and all(x['current'] for x in s['substrates']))
        site = top_site(now, 1)
        expect('its two values disagree, one is shown', abs(site['pka'] - 25.1) < 1e-9 and
               'lab values disagree' in site['remark'])
        Picture(folder, 'lab-table')
        activate('open-path', "[<'%s'>]" % path)
        time.sleep(0.3)
        expect('again it adds nothing', len(state()['lab']) == 3)
        kept = os.path.join(place, 'own.enolith')
        written = json.dumps(now['lab'])
        activate('save-path', "[<'%s'>]" % kept)
        wait('saved with lab values', lambda s: not s['unsaved'])
        activate('undo')
        wait('a table is one step of undo', lambda s: len(s['lab']) == 1)
        activate('open-path', "[<'%s'>]" % kept)
        now = wait('they come back from the file', lambda s: len(s['lab']) == 3 and
                   all(x['current'] for x in s['substrates']) and s['lab'][1].get('remark'))
        expect('as they were', json.dumps(now['lab']) == written)
    for left in (2, 1):
        key('ctrl+m')
        key('ctrl+m')
        key('Tab', 'Tab', 'Tab', 'Tab', 'space') # pKa, sigma, note, keep, remove
        wait('removed by the keyboard', lambda s: len(s['lab']) == left and
             all(x['current'] for x in s['substrates']))
        if left == 2:
            key('alt+Right')
            wait('the next substrate', lambda s: s['substrate'] == 1)
    key('ctrl+m')
    key('ctrl+m')
    key('Tab', 'Tab', 'Tab', 'Tab', 'space')
    now = wait('the last one is removed', lambda s: s['lab'] == [] and
               all(x['current'] for x in s['substrates']))
    expect('every number is what it was', now['substrates'] == before['substrates'])
    key('Escape')
    key('alt+Left')
    wait('the first substrate again', lambda s: s['substrate'] == 0)


def check_typing(folder):
    key('ctrl+t')
    wait('a new substrate is selected', lambda s: s['size'] == 4 and s['substrate'] == 1)
    type_text('acetophenone')
    now = wait('acetophenone is read while typing', lambda s: s['substrates'][1]['current'])
    site = top_site(now, 1)
    expect('three alpha hydrogens, 24.7 measured', site['pka'] == 24.7 and site['hydrogens'] == 3 and
           site['basis'] == 'measured')
    key('ctrl+l', 'ctrl+a')
    type_text('CC(=O)C1CC')
    now = wait('an open ring is an error', lambda s: 'error' in s['substrates'][1])
    error = now['substrates'][1]['error']
    expect('the error has a place and advice', 'line 1, column' in error and ';' in error)
    expect('the last good structure stays', now['substrates'][1].get('smiles'))
    Picture(folder, 'typing-error')
    key('ctrl+a')
    type_text('O=C(c1ccccc1)c1ccccc1')
    now = wait('benzophenone is read', lambda s: s['substrates'][1]['current'])
    expect('it says why it cannot enolise', 'reason' in now['substrates'][1])


def check_why(folder):
    """Contributions of the first set's substrates: they add up to the value that is shown."""
    activate('step', '[<int32 -9>]')
    now = wait('the anion forms stand beside the bases', lambda s: s['substrate'] == 0 and s['detail'] == 'forms')
    expect('nothing is explained before it is asked for', now['why'] is None)
    key('ctrl+e')
    now = wait('Ctrl+E asks why', lambda s: s['detail'] == 'why' and s['why'])
    why = now['why']
    words = [line['words'] for line in why['lines']]
    expect('a parent, then the second acyl group', words[0] == 'parent: acetone' and
           words[1] == 'second acyl group (ester)' and len(words) <= 6)
    expect('the lines add up to 14.2', abs(sum(line['value'] for line in why['lines']) - 14.2) < 1e-6)
    expect('the published compound leads the precedents', why['precedents'][0] == 'ethyl acetoacetate')
    plain = Picture(folder, 'why', lambda p: p.colours() > 200)
    expect('there is a picture of it', plain.good)
    activate('step', '[<int32 1>]')
    now = wait('the explanation follows the selection', lambda s: s['substrate'] == 1 and s['why'] and
               abs(s['why']['pka'] - top_site(s, 1)['pka']) < 1e-6 and s['why']['pka'] != why['pka'])
    expect('it says how near the nearest compound is', 'alike' in now['why']['width'])
    for look in ('dark', 'projector', 'light'):
        activate('look', "[<'%s'>]" % look)
        Picture(folder, 'why-' + look)
    now = wait('the looks leave it as it is', lambda s: s['why'] and s['detail'] == 'why')
    key('ctrl+r')
    wait('Ctrl+R goes back to the forms', lambda s: s['detail'] == 'forms')
    activate('step', '[<int32 -9>]')
    wait('the first substrate is selected again', lambda s: s['substrate'] == 0)


def check_curve(folder):
    """The composition curve of the chosen base: in words, and moved from the keyboard."""
    activate('step', '[<int32 -9>]')
    activate('detail', "[<'curve'>]")
    now = wait('the curve stands beside the bases', lambda s: s['detail'] == 'curve' and 'equivalents of' in s['curve'])
    expect('it names the anion and its share', 'At 1.05 equivalents' in now['curve'] and 'anion, site 1' in now['curve'])
    plain = Picture(folder, 'curve', lambda p: p.colours() > 200)
    expect('there is a picture of the curve', plain.good)
    call(WINDOW, 'SetState', 'solvent', "<'water'>", '{}')
    wait('the curve follows the solvent', lambda s: s['curve'] != now['curve'] and s['solvent'] == 'water')
    call(WINDOW, 'SetState', 'solvent', "<'dmso'>", '{}')
    wait('and back', lambda s: s['curve'] == now['curve'])
    key('ctrl+r')
    wait('the forms come back', lambda s: s['detail'] == 'forms')


def check_matrix(folder):
    """The matrix in the place of the columns: moved by arrow keys, left by Escape."""
    activate('step', '[<int32 -9>]')
    wait('the first substrate is selected', lambda s: s['substrate'] == 0)
    key('ctrl+b')
    now = wait('Ctrl+B shows the matrix', lambda s: ': complete' in s['matrix'])
    wide = Picture(folder, 'matrix', lambda p: p.colours() > 200)
    expect('there is a picture of the matrix', wide.good)
    key('Right')
    moved = wait('Right selects the next substrate', lambda s: s['substrate'] == 1 and s['matrix'] and
                 s['matrix'] != now['matrix'] and 'comparing' not in s['matrix'])
    key('Down')
    down = wait('Down selects the next base', lambda s: s['matrix'] != moved['matrix'] and s['base'] != moved['base'])
    for look in ('dark', 'projector', 'light'):
        activate('look', "[<'%s'>]" % look)
        Picture(folder, 'matrix-' + look)
    wait('the looks leave the cell as it is', lambda s: s['matrix'] == down['matrix'])
    key('Escape')
    wait('Escape goes back to the columns', lambda s: s['matrix'] == '' and s['substrate'] == 1)
    activate('step', '[<int32 -9>]')
    wait('the first substrate is selected again', lambda s: s['substrate'] == 0)


def check_weigh(folder):
    """NaOEt as sold, 21 % of 68.05 g/mol at 0.868 g/mL: 5.25 mmol are 1.70 g or 1.96 mL, by hand."""
    key('ctrl+g')
    now = wait('Ctrl+G weighs the selected base', lambda s: s['detail'] == 'weigh' and s['weigh'].get('base') == 'naoet')
    amount = now['weigh']['amount'].replace('\u00a0', ' ')
    expect('5.00 mmol and 1.05 equivalents: 1.96 mL', amount == '1.96 mL (1.70 g)' and now['weigh']['equiv'] == 1.05)
    key('ctrl+a')
    run('xdotool', 'type', '--delay', '15', '12,5x')
    now = wait('a fault is told in place', lambda s: "'12.5x' is no number" in s['weigh']['fault'])
    Picture(folder, 'weigh-fault')
    key('BackSpace')
    wait('the amounts follow what is typed', lambda s: s['weigh'].get('mmol') == 12.5)
    key('ctrl+a')
    run('xdotool', 'type', '--delay', '15', '5')
    key('Tab', 'Tab', 'Tab')
    run('xdotool', 'type', '--delay', '15', '2.5')
    wait('by a titre of 2.5 mol/L: 2.10 mL', lambda s: s['weigh'].get('amount', '').replace('\u00a0', ' ') == '2.10 mL')
    Picture(folder, 'weigh')
    with tempfile.TemporaryDirectory() as place:
        for name, action in (('list.pdf', 'weigh-path'), ('report.pdf', 'report-path'), ('report.html', 'report-path')):
            path = os.path.join(place, name)
            activate(action, "[<'%s'>]" % path)
            end = time.monotonic() + PATIENCE
            while not os.path.exists(path) and time.monotonic() < end:
                time.sleep(0.05)
            expect('%s is written' % name, os.path.getsize(path) > 5000)
        text = run('pdftotext', '-layout', os.path.join(place, 'list.pdf'), '-').replace('\u00a0', ' ')
        expect('the list to print', '2.10 mL' in text and 'Cautions' in text and 'qualified person' in text)
        text = run('pdftotext', '-layout', os.path.join(place, 'report.pdf'), '-')
        expect('the report', 'pKa 14.2 in DMSO, measured' in text and 'page 2 of 2' in text)
    for look in ('dark', 'projector', 'light'):
        activate('look', "[<'%s'>]" % look)
        Picture(folder, 'weigh-' + look)
    key('ctrl+r')
    wait('Ctrl+R goes back to the forms', lambda s: s['detail'] == 'forms')


def check_history():
    last = 'O=C(c1ccccc1)c1ccccc1'
    activate('undo')
    wait('undo goes back before the typing', lambda s: s['substrates'][1]['text'] != last)
    activate('redo')
    wait('redo brings it back', lambda s: s['substrates'][1]['text'] == last)


def check_solvent():
    def settled(solvent):
        return lambda s: s['solvent'] == solvent and all(x['current'] for x in s['substrates'])
    key('ctrl+2')
    now = wait('water', settled('water'))
    expect('ethyl acetoacetate in water 10.68', top_site(now, 0)['pka'] == 10.68)
    key('ctrl+3')
    now = wait('THF', settled('thf'))
    expect('nothing is called measured in THF', top_site(now, 0)['basis'] == 'estimated')
    key('ctrl+1')
    wait('DMSO again', settled('dmso'))


def check_keys_select():
    key('alt+Left')
    now = wait('Alt+Left selects the substrate before', lambda s: s['substrate'] == 0)
    key('alt+Down')
    wait('Alt+Down selects the next site', lambda s: s['site'] != now['site'])


def check_looks(folder):
    call(WINDOW, 'SetState', 'look', "<'dark'>", '{}')
    dark = Picture(folder, 'dark', lambda p: p.brightness() < 0.45 and p.colours() > 200)
    expect('the dark window is dark and not empty', dark.good)
    key('F5')
    bright = Picture(folder, 'projector', lambda p: p.brightness() > 0.7)
    expect('the projector look is bright', bright.good)
    key('F5')


def check_files(folder):
    with tempfile.TemporaryDirectory() as place:
        path = os.path.join(place, 'kept.enolith')
        activate('save-path', "[<'%s'>]" % path)
        before = wait('saved', lambda s: not s['unsaved'])
        broken = os.path.join(place, 'broken.enolith')
        pathlib.Path(broken).write_text(pathlib.Path(path).read_text()[:200])
        activate('open-path', "[<'%s'>]" % broken)
        after = wait('a damaged set changes nothing', lambda s: s['size'] == before['size'])
        expect('the substrates are still there', after['substrates'] == before['substrates'])
        Picture(folder, 'damaged-set')
        activate('open-path', "[<'%s'>]" % path)
        after = wait('the saved set opens', lambda s: all(x['current'] for x in s['substrates']))
        expect('it holds the same', [x['text'] for x in after['substrates']] ==
               [x['text'] for x in before['substrates']])


def drive(folder):
    run('gdbus', 'wait', '--session', '--timeout', '30', APP)
    window_id()
    time.sleep(0.4)
    check_first_start(folder)
    check_why(folder)
    check_weigh(folder)
    check_lab(folder)
    check_typing(folder)
    check_history()
    check_solvent()
    check_keys_select()
    check_looks(folder)
    check_files(folder)


def main():
    program, folder = sys.argv[1], sys.argv[2]
    os.makedirs(folder, exist_ok=True)
    with tempfile.TemporaryDirectory() as home, tempfile.TemporaryFile('w+') as complaints:
        environment = dict(os.environ, HOME=home, XDG_CONFIG_HOME=home, XDG_DATA_HOME=home)
        process = subprocess.Popen([program], stderr=complaints, env=environment)
        try:
            drive(folder)
            call('/org/enolith/Enolith', 'Activate', 'quit', '[]', '{}')
            code = process.wait(PATIENCE)
        finally:
            process.kill()
        complaints.seek(0)
        text = complaints.read()
    if text:
        sys.exit('the program complained:\n' + text)
    if code != 0:
        sys.exit('exit code %d' % code)
    print('ok: it ends cleanly')


if __name__ == '__main__':
    main()
