/** Imports point one way (DEVELOPERS.md, "Shape"): a layer may use what stands below it, never a sibling, never what stands above. */
const layers = [
  ['main'],
  ['commands'],
  ['scan'],
  ['report', 'results', 'casefile'],
  ['search'],
  ['simulate'],
  ['onset'],
  ['march', 'observables', 'theory'],
  ['laws', 'supply', 'kinetics'],
  ['gap'],
  ['gases', 'surfaces', 'surroundings'],
  ['numerics', 'units'],
];
/** types of a case: declared beside `simulate`, used below it as a type only */
const path = (name) => `^src/${name}(/|\\.ts$)`;
const forbidden = [
  {
    name: 'no-circle',
    comment: 'no file imports itself by a detour (types aside)',
    severity: 'error',
    from: {},
    to: { circular: true, viaOnly: { dependencyTypesNot: ['type-only'] } },
  },
  {
    name: 'no-files-below',
    comment: 'nothing below casefile and results touches files, HDF5 or processes',
    severity: 'error',
    from: { path: '^src/', pathNot: '^src/(commands|scan|report|results|main)' },
    to: { path: '^(node:)?(fs|child_process|worker_threads|path)$|^h5wasm|^jsfive' },
  },
  {
    name: 'not-to-unresolvable',
    severity: 'error',
    from: {},
    to: { couldNotResolve: true, pathNot: '^h5wasm/' }, // sub-paths of its export map
  },
];
layers.forEach((names, level) => {
  for (const name of names) {
    const above = layers.slice(0, level).flat();
    const siblings = names.filter((n) => n !== name);
    const barred = [...above, ...siblings];
    // surfaces share the provenance type of gases
    const allowed = name === 'surfaces' ? ['gases'] : [];
    for (const other of barred) {
      if (allowed.includes(other)) continue;
      forbidden.push({
        name: `${name}-not-to-${other}`,
        comment: `${name} must not import ${other}`,
        severity: 'error',
        from: { path: path(name) },
        to: { path: path(other), dependencyTypesNot: ['type-only'] },
      });
    }
  }
});

module.exports = {
  forbidden,
  options: {
    doNotFollow: { path: 'node_modules' },
    tsConfig: { fileName: 'tsconfig.json' },
    tsPreCompilationDeps: true,
    enhancedResolveOptions: { extensions: ['.ts', '.mjs', '.js'] },
  },
};
