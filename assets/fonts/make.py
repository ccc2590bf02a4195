#!/usr/bin/env python3
"""Cuts the two web fonts of the page out of Source Serif 4 and writes manifest.json beside them.

Starts from  npm package source-serif 4.5.1 (fonts version 4.005, SIL Open Font License 1.1)
Needs        Debian's python3-fonttools (4.38.0) and python3-brotli (1.0.9)
Run          npm pack source-serif@4.5.1 && tar xzf source-serif-4.5.1.tgz
             /usr/bin/python3 assets/fonts/make.py package

Glyphs  those in CHARACTERS; the digits are lining and of one width without any feature.
Axes    wght 400 to 650, opsz 8 to 40 (the page sets nothing outside them).
Kerning is taken at wght 450, opsz 20 and does not vary: over these axes it moves by a few thousandths
        of the size, and its variation costs a sixth of the file.
Name    The licence reserves the name Source to the unmodified fonts, so these two are «Fettle Serif».
"""
import hashlib
import io
import json
import pathlib
import sys

from fontTools import subset
from fontTools.ttLib import TTFont
from fontTools.varLib import instancer

HERE = pathlib.Path(__file__).resolve().parent
FAMILY = 'Fettle Serif'
AXES = {'wght': (400, 400, 650), 'opsz': (8, 20, 40)}
KERNING_AT = {'wght': 450, 'opsz': 20}
STYLES = {'roman': ('Roman', 'Regular'), 'italic': ('Italic', 'Italic')}
CHARACTERS = (
    ''.join(map(chr, [*range(0x20, 0x7F), *range(0xA0, 0x100)]))  # Basic Latin, Latin-1
    + '–—‘’“”…•\u2009\u202f'  # dashes, quotes, thin space, narrow no-break space
    + '−≈≤≥∞√½↑↓←→′'
    + 'ΔΩ\u2126θλμπστφ'  # U+2126 is the ohm sign that some keyboards write; it shares the glyph of Ω
    + '₀₁₂₃₄₅₆₇₈₉'
)
# copyright, family, style, unique id, full name, version, PostScript name, trademark, licence and its address
KEPT_NAMES = [0, 1, 2, 3, 4, 5, 6, 7, 13, 14]


def reread(font):
    """A font written and read again, so that no table still refers to glyphs that were cut."""
    buffer = io.BytesIO()
    font.flavor = None
    font.save(buffer)
    buffer.seek(0)
    return TTFont(buffer, recalcTimestamp=False)


def cut(font):
    options = subset.Options()
    options.layout_features = ['kern']
    options.hinting = False
    options.notdef_outline = True
    options.name_IDs = KEPT_NAMES
    options.name_languages = [0x409]
    subsetter = subset.Subsetter(options)
    subsetter.populate(unicodes=map(ord, CHARACTERS))
    subsetter.subset(font)
    return reread(font)


def rename(font, style):
    names = font['name']
    version = names.getDebugName(5).split(';')[0]
    postscript = f'{FAMILY}-{style}'.replace(' ', '')
    for name_id, text in {1: FAMILY, 2: style, 3: f'{version};{postscript}', 4: f'{FAMILY} {style}', 6: postscript}.items():
        names.setName(text, name_id, 3, 1, 0x409)
    for name_id in (16, 17, 25):
        names.removeNames(nameID=name_id)


def make(package, file_style, style):
    path = package / 'WOFF2' / 'VAR' / f'SourceSerif4Variable-{file_style}.ttf.woff2'
    small = cut(TTFont(path, recalcTimestamp=False))
    small['fvar'].instances = []
    fixed = instancer.instantiateVariableFont(reread(small), KERNING_AT)
    font = instancer.instantiateVariableFont(small, AXES)
    font['GPOS'], font['GDEF'] = fixed['GPOS'], fixed['GDEF']
    missing = [c for c in CHARACTERS if ord(c) not in font.getBestCmap()]
    if missing:
        sys.exit(f'{path.name} lacks {missing}; expected every character of CHARACTERS')
    rename(font, style)
    font.flavor = 'woff2'
    buffer = io.BytesIO()
    font.save(buffer)
    return buffer.getvalue()


def main():
    if len(sys.argv) != 2:
        sys.exit('Give the folder of the unpacked source-serif package.')
    package = pathlib.Path(sys.argv[1])
    entries = []
    for name, (file_style, style) in STYLES.items():
        data = make(package, file_style, style)
        file = f'fettle-serif-{name}.woff2'
        (HERE / file).write_bytes(data)
        entries.append({'file': file, 'style': 'italic' if style == 'Italic' else 'normal', 'bytes': len(data),
                        'sha256': hashlib.sha256(data).hexdigest()})
        print(file, len(data))
    manifest = {
        'family': FAMILY,
        'from': 'source-serif 4.5.1 (npm), fonts version 4.005',
        'licence': 'SIL Open Font License 1.1, in OFL.txt',
        'axes': {tag: {'min': lo, 'default': mid, 'max': hi} for tag, (lo, mid, hi) in AXES.items()},
        'characters': CHARACTERS,
        'fonts': entries,
    }
    (HERE / 'manifest.json').write_text(json.dumps(manifest, ensure_ascii=False, indent=2) + '\n')
    (HERE / 'OFL.txt').write_text((package / 'LICENSE.md').read_text())


main()
