import { expect, test } from 'vitest';
import { canonicalJson } from './canonical.ts';

test('the sample of RFC 8785, sections 3.2.2 to 3.2.4', () => {
  const sample = JSON.parse(String.raw`{
    "numbers": [333333333.33333329, 1E30, 4.50, 2e-3, 0.000000000000000000000000001],
    "string": "\u20ac$\u000F\u000aA'\u0042\u0022\u005c\\\"\/",
    "literals": [null, true, false]
  }`);
  const text = canonicalJson(sample);
  expect(text).toBe(
    String.raw`{"literals":[null,true,false],"numbers":[333333333.3333333,1e+30,4.5,0.002,1e-27],"string":"€$\u000f\nA'B\"\\\\\"/"}`,
  );
  const bytes = [...new TextEncoder().encode(text)].map((byte) => byte.toString(16).padStart(2, '0')).join('');
  expect(bytes).toBe(
    '7b226c69746572616c73223a5b6e756c6c2c747275652c66616c73655d2c226e756d62657273223a5b3333333333333333332e333333333333332c31652b33302c342e352c302e3030322c31652d32375d2c22737472696e67223a22e282ac245c75303030665c6e4127425c225c5c5c5c5c222f227d',
  );
});

// Source: RFC 8785, section 3.2.3: names are sorted by UTF-16 code units.
test('the sort order of RFC 8785', () => {
  const names = ['\u20ac', '\r', '\ufb33', '1', '\ud83d\ude00', '\u0080', '\u00f6'];
  const sorted = Object.keys(JSON.parse(canonicalJson(Object.fromEntries(names.map((name) => [name, 0])))));
  expect(sorted).toEqual(['1', '\r', '\u0080', '\u00f6', '\u20ac', '\ud83d\ude00', '\ufb33']); // JS lists "1" first
  expect(canonicalJson(Object.fromEntries(names.map((name) => [name, 0])))).toMatch(/^\{"\\r":0,"1":0/);
});

// Source: RFC 8785, appendix B: bits of the double and its text.
test.each([
  ['0000000000000000', '0'],
  ['8000000000000000', '0'],
  ['0000000000000001', '5e-324'],
  ['7fefffffffffffff', '1.7976931348623157e+308'],
  ['4340000000000000', '9007199254740992'],
  ['44b52d02c7e14af6', '1e+23'],
  ['444b1ae4d6e2ef50', '1e+21'],
  ['3eb0c6f7a0b5ed8d', '0.000001'],
  ['41b3de4355555553', '333333333.3333332'],
])('the number %s is written %s', (bits, text) => {
  const view = new DataView(new ArrayBuffer(8));
  view.setBigUint64(0, BigInt(`0x${bits}`));
  expect(canonicalJson(view.getFloat64(0))).toBe(text);
});

test.each([[Number.NaN], [Number.POSITIVE_INFINITY], ['\ud800'], [undefined]])('%j is refused', (value) => {
  expect(() => canonicalJson(value)).toThrow();
  if (value !== undefined) expect(() => canonicalJson({ deep: [value] })).toThrow();
});
