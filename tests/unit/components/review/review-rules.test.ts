import { reviewSteps } from '@/components/review/review-rules';
import type { VersionState } from '@/shared/contracts/parameter-sets';
import type { Role } from '@/shared/contracts/roles';

const AUTHOR = 'author';
const steps = (state: VersionState, role: Role, id = 'somebody', more: { vehicleId?: string | null } = {}) =>
  reviewSteps(
    { vehicleId: 'vehicle', ...more },
    { state, createdById: AUTHOR, submittedBy: state === 'draft' ? null : 'Author' },
    { id, role, name: id === AUTHOR ? 'Author' : 'Somebody' },
  );
const offered = (of: ReturnType<typeof steps>) =>
  Object.entries(of)
    .filter(([, value]) => value === true)
    .map(([key]) => key);

test.each<[VersionState, Role, string, string[]]>([
  ['draft', 'engineer', AUTHOR, ['submit', 'editNote', 'discard']],
  ['draft', 'engineer', 'somebody', ['submit']],
  ['draft', 'admin', 'somebody', ['submit', 'discard']],
  ['draft', 'viewer', 'somebody', []],
  ['in-review', 'approver', 'somebody', ['review']],
  ['in-review', 'approver', AUTHOR, []],
  ['in-review', 'engineer', 'somebody', []],
  ['in-review', 'admin', 'somebody', []],
  ['returned', 'engineer', AUTHOR, ['revise']],
  ['released', 'approver', 'somebody', ['revise']],
  ['superseded', 'viewer', 'somebody', []],
])('a version that is %s offers a %s (%s): %j', (state, role, id, expected) => {
  expect(offered(steps(state, role, id))).toEqual(expected);
});

test('a set without a vehicle is not submitted, and it is said why', () => {
  const { submit, waiting } = steps('draft', 'engineer', AUTHOR, { vehicleId: null });
  expect(submit).toBe(false);
  expect(waiting).toMatch(/choose the vehicle/);
});

test('its own author is told that somebody else reviews it', () => {
  expect(steps('in-review', 'approver', AUTHOR).waiting).toMatch(/another approver/);
  expect(steps('in-review', 'approver').waiting).toBeNull();
});
