import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { affineConditions, affineFunctions } from '../../../../addin/domain/linearization/affine-functions';

it('AD-53 the rules list every function that keeps affine forms affine, with its condition', () => {
  const conditions = new Map([
    ...Object.entries(affineFunctions).map(([name, { condition }]) => [name, condition] as const),
    ...Object.entries(affineConditions),
  ]);
  const rules = readFileSync(join(__dirname, '../../../../addin/SPEC.md'), 'utf8');
  const [, table] = rules.split('| functions | affine when |');
  const listed = [...table.split('\n## ')[0].matchAll(/^\| (`.*?) \| (.*) \|$/gm)].flatMap(
    ([, names, condition]) => [...names.matchAll(/`([^`]+)`/g)].map(([, name]) => [name, condition] as const),
  );
  expect(new Map(listed)).toEqual(conditions);
});
