/**
 * Keeps what the engine of JavaScript compiled from the built files beside them, so that the next start need not compile it again: a sixth of
 * the time of a short command. Node 22 does so by itself when asked; for Node 20 the same is done here. Nothing depends on it: what cannot be
 * read or written is compiled as ever.
 */
import { readFileSync, renameSync, statSync, writeFileSync } from 'node:fs';
import Module from 'node:module';
import { dirname } from 'node:path';
import { constants, Script } from 'node:vm';

interface Loader {
  _compile(this: NodeJS.Module, source: string, file: string): unknown;
}

/** Of Node 22 on. */
type Newer = { enableCompileCache?: (folder: string) => unknown };

export function keepCompiled(folder: string): void {
  const { enableCompileCache } = Module as Newer;
  if (enableCompileCache) {
    enableCompileCache(`${folder}/compiled`);
    return;
  }
  const loader = Module.prototype as unknown as Loader;
  const usual = loader._compile;
  const fresh: { script: Script; kept: string }[] = [];
  loader._compile = function (source, file) {
    // The file that runs while this is set up was compiled without it
    if (dirname(file) !== folder) return usual.call(this, source, file);
    const kept = `${file}.compiled`;
    const cachedData = keptOf(file, kept);
    const script = new Script(Module.wrap(source), {
      filename: file,
      ...(cachedData ? { cachedData } : {}),
      importModuleDynamically: constants.USE_MAIN_CONTEXT_DEFAULT_LOADER,
    });
    if (!cachedData || script.cachedDataRejected) fresh.push({ script, kept });
    const load = Object.assign((id: string) => this.require(id), Module.createRequire(file));
    return script.runInThisContext().call(this.exports, this.exports, load, this, file, folder);
  };
  process.once('exit', () => {
    for (const { script, kept } of fresh) keep(script, kept);
  });
}

/** Compiled code of a file that has not changed since. */
function keptOf(file: string, kept: string): Buffer | null {
  try {
    return statSync(kept).mtimeMs > statSync(file).mtimeMs ? readFileSync(kept) : null;
  } catch {
    return null;
  }
}

/** By now what ran is compiled, functions and all. Another process may do the same: the last one stays, whole. */
function keep(script: Script, kept: string): void {
  const part = `${kept}.${process.pid}`;
  try {
    writeFileSync(part, script.createCachedData());
    renameSync(part, kept);
  } catch {
    // A folder that is not ours to write to
  }
}
