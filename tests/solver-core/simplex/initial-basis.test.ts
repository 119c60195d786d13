import { VariableStatus } from '../../../solver-core/linear-program/basis';
import { computationalForm } from '../../../solver-core/simplex/computational-form';
import { loadLogicalBasis, loadSnapshot } from '../../../solver-core/simplex/initial-basis';
import { nonbasicFixed, WorkingBasis } from '../../../solver-core/simplex/working-basis';
import { lp } from '../../support/lp-notation';

const form = computationalForm(
  lp(`
  minimise plates + bowls + cups + stock
  press: plates + bowls <= 40
  kiln: cups + stock >= 2
  -9 <= bowls <= 1
  3 <= cups <= 3
  stock free
`),
);
const { basic, atLower, atUpper, free } = VariableStatus;

test('the logical basis rests each column at the bound nearer to 0', () => {
  const basis = new WorkingBasis(form.rowCount, form.columnCount);
  loadLogicalBasis(form, basis);
  expect([...basis.basicVariable]).toEqual([4, 5]);
  expect([...basis.status]).toEqual([atLower, atUpper, nonbasicFixed, free, basic, basic]);
  expect([...basis.snapshot().columnStatus]).toEqual([atLower, atUpper, atLower, free]);
});

test('a snapshot with too many basic variables gives some up, one with too few is filled with logicals', () => {
  const basis = new WorkingBasis(form.rowCount, form.columnCount);
  loadSnapshot(
    form,
    { columnStatus: Uint8Array.of(basic, basic, basic, basic), rowStatus: Uint8Array.of(basic, basic) },
    basis,
  );
  expect(basis.basicVariable).toHaveLength(2);
  expect([...basis.status].filter((status) => status === basic)).toHaveLength(2);

  loadSnapshot(form, { columnStatus: new Uint8Array(4), rowStatus: new Uint8Array(2) }, basis);
  expect([...basis.basicVariable].sort()).toEqual([4, 5]);
});

test('rows and columns added since the snapshot get basic logicals and resting columns', () => {
  const basis = new WorkingBasis(form.rowCount, form.columnCount);
  loadSnapshot(
    form,
    { columnStatus: Uint8Array.of(basic, atLower), rowStatus: Uint8Array.of(atUpper) },
    basis,
  );
  expect([...basis.status]).toEqual([basic, atLower, nonbasicFixed, free, atUpper, basic]);
});
