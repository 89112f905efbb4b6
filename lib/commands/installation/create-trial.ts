import { CHAIN_START } from '@/lib/conduct/chain';
import { createTrial as decideTrial } from '@/lib/conduct/create-trial';
import { emptyTrialState } from '@/lib/conduct/evolve';
import { TRIAL_EVENT_SCHEMA_VERSION, trialEventSchema } from '@/lib/conduct/events';
import type { InstallationContext } from '@/lib/conduct/installation/decision';
import { registerTrial } from '@/lib/conduct/installation/places';
import { models } from '@/lib/db/connection';
import { sha256 } from '@/lib/hash';
import type { InstallationInput } from '@/lib/schemas/installation-inputs';
import { SOFTWARE_VERSION } from '@/lib/software-version';
import { appendToChain } from '../append-to-chain';
import { saveTrialState } from '../save-trial-state';
import { personFacts } from './person-facts';
import { type AdministratorRequest, runAdministratorCommand } from './run-installation-command';

/** Writes a new trial's rows and the first events of its own chain. */
async function saveNewTrial(
  decision: ReturnType<typeof decideTrial>,
  context: InstallationContext,
): Promise<void> {
  const { Trial } = models();
  const { events, state } = decision;
  const at = new Date(context.now);
  const row = { ...state.trial, createdAt: at, version: 1, chainTime: at };
  await Trial.create({ ...row, chainSequence: 0, chainHead: CHAIN_START });
  await saveTrialState(emptyTrialState, state);
  const { head } = await appendToChain(
    state.trial.id,
    { sequence: 0, hash: CHAIN_START },
    events.map((event) => ({
      ...event,
      kind: event.payload.kind,
      payload: trialEventSchema.parse(event.payload),
    })),
    TRIAL_EVENT_SCHEMA_VERSION,
  );
  await Trial.update(
    { chainSequence: head.sequence, chainHead: head.hash },
    { where: { id: state.trial.id } },
  );
}

/**
 * Creates a trial in draft with its first statistician: its rows, its own chain, and the event of the installation.
 * @returns its id and code
 * @throws RefusedError when the code is another trial's, or the person may hold no role in a trial
 */
export function createTrial(
  request: AdministratorRequest,
  input: InstallationInput<'create-trial'>,
): Promise<{ trialId: string; code: string }> {
  return runAdministratorCommand('create-trial', 'trials.create', request, async (context) => {
    const { Person, Trial } = models();
    const codeInUse = (await Trial.findOne({ where: { code: input.code } })) !== null;
    const statistician = await Person.findByPk(input.statisticianId);
    const administrator = await Person.findByPk(request.personId, { rejectOnEmpty: true });
    const decision = decideTrial(input, {
      now: context.now,
      actor: {
        personId: administrator.id,
        printedName: administrator.printedName,
        role: 'administrator',
      },
      newId: context.newId,
      sha256,
      softwareVersion: SOFTWARE_VERSION,
    });
    const { id: trialId, code } = decision.state.trial;
    const payloads = registerTrial(
      { codeInUse, statistician: statistician && personFacts(statistician) },
      { code },
      trialId,
      context,
    );
    await saveNewTrial(decision, context);
    return { payloads, result: { trialId, code } };
  });
}
