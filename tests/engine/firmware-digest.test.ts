import { execFileSync } from 'node:child_process';
import { describe, expect, it } from 'vitest';
import { buildTable } from '../../shared/build-table.ts';
import { engineVersion } from '../../shared/engine-version.ts';
import { canonicalJson, digestOf } from '../../shared/firmware/index.ts';
import golden from './golden/golden.json' with { type: 'json' };

/** A number from its IEEE 754 bits, in hexadecimal. */
const fromBits = (bits: string) => Buffer.from(bits, 'hex').readDoubleBE();

describe('canonical JSON', () => {
  // RFC 8785, Appendix B, all of its finite samples.
  it.each([
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
  ])('prints the double %s as %s', (bits, text) => {
    expect(canonicalJson([fromBits(bits)])).toBe(`[${text}]`);
  });

  // RFC 8785 §3.2.2, §3.2.3.
  it('writes strings and literals, and sorts keys, as the RFC does', () => {
    const input = {
      numbers: [JSON.parse('333333333.33333329'), 1e30, 4.5, 2e-3, 1e-27],
      string: '\u20ac$\u000f\nA\'B"\\\\"/',
      literals: [null, true, false],
    };
    expect(canonicalJson(input)).toBe(
      '{"literals":[null,true,false],"numbers":[333333333.3333333,1e+30,4.5,0.002,1e-27],' +
        '"string":"€$\\u000f\\nA\'B\\"\\\\\\\\\\"/"}',
    );
    const keys = ['\u20ac', '\r', '\ufb33', '1', '\u{1f600}', '\u0080', '\u00f6'];
    const sorted = canonicalJson(Object.fromEntries(keys.map((key) => [key, 0])));
    expect([...sorted.matchAll(/"([^"]+)":/g)].map(([, key]) => key)).toEqual([
      '\\r',
      '1',
      '\u0080',
      '\u00f6',
      '\u20ac',
      '\u{1f600}',
      '\ufb33',
    ]);
  });
});

/** RFC 8785 once more, by Python: only the digits of a number come from elsewhere (shortest, as ECMAScript's). */
const independent = `
import hashlib, json, sys

def number(x):
    if isinstance(x, int) or x == int(x) and abs(x) < 1e21:
        return str(int(x))
    sign, digits, exponent = ('-' if x < 0 else ''), *repr(abs(x)).replace('e', ' ').split(' ') , *([] if 'e' in repr(abs(x)) else ['0'])
    whole, _, fraction = digits.partition('.')
    fraction = fraction if fraction != '0' else ''
    point = len(whole) + int(exponent)
    bare = (whole + fraction)
    lead = len(bare) - len(bare.lstrip('0'))
    bare, point = bare.lstrip('0').rstrip('0'), point - lead
    k = len(bare)
    if k <= point <= 21: return sign + bare + '0' * (point - k)
    if 0 < point <= 21: return sign + bare[:point] + '.' + bare[point:]
    if -6 < point <= 0: return sign + '0.' + '0' * -point + bare
    e = ('+' if point > 0 else '-') + str(abs(point - 1))
    return sign + bare[0] + ('.' + bare[1:] if k > 1 else '') + 'e' + e

def canonical(v):
    if v is None or isinstance(v, (bool, str)): return json.dumps(v, ensure_ascii=False)
    if isinstance(v, (int, float)): return number(v)
    if isinstance(v, list): return '[' + ','.join(map(canonical, v)) + ']'
    keys = sorted(v, key=lambda key: key.encode('utf-16-be'))
    return '{' + ','.join(json.dumps(key, ensure_ascii=False) + ':' + canonical(v[key]) for key in keys) + '}'

print(json.dumps([hashlib.sha256(canonical(v).encode()).hexdigest() for v in json.load(sys.stdin)]))
`;

describe('digest', () => {
  it('is SHA-256 over canonical JSON, by Python’s hashlib and another canonical writer', () => {
    const inputs = golden.tables.map(({ definition: input }) => {
      const { definition, codes } = buildTable(input);
      return { definition, engineVersion, codes };
    });
    const plain = inputs.map((input) => ({ ...input, codes: Array.from(input.codes) }));
    const answer = execFileSync('python3', ['-c', independent], {
      input: JSON.stringify(plain),
      encoding: 'utf8',
    });
    expect(inputs.map(digestOf)).toEqual(JSON.parse(answer));
    expect(inputs.length).toBeGreaterThan(30);
  });

  it('does not depend on the order of fields, and changes with each part', () => {
    const { definition, codes } = buildTable(golden.tables[0].definition);
    const reversed = Object.fromEntries(Object.entries(definition).reverse()) as typeof definition;
    const digest = digestOf({ definition, engineVersion, codes });
    expect(digest).toMatch(/^[0-9a-f]{64}$/);
    expect(digestOf({ definition: reversed, engineVersion, codes })).toBe(digest);
    expect(digestOf({ definition: { ...definition, name: 'other' }, engineVersion, codes })).not.toBe(digest);
    expect(digestOf({ definition, engineVersion: `${engineVersion}-next`, codes })).not.toBe(digest);
    expect(
      digestOf({ definition, engineVersion, codes: codes.map((code, k) => (k === 7 ? code + 1 : code)) }),
    ).not.toBe(digest);
  });

  it('refuses half a surrogate pair, for which the RFC has no form', () => {
    const { definition, codes } = buildTable(golden.tables[0].definition);
    const broken = { ...definition, name: 'half \ud83d' };
    expect(() => digestOf({ definition: broken, engineVersion, codes })).toThrow(
      'name: "half \\ud83d" is not allowed',
    );
  });
});
