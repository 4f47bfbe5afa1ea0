import { cpSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { dirname, join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { importDirections } from '../../../scripts/directions.mjs';

type ImportReport = ReturnType<typeof importDirections>;

/** A small tree with the product's folders, in the checkout so that its packages are found. */
function plantedTree(files: Readonly<Record<string, string>>): string {
  mkdirSync('.cache', { recursive: true });
  const root = mkdtempSync(join('.cache', 'directions-'));
  for (const name of ['package.json', 'tsconfig.json']) cpSync(name, join(root, name));
  for (const [path, content] of Object.entries(files)) {
    mkdirSync(dirname(join(root, path)), { recursive: true });
    writeFileSync(join(root, path), content);
  }
  return root;
}

const sound = {
  'shared/units.ts': `import { z } from 'zod';\nexport const units = [z];\n`,
  'calculators/kit/kit.ts': `import { units } from '../../shared/units.js';\nexport const kit = units;\n`,
  'calculators/driver/index.ts': `import { kit } from '../kit/kit.js';\nimport { curve } from './curve.js';\nexport const driver = [kit, curve];\n`,
  'calculators/driver/curve.ts': `import { Matrix } from 'ml-matrix';\nexport const curve = Matrix;\n`,
  'calculators/box/index.ts': `export const box = 1;\n`,
  'calculators/index.ts': `import { box } from './box/index.js';\nimport { driver } from './driver/index.js';\nexport const all = [driver, box];\n`,
  'calculators/cli.ts': `import { readFileSync } from 'node:fs';\nimport { all } from './index.js';\nexport const cli = [readFileSync, all];\n`,
  'server/database/entities/sweep.entity.ts': `import { Entity } from 'typeorm';\nexport const sweep = Entity;\n`,
  'server/sweeps/service.ts': `import { sweep } from '../database/entities/sweep.entity.js';\nexport const service = sweep;\n`,
  'server/sweeps/routes.ts': `import { Router } from 'express';\nimport { service } from './service.js';\nexport const routes = [Router, service];\n`,
  'server/main.ts': `import { all } from '../calculators/index.js';\nimport { routes } from './sweeps/routes.js';\nexport const main = [all, routes];\n`,
  'src/lib/words.ts': `export const words = 1;\n`,
  'src/components/button.tsx': `import { useRef } from 'react';\nimport { words } from '../lib/words.js';\nexport const button = [useRef, words];\n`,
  'src/features/sweeps/list.tsx': `import { button } from '../../components/button.js';\nimport { all } from '../../../calculators/index.js';\nexport const list = [button, all];\n`,
  'src/features/lots/lot.tsx': `export const lot = 1;\n`,
  'src/pages/home.tsx': `import { list } from '../features/sweeps/list.js';\nimport { lot } from '../features/lots/lot.js';\nexport const home = [list, lot];\n`,
  'tests/unit/home.test.ts': `import { home } from '../../src/pages/home.js';\nimport { main } from '../../server/main.js';\nexport const test = [home, main];\n`,
  'scripts/run.mjs': `import { join } from 'node:path';\nexport const run = join;\n`,
};

/** One wrong import of each kind: the rule that has to name it, the file it stands in, what it imports. */
const planted: readonly (readonly [rule: string, file: string, imported: string])[] = [
  ['shared-stands-alone', 'shared/wrong-calculator.ts', '../calculators/index.js'],
  ['shared-stands-alone', 'shared/wrong-server.ts', '../server/main.js'],
  ['shared-stands-alone', 'shared/wrong-screen.ts', '../src/lib/words.js'],
  ['shared-packages', 'shared/wrong-package.ts', 'react'],
  ['shared-packages', 'shared/wrong-node.ts', 'node:fs'],
  ['calculators-know-no-side', 'calculators/kit/wrong-server.ts', '../../server/main.js'],
  ['calculators-know-no-side', 'calculators/box/wrong-screen.ts', '../../src/lib/words.js'],
  ['calculators-stay-pure', 'calculators/box/wrong-react.ts', 'react'],
  ['calculators-stay-pure', 'calculators/numerics/wrong-node.ts', 'node:fs'],
  ['command-line-without-screens', 'calculators/cli/wrong-server.ts', 'express'],
  ['calculator-imports-calculator', 'calculators/box/wrong-calculator.ts', '../driver/curve.js'],
  ['calculator-imports-calculator', 'calculators/box/wrong-registry.ts', '../index.js'],
  ['foundations-below-calculators', 'calculators/acoustics/wrong-calculator.ts', '../driver/curve.js'],
  ['server-imports-src', 'server/wrong-screen.ts', '../src/lib/words.js'],
  ['server-without-screens', 'server/wrong-react.ts', 'react'],
  ['src-imports-server', 'src/features/sweeps/wrong-server.ts', '../../../server/sweeps/service.js'],
  ['src-without-node', 'src/lib/wrong-node.ts', 'node:path'],
  ['src-without-server-packages', 'src/lib/wrong-package.ts', 'pg'],
  ['feature-imports-feature', 'src/features/sweeps/wrong-feature.ts', '../lots/lot.js'],
  ['feature-imports-page', 'src/features/sweeps/wrong-page.ts', '../../pages/home.js'],
  ['component-imports-upwards', 'src/components/wrong-feature.ts', '../features/lots/lot.js'],
  ['component-imports-upwards', 'src/workers/wrong-page.ts', '../pages/home.js'],
  ['router-sees-database', 'server/lots/routes.ts', '../database/entities/sweep.entity.js'],
  ['router-sees-database', 'server/lots/lot-routes.ts', 'typeorm'],
  ['service-sees-express', 'server/lots/service.ts', 'express'],
  ['product-imports-tests', 'src/lib/wrong-test.ts', '../../tests/unit/home.test.js'],
  ['product-imports-scripts', 'server/wrong-script.ts', '../scripts/run.mjs'],
  ['scripts-on-plain-node', 'scripts/wrong-package.mjs', 'zod'],
  ['scripts-on-plain-node', 'scripts/wrong-product.mjs', '../shared/units.js'],
  ['product-imports-dev-package', 'server/wrong-dev-package.ts', 'fast-check'],
  ['no-circle', 'src/lib/wrong-circle-a.ts', './wrong-circle-b.js'],
  ['no-unresolved', 'server/wrong-path.ts', './nowhere.js'],
];

const asFile = (imported: string) => `import * as wrong from '${imported}';\nexport const used = wrong;\n`;

describe('the direction of imports', () => {
  const roots: string[] = [];
  let soundReport: ImportReport;
  let wrongReport: ImportReport;
  beforeAll(() => {
    const report = (files: Readonly<Record<string, string>>) =>
      importDirections(roots[roots.push(plantedTree(files)) - 1]!);
    soundReport = report(sound);
    wrongReport = report({
      ...sound,
      ...Object.fromEntries(planted.map(([, file, imported]) => [file, asFile(imported)])),
      'src/lib/wrong-circle-b.ts': asFile('./wrong-circle-a.js'),
      'src/features/sweeps/wrong-type.ts': `import type { lot } from '../lots/lot.js';\nexport type Lot = typeof lot;\n`,
    });
  }, 60_000);
  afterAll(() => {
    for (const root of roots) rmSync(root, { recursive: true });
  });

  it('accepts a tree in which every import points the right way', () => {
    expect(soundReport.wrong).toEqual([]);
    expect(soundReport.unseen).toEqual([]);
    expect(soundReport.modules).toBeGreaterThanOrEqual(Object.keys(sound).length);
  });

  it.each(planted)('catches by %s the import in %s of %s', (rule, file) => {
    expect(wrongReport.wrong.map((wrong) => `${wrong.rule} in ${wrong.from}`)).toContain(`${rule} in ${file}`);
  });

  it('catches an import of types as well', () => {
    expect(wrongReport.wrong.map((wrong) => wrong.from)).toContain('src/features/sweeps/wrong-type.ts');
  });

  it('has a planted import for every rule of the configuration', () => {
    const configuration: { forbidden: { name: string }[] } = createRequire(import.meta.url)(
      '../../../.dependency-cruiser.cjs',
    );
    const names = configuration.forbidden.map((rule) => rule.name);
    expect(names.sort()).toEqual([...new Set(planted.map(([rule]) => rule))].sort());
  });

  it('blames no file that imports rightly', () => {
    const blamed = new Set(wrongReport.wrong.map(({ from }) => from));
    expect(Object.keys(sound).filter((file) => blamed.has(file))).toEqual([]);
  });
});
