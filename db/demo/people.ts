import type { Role } from '../../shared/policy.ts';
import { demoId } from './ids.ts';

/** Two invented plants. The second is there so that one can see how they are kept apart. */
export const demoPlants = {
  quay: { id: demoId('plant quay'), name: 'Quayside plate hall' },
  upland: { id: demoId('plant upland'), name: 'Upland workshop' },
} as const;

export type DemoMember = {
  readonly plant: keyof typeof demoPlants;
  readonly mail: string;
  readonly name: string;
  readonly role: Role;
  readonly mayApprove: boolean;
};

/** The first of each plant is its lead, who adds the others. The engineer works for both. */
export const demoMembers: readonly DemoMember[] = [
  { plant: 'quay', mail: 'lead@quay.example', name: 'Quay lead', role: 'lead', mayApprove: true },
  { plant: 'quay', mail: 'operator@quay.example', name: 'Quay operator', role: 'operator', mayApprove: false },
  { plant: 'quay', mail: 'programmer@quay.example', name: 'Quay programmer', role: 'programmer', mayApprove: false },
  { plant: 'quay', mail: 'engineer@quay.example', name: 'Quay engineer', role: 'engineer', mayApprove: false },
  { plant: 'quay', mail: 'approver@quay.example', name: 'Quay approver', role: 'engineer', mayApprove: true },
  { plant: 'upland', mail: 'lead@upland.example', name: 'Upland lead', role: 'lead', mayApprove: true },
  { plant: 'upland', mail: 'operator@upland.example', name: 'Upland operator', role: 'operator', mayApprove: false },
  { plant: 'upland', mail: 'engineer@quay.example', name: 'Quay engineer', role: 'engineer', mayApprove: false },
];

/** Accounts as the sign-in page lists them, each once. */
export const demoAccounts = demoMembers
  .filter(({ mail }, index) => demoMembers.findIndex((other) => other.mail === mail) === index)
  .map(({ mail, role, mayApprove, plant }) => ({
    mail,
    role: role === 'engineer' && mayApprove ? 'engineer who may approve' : role,
    plant: demoPlants[plant].name,
  }));
