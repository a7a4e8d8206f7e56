import { readFileSync, writeFileSync } from 'node:fs';
import asc from 'assemblyscript/asc';

const SOURCE = 'src/numerics/kernels/assembly/kernels.ts';
const TARGET = 'src/numerics/kernels/compiled.ts';

/** Compiles the kernels' source to WebAssembly; the same source and compiler give the same bytes. */
export async function compileKernels() {
  let binary = null;
  const { error, stderr } = await asc.main(
    [
      'kernels.ts',
      '--outFile',
      'kernels.wasm',
      '-O3',
      '--noAssert',
      '--runtime',
      'stub',
      '--enable',
      'simd',
      '--enable',
      'threads',
      '--importMemory',
      '--sharedMemory',
      '--initialMemory',
      '1',
      '--maximumMemory',
      '65536',
    ],
    {
      readFile: (name) => (name === 'kernels.ts' ? readFileSync(SOURCE, 'utf8') : null),
      writeFile: (name, content) => {
        if (name === 'kernels.wasm') binary = content;
      },
      listFiles: () => [],
    },
  );
  if (error || !binary) throw new Error(`The kernels did not compile: ${stderr.toString()}`);
  return Buffer.from(binary).toString('base64');
}

if (process.argv[1]?.endsWith('kernels.mjs')) {
  const text = await compileKernels();
  const lines = text.match(/.{1,110}/g).map((line) => `  '${line}'`);
  writeFileSync(
    TARGET,
    `// Made from assembly/kernels.ts by \`npm run kernels\`; a test compares the two.\nexport const compiledKernels = [\n${lines.join(',\n')},\n].join('');\n`,
  );
  process.stdout.write(`${TARGET}: ${text.length} characters\n`);
}
