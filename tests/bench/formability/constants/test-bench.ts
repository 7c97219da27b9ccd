import path from 'node:path';
import { startTests, type File, type Task, type VitestRunner } from '@vitest/runner';
import { createServer, createServerModuleRunner } from 'vite';
import type { EvaluatedModuleNode } from 'vite/module-runner';

const CONFIG: VitestRunner['config'] = {
  root: '',
  setupFiles: [],
  name: 'constants',
  passWithNoTests: false,
  testNamePattern: undefined,
  allowOnly: false,
  sequence: { seed: 1, hooks: 'stack', setupFiles: 'list' },
  chaiConfig: undefined,
  maxConcurrency: 1,
  testTimeout: 120_000,
  hookTimeout: 120_000,
  retry: 0,
  includeTaskLocation: false,
  tags: [],
  tagsFilter: undefined,
  strictTags: false,
};

/**
 * Runs test files of a project in this one warm process, again and again: a module is evaluated anew only where it
 * or something that it imports has changed.
 */
export async function openTestBench(root: string) {
  const server = await createServer({
    root,
    configFile: false,
    logLevel: 'error',
    appType: 'custom',
    resolve: { alias: { '@': root } },
    server: { middlewareMode: true, watch: null, hmr: false, ws: false },
    optimizeDeps: { noDiscovery: true },
  });
  const environment = server.environments.ssr;
  const modules = createServerModuleRunner(environment, { hmr: false });
  const nodesOf = (file: string) => [...(modules.evaluatedModules.getModulesByFile(file) ?? [])];

  /** Every module that imports a file, near or far, with the number of steps to it. */
  function importersOf(file: string): Map<EvaluatedModuleNode, number> {
    const far = new Map(nodesOf(file).map((node) => [node, 0]));
    for (const [node, steps] of far) {
      for (const id of node.importers) {
        const importer = modules.evaluatedModules.getModuleById(id);
        if (importer && !far.has(importer)) far.set(importer, steps + 1);
      }
    }
    return far;
  }

  return {
    /** Test files that import a file, with how far away it is from each. */
    testsOf(file: string): Map<string, number> {
      const tests = new Map<string, number>();
      for (const [node, steps] of importersOf(file))
        if (node.file.endsWith('.test.ts')) tests.set(node.file, steps);
      return tests;
    },
    /** Forgets what was evaluated of a file that has changed on disk, and all that rests on it. */
    changed(file: string): void {
      for (const node of importersOf(file).keys()) forget(node);
      environment.moduleGraph.onFileChange(file);
    },
    /** Runs one test file up to its first failure, which is returned; null: all passed. */
    async run(test: string): Promise<string | null> {
      for (const node of nodesOf(test)) forget(node);
      let failed: string | null = null;
      const skip = (task: Task) => {
        if (failed !== null) task.mode = 'skip';
      };
      const [file] = await startTests([test], {
        config: { ...CONFIG, root },
        importFile: (spec) => modules.import(spec),
        onBeforeRunSuite: skip,
        onBeforeRunTask: skip,
        onAfterRunTask: (task) => {
          if (task.result?.state === 'fail') failed ??= saysOf(task);
        },
      });
      return failed ?? failureIn(file);
    },
    async close(): Promise<void> {
      await modules.close();
      await server.close();
    },
  };

  function forget(node: EvaluatedModuleNode): void {
    const { importers } = node;
    modules.evaluatedModules.invalidateModule(node);
    // The graph of imports stays: it says which tests a file has.
    for (const importer of importers) node.importers.add(importer);
  }
}

function failureIn(task: File | Task): string | null {
  if (task.result?.state !== 'fail') return null;
  const inside = 'tasks' in task ? task.tasks.map(failureIn).find((one) => one !== null) : null;
  return inside ?? saysOf(task);
}

function saysOf(task: File | Task): string {
  const message = task.result?.errors?.[0]?.message ?? 'failed';
  return `${path.basename(task.name)}: ${message.split('\n')[0]}`.slice(0, 160);
}
