/** Vectors of RFC 8785 (JSON Canonicalization Scheme): sections 3.2.2 and 3.2.3, appendix B; from memory. */
import { canonicalJson } from '@/server/chain/canonical-json';

function doubleOf(bits: string): number {
  const view = new DataView(new ArrayBuffer(8));
  view.setBigUint64(0, BigInt(`0x${bits}`));
  return view.getFloat64(0);
}

test('literals, numbers and escapes are spelled as in section 3.2.2', () => {
  const input = String.raw`{
    "numbers": [333333333.33333329, 1E30, 4.50, 2e-3, 0.000000000000000000000000001],
    "string": "\u20ac$\u000F\u000aA'\u0042\u0022\u005c\\\"\/",
    "literals": [null, true, false]
  }`;
  expect(canonicalJson(JSON.parse(input))).toBe(
    String.raw`{"literals":[null,true,false],"numbers":[333333333.3333333,1e+30,4.5,0.002,1e-27],"string":"€$\u000f\nA'B\"\\\\\"/"}`,
  );
});

test('fields stand in the order of their UTF-16 units, as in section 3.2.3', () => {
  const input = {
    '\u20ac': 'Euro Sign',
    '\r': 'Carriage Return',
    '\ufb33': 'Hebrew Letter Dalet With Dagesh',
    '1': 'One',
    '\ud83d\ude00': 'Emoji: Grinning Face',
    '\u0080': 'Control',
    '\u00f6': 'Latin Small Letter O With Diaeresis',
  };
  const names = Object.values(JSON.parse(canonicalJson(input)) as Record<string, string>);
  const text = canonicalJson(input);
  const places = [
    'Carriage Return',
    'One',
    'Control',
    'Latin Small Letter O With Diaeresis',
    'Euro Sign',
    'Emoji: Grinning Face',
    'Hebrew Letter Dalet With Dagesh',
  ].map((name) => text.indexOf(name));
  expect(places).toEqual([...places].sort((a, b) => a - b));
  expect(names).toHaveLength(7);
});

test.each([
  ['0000000000000000', '0'],
  ['8000000000000000', '0'],
  ['0000000000000001', '5e-324'],
  ['8000000000000001', '-5e-324'],
  ['7fefffffffffffff', '1.7976931348623157e+308'],
  ['ffefffffffffffff', '-1.7976931348623157e+308'],
  ['4340000000000000', '9007199254740992'],
  ['c340000000000000', '-9007199254740992'],
  ['4430000000000000', '295147905179352830000'],
  ['44b52d02c7e14af5', '9.999999999999997e+22'],
  ['44b52d02c7e14af6', '1e+23'],
  ['44b52d02c7e14af7', '1.0000000000000001e+23'],
  ['444b1ae4d6e2ef4e', '999999999999999700000'],
  ['444b1ae4d6e2ef4f', '999999999999999900000'],
  ['444b1ae4d6e2ef50', '1e+21'],
  ['3eb0c6f7a0b5ed8c', '9.999999999999997e-7'],
  ['3eb0c6f7a0b5ed8d', '0.000001'],
  ['41b3de4355555553', '333333333.3333332'],
  ['41b3de4355555554', '333333333.33333325'],
  ['41b3de4355555555', '333333333.3333333'],
  ['41b3de4355555556', '333333333.3333334'],
  ['41b3de4355555557', '333333333.33333343'],
  ['becbf647612f3696', '-0.0000033333333333333333'],
  ['43143ff3c1cb0959', '1424953923781206.2'],
])('the double %s is written %s (appendix B)', (bits, text) => {
  expect(canonicalJson(doubleOf(bits))).toBe(text);
});

test.each([
  ['not a number', doubleOf('7fffffffffffffff')],
  ['infinity', doubleOf('7ff0000000000000')],
  ['half a surrogate pair', { name: 'a\ud800' }],
  ['half a surrogate pair in a name', { '\udead': 1 }],
  ['nothing', undefined],
])('%s has no canonical form', (_name, value) => {
  expect(() => canonicalJson(value)).toThrow();
});

test('a text that only looks like an escape is a text', () => {
  expect(canonicalJson(String.raw`\ud800`)).toBe(String.raw`"\\ud800"`);
});
