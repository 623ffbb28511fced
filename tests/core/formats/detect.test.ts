import { describe, expect, it } from 'vitest';
import { detect } from '../../../core/formats/detect.ts';

describe('the kind of a file, told by its content', () => {
  it.each([
    ['an option line', '! a\n# MHz S RI R 50\n14 0 0\n', 'touchstone-1'],
    ['an option line with blanks before', '  # hz s ma\n', 'touchstone-1'],
    ['an option line with a comment', '# GHz S DB R 50 ! a\n', 'touchstone-1'],
    ['an option line of one word', '# MHz\n14 0 0\n', 'touchstone-1'],
    ['an option line with a wrong unit', '# s S RI R 50\n', 'touchstone-1'],
    ['an option line with labels behind', '# HZ S RI RS11r S11i\n', 'touchstone-1'],
    ['a complex reference', '# kHz S MA R (50+0j)\n', 'touchstone-1'],
    ['a bare option line over rows', '#\n14 0.5 20\n', 'touchstone-1'],
    ['a version', '! a\n\n[Version] 2.0\n# MHz S RI R 50\n', 'touchstone-2'],
    ['a version in small letters', '[version] 2.1\n', 'touchstone-2'],
    ['a brace', ' \n{"a":1}', 'json'],
    ['an array', '[{"a":1}]', 'json'],
    ['commas', 'f,swr\n14,1.5\n', 'delimited'],
    ['semicolons and decimal commas', '14,0;1,5\n', 'delimited'],
    ['an undefined value', '14,---\n', 'delimited'],
    ['quotes', '"f","swr"\n"14","1.5"\n', 'delimited'],
    ['numbers without an option line', '14 0.1 0.2\n', 'delimited'],
    ['a comment with commas', '# Frequency (MHz), SWR\n14,1.5\n', 'delimited'],
    ['a comment of words', '# freq_MHz swr\n14 1.5\n', 'delimited'],
    ['bare comment marks', '#\n# made at noon\n#\n14 1.5 2\n', 'delimited'],
    ['a bare comment mark over pairs', '#\n14,1.5\n', 'delimited'],
    ['a section of settings', '[Settings]\npoints=3\n14,1.5\n', 'delimited'],
  ])('%s', (_, text, kind) => {
    expect(detect(text)).toEqual({ ok: true, value: kind });
  });

  it.each([
    ['a page', '<!doctype html><p>14,1.5</p>', 'unknown_kind'],
    ['a drawing', '\n<svg viewBox="0 0 14 15"/>', 'unknown_kind'],
    ['prose', 'We measured at noon.\nIt rained.\n', 'unknown_kind'],
    ['one number a line', '14\n15\n', 'unknown_kind'],
    ['comments alone', '! nothing\n', 'unknown_kind'],
    ['control characters', '14,1.5\u0007\n', 'unknown_kind'],
    ['blanks alone', ' \n\t\n', 'empty_file'],
  ])('is none for %s', (_, text, code) => {
    expect(detect(text)).toMatchObject({ ok: false, error: { code, line: 1 } });
  });
});
