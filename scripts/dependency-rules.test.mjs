import assert from 'node:assert/strict';
import { copyFileSync, mkdirSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { after, test } from 'node:test';
import { inRoot } from './lib/paths.mjs';
import { run } from './lib/processes.mjs';
import { scratchFolder } from './lib/scratch-folder.mjs';

const folder = scratchFolder('rules');
after(() => rmSync(folder, { recursive: true, force: true }));
symlinkSync(inRoot('node_modules'), join(folder, 'node_modules'));
copyFileSync(inRoot('tsconfig.base.json'), join(folder, 'tsconfig.base.json'));

/** What the checked files import: a plain file in every place. */
const targets = [
  'geometry/src/units/index.ts',
  'geometry/src/estimate/index.ts',
  'geometry/src/plan/index.ts',
  'editor/src/app/paths.ts',
  'editor/src/routes/jobs/page.ts',
  'editor/src/features/jobs/list.ts',
  'editor/src/features/plan-editor/canvas/stage.tsx',
  'editor/src/plan-view/view.ts',
  'editor/src/components/button.ts',
  'editor/src/lib/api.ts',
  'api/src/modules/jobs/jobs.repository.ts',
  'api/src/modules/jobs/jobs.service.ts',
  'api/src/database/schema.ts',
  'api/src/jobs.testkit.ts',
];

/** An import that each rule must refuse: file, what it imports, the rule. @type {[string, string, string][]} */
const forbidden = [
  ['geometry/src/a.ts', '../../editor/src/lib/api.js', 'geometry-stands-alone'],
  ['geometry/src/b.ts', '../../api/src/database/schema.js', 'geometry-stands-alone'],
  ['geometry/src/c.ts', 'react', 'geometry-stands-alone'],
  ['geometry/src/d.ts', 'node:fs', 'geometry-does-no-io'],
  ['editor/src/lib/e.ts', '../../../api/src/database/schema.js', 'editor-not-to-api'],
  ['api/src/f.ts', '../../editor/src/lib/api.js', 'api-not-to-editor'],
  ['editor/src/features/jobs/g.ts', '../../routes/jobs/page.js', 'only-downwards-from-features'],
  ['editor/src/features/jobs/x.ts', '../../app/paths.js', 'only-downwards-from-features'],
  ['editor/src/plan-view/h.ts', '../features/jobs/list.js', 'only-downwards-from-shared'],
  ['editor/src/components/i.ts', '../features/jobs/list.js', 'only-downwards-from-shared'],
  ['editor/src/lib/j.ts', '../components/button.js', 'lib-below-components'],
  ['editor/src/features/people/k.ts', '../jobs/list.js', 'features-apart'],
  ['editor/src/features/plan-editor/tools/l.ts', 'react', 'tools-and-store-without-view'],
  ['editor/src/features/plan-editor/store/m.ts', 'konva', 'tools-and-store-without-view'],
  ['editor/src/features/plan-editor/tools/n.ts', '../canvas/stage.js', 'tools-and-store-without-view'],
  ['api/src/circuit/o.ts', '../../../geometry/src/plan/index.js', 'circuit-plain'],
  ['api/src/circuit/p.ts', '../database/schema.js', 'circuit-plain'],
  ['api/src/modules/jobs/q.service.ts', 'drizzle-orm', 'drizzle-in-repositories'],
  ['api/src/modules/jobs/r.controller.ts', './jobs.repository.js', 'controllers-through-services'],
  ['api/src/modules/jobs/s.service.ts', 'nodemailer', 'vendors-in-ports'],
  ['api/src/modules/jobs/t.service.ts', '@aws-sdk/client-s3', 'vendors-in-ports'],
  ['api/src/jobs/u.ts', 'pg-boss', 'vendors-in-ports'],
  ['api/src/v.ts', './jobs.testkit.js', 'src-not-to-tests'],
  ['api/src/w.ts', './nowhere.js', 'resolvable'],
];

/** What the rules must let pass. @type {[string, string][]} */
const allowed = [
  ['editor/src/routes/jobs/a.ts', '../../features/jobs/list.js'],
  ['editor/src/features/jobs/b.ts', '../../components/button.js'],
  ['editor/src/features/jobs/c.ts', './list.js'],
  ['editor/src/features/plan-editor/tools/d.ts', 'zustand/vanilla'],
  ['editor/src/features/plan-editor/canvas/e.tsx', 'react-konva'],
  ['editor/src/plan-view/f.ts', '../../../geometry/src/plan/index.js'],
  ['api/src/circuit/g.ts', '../../../geometry/src/units/index.js'],
  ['api/src/circuit/h.ts', '../../../geometry/src/estimate/index.js'],
  ['api/src/modules/jobs/i.repository.ts', 'drizzle-orm'],
  ['api/src/modules/jobs/j.controller.ts', './jobs.service.js'],
  ['api/src/ports/mail/k.ts', 'nodemailer'],
  ['api/src/l.spec.ts', './jobs.testkit.js'],
];

/** @param {string} path @param {string} content */
function put(path, content) {
  const file = join(folder, path);
  mkdirSync(dirname(file), { recursive: true });
  writeFileSync(file, content);
}

/** @returns {Promise<string[]>} "file rule" of each violation */
async function violations() {
  const args = ['--config', inRoot('scripts/dependency-rules.cjs'), '--output-type', 'json'];
  const folders = ['geometry/src', 'editor/src', 'api/src'];
  const { stdout, stderr } = await run(inRoot('node_modules/.bin/depcruise'), [...args, ...folders], {
    cwd: folder,
  });
  assert.equal(stderr, '');
  /** @type {{ summary: { violations: { from: string, rule: { name: string } }[] } }} */
  const report = JSON.parse(stdout);
  return report.summary.violations.map(({ from, rule }) => `${from} ${rule.name}`).sort();
}

test('the rules refuse what they forbid, type imports too, and nothing else', async () => {
  for (const path of targets) put(path, 'export type Some = string;\nexport const some = 1;\n');
  for (const [path, name] of allowed)
    put(path, `import type { Some } from '${name}';\nexport type A = Some;\n`);
  assert.deepEqual(await violations(), []);
  for (const [path, name] of forbidden)
    put(path, `import type { Some } from '${name}';\nexport type A = Some;\n`);
  assert.deepEqual(await violations(), forbidden.map(([path, , rule]) => `${path} ${rule}`).sort());
});

test('a cycle is refused', async () => {
  rmSync(join(folder, 'geometry'), { recursive: true });
  rmSync(join(folder, 'editor'), { recursive: true });
  rmSync(join(folder, 'api'), { recursive: true });
  put('geometry/src/one.ts', "import { two } from './two.js';\nexport const one = () => two;\n");
  put('geometry/src/two.ts', "import { one } from './one.js';\nexport const two = () => one;\n");
  put('editor/src/empty.ts', 'export {};\n');
  put('api/src/empty.ts', 'export {};\n');
  assert.deepEqual(await violations(), ['geometry/src/one.ts no-cycles']);
});
