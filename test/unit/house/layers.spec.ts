import { spawnSync } from 'node:child_process';
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join, resolve } from 'node:path';

const root = resolve(__dirname, '../../..');

interface Violation {
  readonly rule: { readonly name: string };
  readonly from: string;
}

/** Runs the project's own layer rules over planted files; each violation as "rule: file". */
function violations(files: Record<string, string>): string[] {
  const folder = mkdtempSync(join(tmpdir(), 'tenthmark-layers-'));
  try {
    for (const [path, text] of Object.entries({ 'tsconfig.json': '{}', ...files })) {
      mkdirSync(join(folder, dirname(path)), { recursive: true });
      writeFileSync(join(folder, path), text);
    }
    const tops = [...new Set(Object.keys(files).map((path) => path.split('/')[0] ?? ''))];
    const cruise = join(root, 'node_modules/dependency-cruiser/bin/dependency-cruise.mjs');
    const options = ['--config', join(root, '.dependency-cruiser.cjs'), '--output-type', 'json'];
    const result = spawnSync(process.execPath, [cruise, ...options, ...tops], {
      cwd: folder,
      encoding: 'utf8',
    });
    const report = JSON.parse(result.stdout) as { summary: { violations: Violation[] } };
    return report.summary.violations.map((found) => `${found.rule.name}: ${found.from}`).sort();
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

describe('the layer rule', () => {
  it('reports an import against the layers, and each kind of one', () => {
    const found = violations({
      'server/a.ts': "import { page } from '../src/page';\nexport const a = page;\n",
      'src/page.ts': "import { b } from '../server/b';\nexport const page = b;\n",
      'server/b.ts': 'export const b = 1;\n',
      'shared/type-only.ts': "import type { Row } from '../server/row';\nexport type Copy = Row;\n",
      'server/row.ts': 'export interface Row { id: string }\n',
      'shared/impure.ts': "import { readFileSync } from 'node:fs';\nexport const read = readFileSync;\n",
      'shared/one.ts': "import { two } from './two';\nexport const one = () => two;\n",
      'shared/two.ts': "import { one } from './one';\nexport const two = () => one;\n",
    });
    expect(found).toEqual([
      'no-circular: shared/one.ts',
      'server-never-imports-src: server/a.ts',
      'shared-imports-no-side: shared/type-only.ts',
      'shared-is-pure: shared/impure.ts',
      'src-never-imports-server: src/page.ts',
    ]);
  });

  it('lets both sides import shared code', () => {
    const found = violations({
      'shared/gap.ts': 'export const gap = (a: number, b: number): number => a - b;\n',
      'server/use.ts': "import { gap } from '../shared/gap';\nexport const g = gap(1, 2);\n",
      'src/use.ts': "import { gap } from '../shared/gap';\nexport const g = gap(1, 2);\n",
    });
    expect(found).toEqual([]);
  });
});
