import { describe, expect, it } from 'vitest';
import { meets, parseClaim } from '../examples/assertions.mjs';
import { exampleModule } from '../examples/module.mjs';

const moduleOf = (code, scope = new Map()) => exampleModule({ where: 'x.ts:1', code, scope });

describe('parseClaim', () => {
  it('reads literals', () => {
    expect(parseClaim('-1.5e-3')).toEqual({ value: -0.0015 });
    expect(parseClaim("'high'")).toEqual({ value: 'high' });
    expect(parseClaim("{ kind: 'high', at: [1, NaN, null] }")).toEqual({
      value: { kind: 'high', at: [1, Number.NaN, null] },
    });
    expect(parseClaim('Float64Array.of(1, 2)')).toEqual({ value: Float64Array.of(1, 2) });
    expect(parseClaim('{ a: Float64Array(2) [1, -2] }')).toEqual({ value: { a: [1, -2] } });
  });

  it('reads a code that is thrown', () => {
    expect(parseClaim('throws NO_TIME_ZONE')).toEqual({ throws: 'NO_TIME_ZONE' });
  });

  it('reads nothing into prose or calls', () => {
    expect(parseClaim('about three metres')).toBeUndefined();
    expect(parseClaim('Math.cos(1)')).toBeUndefined();
    expect(parseClaim('12.5 m')).toBeUndefined();
  });
});

describe('meets', () => {
  it('compares numbers to the last bit', () => {
    expect(meets(0.1 + 0.2, 0.3)).toBe(false);
    expect(meets(0.1 + 0.2, 0.30000000000000004)).toBe(true);
    expect(meets(Number.NaN, Number.NaN)).toBe(true);
  });

  it('compares deeply, with no key more or less', () => {
    expect(meets({ a: [1, { b: 2 }] }, { a: [1, { b: 2 }] })).toBe(true);
    expect(meets({ a: 1, b: undefined }, { a: 1 })).toBe(false);
    expect(meets({ a: 1 }, { a: 1, b: 2 })).toBe(false);
    expect(meets([1, 2], { 0: 1, 1: 2 })).toBe(false);
  });

  it('lets an array literal stand for a typed array', () => {
    expect(meets(Float64Array.of(1, 2), [1, 2])).toBe(true);
    expect(meets(Float64Array.of(1, 2), Float32Array.of(1, 2))).toBe(false);
  });
});

describe('exampleModule', () => {
  it('imports what the example uses from the scope and tests the claim', () => {
    const scope = new Map([
      ['wrapDegrees', '@staithe/core'],
      ['other', '@staithe/core'],
    ]);
    const { text, claims, findings } = moduleOf('wrapDegrees(-90); // 270', scope);
    expect(findings).toEqual([]);
    expect(claims).toEqual([{ value: 270, text: 'wrapDegrees(-90)', remark: '270' }]);
    expect(text).toContain("import { wrapDegrees } from '@staithe/core';");
    expect(text).toContain('$check((wrapDegrees(-90)), 0);');
  });

  it('leaves the imports of a README block alone and looks through console.log', () => {
    const { text, claims } = moduleOf(
      "import { a } from 'staithe';\nconsole.log(a()); // 1",
      new Map(),
    );
    expect(text).toMatch(/^import \{ a \} from 'staithe';/);
    expect(claims[0].text).toBe('a()');
  });

  it('finds fault with an example that asserts nothing, that claims prose or that does not parse', () => {
    expect(moduleOf('f(1);').findings[0]).toMatch(/asserts no value/);
    expect(moduleOf('f(1); // about 3').findings[0]).toMatch(/expected a literal/);
    expect(moduleOf('f(1;').findings[0]).toMatch(/^x\.ts:1: /);
  });

  it('awaits what throws', () => {
    expect(moduleOf("toInstant('now'); // throws BAD_TIME").text).toContain(
      "await $throws(async () => { toInstant('now'); }, 0);",
    );
  });
});
