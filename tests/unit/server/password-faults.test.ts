import { describe, expect, it } from 'vitest';
import { passwordFaults } from '@/lib/auth/password-faults';

const context = ['Mara Quill', 'mara.quill@withy.test', 'Withy Lane Lab', 'outfold'];
const codes = (password: string) => passwordFaults(password, context).map(({ code }) => code);

// NIST SP 800-63B-4, section 3.1.1.2: 15 characters for a single factor, 64 allowed, blocklist, no composition rules.
describe('passwordFaults', () => {
  it('counts code points, and asks for nothing else of them', () => {
    expect(codes('lantern on the hill')).toEqual([]);
    expect(codes('fourteen chars')).toEqual(['too-short']);
    expect(codes('🐭🦉🐸🦔🐝🐞🦋🐌🐜🦗🕷🦂🐢🐍')).toEqual(['too-short']);
    expect(codes('🐭🦉🐸🦔🐝🐞🦋🐌🐜🦗🕷🦂🐢🐍🦎')).toEqual([]);
    expect(codes('Übermäßig langer Satz')).toEqual([]);
    expect(codes(`a ${'very '.repeat(12)}long one`)).toEqual([]);
    expect(codes('x7'.repeat(129))).toEqual(['too-long']);
  });

  it.each([
    'passwordpassword',
    'aaaaaaaaaaaaaaaaaaa',
    'abcabcabcabcabcabc',
    '123456789012345',
    'qwertyuiopasdfgh',
    'zyxwvutsrqponmlk',
    'iloveyou1234567890!!!',
  ])('refuses %s as common', (password) => expect(codes(password)).toEqual(['common']));

  it.each(['mara.quill@withy.test', 'WithyLaneLab2026!', 'outfold-outfold-1', 'Quill Mara 123 !'])(
    'refuses %s as about the member or the lab',
    (password) => expect(codes(password)).toEqual(['about-you']),
  );

  it('allows a name inside something that stands by itself', () => {
    expect(codes('mara paints grey herons')).toEqual([]);
  });
});
