import type { MailKind, MailPayloadOf } from '@/lib/schemas/mail-payloads';

const about = {
  trialCode: 'WELL-02',
  occurredAt: '2027-03-04T09:22:41.000Z',
  chainHead: '7d865e959b2466918c9863afca942d0fb89d7c9ac0c99bafc3749504ded97730',
};
const released = {
  ...about,
  releaseId: '01956f2c-7a10-7000-8000-000000000001',
  cohortNumber: 5,
  dose: '60',
  unit: 'mg',
  doseNotation: 'plain',
} as const;
const link = { token: 'n3w-T0ken_of_43_characters_in_base64url_abc', expiresAt: '2027-03-11T09:22:41.000Z' };

/** One payload of every kind of mail, of an invented trial. */
export const MAIL_PAYLOADS: { readonly [Kind in MailKind]: MailPayloadOf<Kind> } = {
  'design-submitted': {
    ...about,
    kind: 'design-submitted',
    versionId: '01956f2c-7a10-7000-8000-000000000002',
    designVersion: 1,
  },
  'design-returned': {
    ...about,
    kind: 'design-returned',
    versionId: '01956f2c-7a10-7000-8000-000000000002',
    designVersion: 1,
  },
  'recommendation-ready': {
    ...about,
    kind: 'recommendation-ready',
    recommendationId: '01956f2c-7a10-7000-8000-000000000003',
    afterCohort: 4,
  },
  'dose-released': {
    ...released,
    kind: 'dose-released',
    cohortSize: 3,
    designVersion: 1,
    signers: ['Ilse Marrow', 'Tomas Quillfeather'],
  },
  'dose-released-summary': { ...released, kind: 'dose-released-summary' },
  'packet-returned': { ...about, kind: 'packet-returned', cohortNumber: 4 },
  'trial-halted': { ...about, kind: 'trial-halted', haltId: '01956f2c-7a10-7000-8000-000000000004' },
  'trial-lifted': { ...about, kind: 'trial-lifted', haltId: '01956f2c-7a10-7000-8000-000000000004' },
  'trial-closed': { ...about, kind: 'trial-closed' },
  invitation: { ...link, kind: 'invitation', purpose: 'invitation' },
  'password-reset': { ...link, kind: 'password-reset', purpose: 'password-reset' },
};
