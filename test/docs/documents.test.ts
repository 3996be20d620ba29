import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { VERSION } from '../../src/version.ts';
import { realProgram } from '../commands/program.ts';

const root = join(import.meta.dirname, '../..');
const read = (name: string): string => readFileSync(join(root, name), 'utf8');
const packageJson = JSON.parse(read('package.json')) as { version: string; scripts: Record<string, string> };
const readme = read('README.md');
const developers = read('DEVELOPERS.md');

describe('the documents', () => {
  const program = realProgram();

  it('give the version of the package', () => {
    expect(VERSION).toBe(packageJson.version);
  });

  it('name only scripts that exist', () => {
    const named = [...(readme + developers).matchAll(/npm run ([\w:-]+)/g)].map((m) => m[1]);
    expect(named.length).toBeGreaterThan(5);
    for (const script of named) expect(Object.keys(packageJson.scripts)).toContain(script);
  });

  it('link only to files that exist', () => {
    const links = [...(readme + developers).matchAll(/\]\((?!https?:)([^)#]+)\)/g)].map((m) => m[1]);
    expect(links.length).toBeGreaterThan(1);
    for (const link of links) expect(existsSync(join(root, link)), link).toBe(true);
  });

  it('list every shipped case, and no other', () => {
    const shipped = readdirSync(join(root, 'cases')).filter((f) => f.endsWith('.yaml'));
    const listed = [...readme.matchAll(/^\| `([\w-]+\.yaml)`/gm)].map((m) => m[1]);
    expect(listed.sort()).toEqual(shipped.sort());
  });

  it('open with the job, and the cautions of high voltage come before the first command', () => {
    const paragraphs = readme.split('\n\n');
    expect(paragraphs[1]).toMatch(/^gapwake is a command-line program/);
    expect(readme.indexOf('High voltage and stored charge')).toBeLessThan(readme.indexOf('npm ci'));
    expect(readme).not.toContain('@@');
  });

  it('show a case that is read as it stands', () => {
    const example = /```yaml\n([\s\S]*?)```/.exec(readme)?.[1] ?? '';
    const shipped = read('cases/feedthrough-step-to-glow.yaml');
    expect(shipped.endsWith(example)).toBe(true);
  });

  it('show the output of a run as the program prints it, but for timings', async () => {
    const shown = /\$ npx --no gapwake run (\S+\.yaml) -o glow\.h5\n([\s\S]*?)```/.exec(readme);
    expect(shown).not.toBeNull();
    const [, file, text] = shown as RegExpExecArray;
    const result = await program.run(['run', join(root, file)]);
    // what differs from run to run, and the line that says where the result went
    const steady = (s: string): string[] =>
      s
        .replace(/computed in .*$/gm, 'computed')
        .replace(/^(Written|Nothing was written).*$/gm, '')
        .split('\n')
        .map((line) => line.trimEnd())
        .filter((line) => line !== '');
    expect(steady(result.out)).toEqual(steady(text));
  });
});
