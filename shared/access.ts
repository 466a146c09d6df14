import type { SessionState } from '@/shared/schema/records';
import type { Role } from '@/shared/schema/primitives';

/* Who may do what (design: "Authority"). The server enforces it, the screens hide by it, a test walks it. */

export const acts = {
  read: { roles: ['operator', 'technician', 'supervisor', 'owner'], states: null },
  keyAndPlan: { roles: ['operator'], states: ['open', 'returned'] },
  /** a reading's values put right at the desk, or marked as not to be used */
  correctReading: { roles: ['technician'], states: ['open', 'handedIn', 'returned'] },
  handIn: { roles: ['operator'], states: ['open', 'returned'] },
  planSession: { roles: ['operator', 'supervisor'], states: null },
  enrolDevice: { roles: ['supervisor', 'owner'], states: null },
  revokeDevice: { roles: ['supervisor'], states: null },
  changeBench: { roles: ['technician'], states: null },
  adoptCalibration: { roles: ['technician'], states: null },
  managePeople: { roles: ['owner'], states: null },
} as const satisfies Record<string, { roles: readonly Role[]; states: readonly SessionState[] | null }>;

export type Act = keyof typeof acts;

/** Whether somebody with these roles may do this, in a session of this state (null: not about a session).
 * Roles are a set and do not include one another: an owner who also keys has both.
 */
export function may(roles: readonly Role[], act: Act, state: SessionState | null = null): boolean {
  const rule: { roles: readonly Role[]; states: readonly SessionState[] | null } = acts[act];
  if (!rule.roles.some((role) => roles.includes(role))) return false;
  return rule.states === null || state === null || rule.states.includes(state);
}
