/** The shipped case whose electrons are particles, run for real: it takes half a minute or more. */
import { existsSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { readCase } from '../../src/casefile/index.ts';
import { simulateNow } from '../../src/simulate.ts';

const file = fileURLToPath(new URL('../../cases/thin-argon-by-particles.yaml', import.meta.url));

describe('cases/thin-argon-by-particles.yaml', () => {
  it('opens with its story, names the JSON Schema and tells the truth', () => {
    const text = readFileSync(file, 'utf8');
    expect(text).toMatch(/^# [A-Z]/);
    expect(existsSync(fileURLToPath(new URL('../../src/casefile/case.schema.json', import.meta.url)))).toBe(true);
    expect(text).toMatch(/^# yaml-language-server: \$schema=\.\.\/src\/casefile\/case\.schema\.json$/m);
    expect(text).toMatch(/^# Verdict: breaks-down, glow; the run ends steady\.$/m);
    const read = readCase(text, 'thin-argon-by-particles.yaml', () => ({ ok: false, reason: 'no tables' }));
    if (!read.ok) throw new Error(JSON.stringify(read.problems));
    const outcome = simulateNow(read.case);
    expect([outcome.verdict.state, outcome.verdict.regime, outcome.final.stop]).toEqual(['breaks-down', 'glow', 'steady']);
    const { kinetics } = outcome;
    if (kinetics === undefined) throw new Error('no kinetics');
    // 1 %: three of its standard errors and the rounding of the comment
    expect(Math.abs((kinetics.breakdown_voltage_V ?? 0) / 160 - 1)).toBeLessThan(0.01);
    expect(Math.abs((kinetics.local_field_breakdown_voltage_V ?? 0) / 129 - 1)).toBeLessThan(0.02);
    expect(Math.abs(kinetics.returned_fraction - 0.25)).toBeLessThan(0.04);
    expect(outcome.numerics.charge_defect).toBeLessThan(1e-12);
    expect(outcome.theory.static_breakdown_voltage_V).toBe(kinetics.breakdown_voltage_V);
  }, 400_000);
});
