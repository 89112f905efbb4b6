import { canonicalize } from 'json-canonicalize';
import { type Deciding, refuse } from './decision';
import { whyMayNotSign } from './permitted';
import type { SignatureDecision } from './state';

/** What a signature is put to, by its id and the digest of its stored text. */
export interface SignedThing {
  readonly recommendationId?: string;
  readonly designVersionId?: string;
  readonly haltId?: string;
  readonly digest: string;
}

export interface SignatureStatement {
  readonly decision: SignatureDecision;
  readonly dose: string | null;
  readonly reason: string | null;
  /** The sentence the signer states by signing. */
  readonly meaning: string;
}

/**
 * Puts the actor's electronic signature to a thing: the canonical text (RFC 8785) of what was signed, its SHA-256
 * digest, the printed name, the meaning and the time. Refuses whoever may not sign a step of this trial.
 */
export function sign(deciding: Deciding, thing: SignedThing, statement: SignatureStatement): void {
  const { actor, now, newId, sha256 } = deciding.context;
  if (actor.personId === null) refuse('forbidden', 'Only a person can sign.');
  const obstacle = whyMayNotSign(deciding.state, actor.personId);
  if (obstacle !== null) refuse('forbidden', obstacle);
  const { trial } = deciding.state;
  const signedText = canonicalize({
    trial: { id: trial.id, code: trial.code },
    signed: thing,
    ...statement,
    signer: { personId: actor.personId, printedName: actor.printedName },
    signedAt: now,
  });
  deciding.emit({
    kind: 'signed',
    signatureId: newId(),
    recommendationId: thing.recommendationId ?? null,
    designVersionId: thing.designVersionId ?? null,
    haltId: thing.haltId ?? null,
    printedName: actor.printedName,
    ...statement,
    signedText,
    digest: sha256(signedText),
  });
}
