import { may, type Role } from '../../shared/roles.js';

export interface DecisionFacts {
  state: string;
  askedBy: string;
  contributorIds: readonly string[];
}

/**
 * Whether a person may decide: a reviewer, on a request that waits, who neither asked nor had a hand in the revision since the
 * last accepted decision.
 */
export function mayDecide(
  person: { userId: string; roles: readonly Role[] },
  decision: DecisionFacts,
): { may: boolean; why: string } {
  if (!may(person.roles, 'decide')) return { may: false, why: 'Only a reviewer may decide' };
  if (decision.state !== 'asked') return { may: false, why: 'There is nothing to decide on now' };
  if (decision.askedBy === person.userId)
    return { may: false, why: 'You asked for this decision: another reviewer decides' };
  if (decision.contributorIds.includes(person.userId)) {
    return { may: false, why: 'You changed this assembly since its last accepted decision: another reviewer decides' };
  }
  return { may: true, why: '' };
}
