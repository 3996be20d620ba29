#!/usr/bin/env node
// Read by every Node, however old: no static imports and plain syntax, so that an old one can say what is needed.
const version = process.versions.node;
if (Number(version.split('.')[0]) < 20) {
  process.stderr.write(`gapwake needs Node 20 or newer; this is v${version}\n`);
  process.exitCode = 2;
} else {
  import('./main/load.ts')
    .then(({ loadProgram }) => loadProgram())
    .then(
      (program) => program.start(process.argv.slice(2)),
      (error) => {
        process.stderr.write(`gapwake: the program is incomplete (${String(error).split('\n')[0]}); build it again: npm run build\n`);
        process.exitCode = 70;
      },
    );
}
