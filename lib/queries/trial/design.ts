import { approvalMeaning } from '@/lib/conduct/decide/design';
import type { Offer } from '@/lib/conduct/offers';
import type { DesignVersion, TrialLife } from '@/lib/conduct/state';
import {
  draftVersion,
  standingSignatures,
  submittedVersion,
  versionInForce,
} from '@/lib/conduct/trial-facts';
import type { Design } from '@/lib/schemas/design';
import type { DesignAddress } from '@/lib/schemas/design-address';
import { comparisonOf, type ComparisonView } from './design-comparison';
import { readerTrial, type ReaderTrial, type TrialReader } from './reader-trial';

/** A version of a trial's design without its settings, for the list of versions. */
export interface DesignVersionLine {
  readonly number: number;
  readonly state: DesignVersion['state'];
  readonly isInForce: boolean;
  readonly isShown: boolean;
  readonly proposedBy: string;
  readonly savedAt: string;
  readonly submittedAt: string | null;
  readonly approvedAt: string | null;
}

/** The version shown, in full. */
export interface ShownDesign {
  readonly versionId: string;
  readonly digest: string;
  readonly number: number;
  readonly state: DesignVersion['state'];
  readonly isInForce: boolean;
  readonly design: Design;
  readonly proposedBy: string;
  readonly savedAt: string;
  readonly submittedAt: string | null;
  readonly returnedReason: string | null;
  readonly approvals: readonly {
    readonly printedName: string;
    readonly meaning: string;
    readonly signedAt: string;
  }[];
  /** The sentence an approval would state. */
  readonly approvalMeaning: string;
  /** Acts on this version; null where they are not for the reader's role or not of this moment. */
  readonly submit: Offer | null;
  readonly approve: Offer | null;
  readonly return: Offer | null;
}

/** The design page of a trial. */
export interface DesignView {
  readonly trialCode: string;
  readonly trialState: TrialLife;
  readonly shown: ShownDesign | null;
  readonly versions: readonly DesignVersionLine[];
  /** Present for those who may write the draft now. */
  readonly edit: Offer | null;
  readonly comparison: ComparisonView | null;
}

/** The form of the draft. */
export interface DesignEditView {
  readonly trialCode: string;
  /** The draft as last saved; null before the first. */
  readonly draft: { readonly number: number; readonly design: Design; readonly savedAt: string } | null;
  readonly returnedReason: string | null;
  /** Why the design cannot be written now; null when it can. */
  readonly why: string | null;
}

function versionsOf(trial: ReaderTrial): DesignVersion[] {
  return Object.values(trial.loaded.state.designVersions).sort((a, b) => b.number - a.number);
}

function shownDesign(trial: ReaderTrial, version: DesignVersion): ShownDesign {
  const { state, people } = trial.loaded;
  const { id, digest, number, design, savedAt, submittedAt, returnedReason } = version;
  const isDraft = draftVersion(state)?.id === id;
  const isSubmitted = submittedVersion(state)?.id === id;
  return {
    versionId: id,
    digest,
    number,
    state: version.state,
    isInForce: versionInForce(state)?.id === id,
    design,
    proposedBy: people[version.proposedBy]?.printedName ?? '',
    savedAt,
    submittedAt,
    returnedReason,
    approvals: standingSignatures(state, id).map(({ printedName, meaning, signedAt }) => ({
      printedName,
      meaning,
      signedAt,
    })),
    approvalMeaning: approvalMeaning(state.trial.code, number),
    submit: (isDraft && trial.offers.submitDesign) || null,
    approve: (isSubmitted && trial.offers.approveDesign) || null,
    return: (isSubmitted && trial.offers.returnDesign) || null,
  };
}

/**
 * The design page for a reader, or null when the trial or the page is not theirs. Without a version named, or where there is
 * none of that number, the one that is worked on is shown: submitted, else draft, else in force.
 */
export async function designPage(
  reader: TrialReader,
  code: string,
  address: DesignAddress,
): Promise<DesignView | null> {
  const trial = await readerTrial(reader, code);
  if (trial === null || !trial.may('design.read')) return null;
  const { state, people } = trial.loaded;
  const versions = versionsOf(trial);
  const inForce = versionInForce(state);
  const shown =
    versions.find((version) => version.number === address.version) ??
    submittedVersion(state) ??
    draftVersion(state) ??
    inForce;
  return {
    trialCode: state.trial.code,
    trialState: state.trial.state,
    shown: shown && shownDesign(trial, shown),
    versions: versions.map((version) => ({
      number: version.number,
      state: version.state,
      isInForce: version.id === inForce?.id,
      isShown: version.id === shown?.id,
      proposedBy: people[version.proposedBy]?.printedName ?? '',
      savedAt: version.savedAt,
      submittedAt: version.submittedAt,
      approvedAt: version.approvedAt,
    })),
    edit: trial.offers.saveDesign ?? null,
    comparison: comparisonOf(trial, address.compare),
  };
}

/** The form of the draft for the statisticians of a trial, or null for everyone else. */
export async function designEditPage(reader: TrialReader, code: string): Promise<DesignEditView | null> {
  const trial = await readerTrial(reader, code);
  if (trial === null || !trial.may('design.write')) return null;
  const { state } = trial.loaded;
  const draft = draftVersion(state);
  const offer = trial.offers.saveDesign;
  return {
    trialCode: state.trial.code,
    draft: draft && { number: draft.number, design: draft.design, savedAt: draft.savedAt },
    returnedReason: draft?.returnedReason ?? null,
    why: offer
      ? offer.why
      : 'The design is in review or in force. A change to a design in force is an amendment, which is not yet offered.',
  };
}
