import { render, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import {
  answering,
  completeSubject,
  dosedSubject,
  recorded,
  reservedSubject,
  work,
} from '@/tests/factories/cohort-work';
import type { OwnSubjectData } from './cohort-data';
import { SavedNotice, SavedNoticeProvider } from './saved-notice';
import { SubjectActs } from './subject-acts';

const refresh = vi.fn();
vi.mock('next/navigation', async (original) => ({
  ...(await original<object>()),
  useRouter: () => ({ refresh }),
}));
beforeEach(() => refresh.mockClear());

const page = (subject: OwnSubjectData, actions: ReturnType<typeof answering>) => (
  <SavedNoticeProvider>
    <SavedNotice spot="place-1" />
    <SubjectActs work={work} subject={subject} spot="place-1" actions={actions} isPrimary />
  </SavedNoticeProvider>
);

function show(subject: OwnSubjectData, actions = answering(recorded)) {
  return { actions, user: userEvent.setup({ delay: null }), view: render(page(subject, actions)) };
}

const dosingTime = () => screen.getByLabelText('Date and time of dosing');

describe('recording a dosing', () => {
  it('starts with the released dose and no time, and sends the instant of the site’s clock', async () => {
    const { actions, user } = show(reservedSubject());
    expect(dosingTime()).toHaveValue('');
    expect(screen.getByLabelText('Dose given, mg')).toHaveValue('60');
    expect(screen.queryByLabelText(/Why another dose/)).toBeNull();
    await user.type(dosingTime(), '2027-03-14T09:22');
    expect(screen.getByText('14 Mar 2027, 09:22 UTC+1')).toBeInTheDocument();
    await user.click(screen.getByRole('button', { name: 'Record dosing' }));
    await waitFor(() => expect(refresh).toHaveBeenCalledTimes(1));
    expect(actions.recordDosing).toHaveBeenCalledExactlyOnceWith({
      trialCode: 'WELL-99',
      subjectId: reservedSubject().id,
      dosedAt: '2027-03-14T08:22:00.000Z',
      doseGiven: '60',
      deviationReason: null,
      submissionKey: expect.any(String),
    });
    const notice = screen.getByText(/^Recorded\. The dosing of ALD-014/);
    await waitFor(() => expect(notice.closest('[tabindex="-1"]')).toHaveFocus());
    expect(screen.queryByRole('form', { name: 'Record the dosing of ALD-014' })).toBeNull();
  });

  it('takes the minute of the server’s clock for "now"', async () => {
    const { user } = show(reservedSubject());
    await user.click(screen.getByRole('button', { name: 'Now: enter the present time' }));
    expect(dosingTime()).toHaveValue('2027-03-14T12:00');
  });

  it('reads a time in the minute of the release as after it', async () => {
    const { actions, user } = show(reservedSubject());
    await user.type(dosingTime(), '2027-03-01T10:22');
    await user.click(screen.getByRole('button', { name: 'Record dosing' }));
    await waitFor(() => expect(actions.recordDosing).toHaveBeenCalled());
    expect(actions.recordDosing.mock.calls[0]?.[0]).toMatchObject({ dosedAt: work.dose.releasedAt });
  });

  it('refuses an hour the clocks are put forward over, keeping what was typed', async () => {
    const { actions, user } = show(reservedSubject());
    await user.type(dosingTime(), '2027-03-28T02:30');
    await user.click(screen.getByRole('button', { name: 'Record dosing' }));
    const alert = await screen.findByRole('alert');
    expect(alert).toHaveFocus();
    expect(alert).toHaveTextContent('there was no 02:30 on 28 Mar 2027 in Europe/Vienna');
    expect(dosingTime()).toHaveValue('2027-03-28T02:30');
    expect(actions.recordDosing).not.toHaveBeenCalled();
  });

  it('asks which of two is meant in the hour the clocks are put back over', async () => {
    const { actions, user } = show(reservedSubject());
    await user.type(dosingTime(), '2027-10-31T02:30');
    await user.click(screen.getByRole('button', { name: 'Record dosing' }));
    expect(await screen.findByRole('alert')).toHaveTextContent('came twice that night');
    await user.click(screen.getByRole('radio', { name: '31 Oct 2027, 02:30 UTC+1' }));
    await user.click(screen.getByRole('button', { name: 'Record dosing' }));
    await waitFor(() => expect(actions.recordDosing).toHaveBeenCalled());
    expect(actions.recordDosing.mock.calls[0]?.[0]).toMatchObject({ dosedAt: '2027-10-31T01:30:00.000Z' });
  });

  it('asks why another dose was given, and forgets the reason when the dose is the released one again', async () => {
    const { actions, user } = show(reservedSubject());
    await user.type(dosingTime(), '2027-03-14T09:22');
    const dose = screen.getByLabelText('Dose given, mg');
    await user.clear(dose);
    await user.type(dose, '40');
    await user.type(screen.getByLabelText('Why another dose was given'), 'no');
    await user.clear(dose);
    await user.type(dose, '60.0');
    expect(screen.queryByLabelText('Why another dose was given')).toBeNull();
    await user.click(screen.getByRole('button', { name: 'Record dosing' }));
    await waitFor(() => expect(actions.recordDosing).toHaveBeenCalled());
    expect(actions.recordDosing.mock.calls[0]?.[0]).toMatchObject({
      doseGiven: '60.0',
      deviationReason: null,
    });
  });

  it('shows a refusal of the server at its field and keeps everything typed', async () => {
    const refusal = {
      ok: false as const,
      code: 'refused',
      message: 'Not recorded. The released dose is 60 mg; for another dose given, say why.',
      fields: { deviationReason: 'Say why the dose given differs from the released one.' },
    };
    const { user } = show(reservedSubject(), answering(refusal));
    await user.type(dosingTime(), '2027-03-14T09:22');
    const dose = screen.getByLabelText('Dose given, mg');
    await user.clear(dose);
    await user.type(dose, '40');
    await user.click(screen.getByRole('button', { name: 'Record dosing' }));
    expect(await screen.findByRole('alert')).toHaveTextContent(refusal.message);
    expect(screen.getByLabelText('Why another dose was given')).toBeInvalid();
    expect(dosingTime()).toHaveValue('2027-03-14T09:22');
    expect(dose).toHaveValue('40');
    expect(refresh).not.toHaveBeenCalled();
  });

  it('is not offered while the trial is halted, and says why', () => {
    const why = 'The trial is halted: nobody is reserved or dosed until it is lifted.';
    show(reservedSubject({ acts: { releaseSlot: { why: null }, recordDosing: { why } } }));
    expect(screen.getByText(why)).toBeInTheDocument();
    expect(screen.queryByRole('button', { name: 'Record dosing' })).toBeNull();
    expect(screen.getByText('Give the place back', { selector: 'summary' })).toBeInTheDocument();
  });
});

describe('recording an outcome', () => {
  it('keeps "absent" shut until the window has ended, and says when that is on the site’s clock', () => {
    show(dosedSubject());
    const group = screen.getByRole('group', { name: 'Outcome', hidden: true });
    expect(within(group).getByRole('radio', { name: /^none/, hidden: true })).toBeDisabled();
    expect(group).toHaveTextContent('The observation window ends on 16 Mar 2027, 09:00 UTC+1');
  });

  it('asks when it began only where it is present', async () => {
    const { actions, user } = show(dosedSubject());
    await user.click(screen.getByText('Record an outcome'));
    expect(screen.queryByLabelText('When it began')).toBeNull();
    await user.click(screen.getByRole('radio', { name: 'dose-limiting toxicity' }));
    await user.click(screen.getByRole('button', { name: 'Record outcome' }));
    expect(await screen.findByRole('alert')).toHaveTextContent('Enter when it began.');
    await user.type(screen.getByLabelText('When it began'), '2027-03-12T06:05');
    await user.click(screen.getByRole('button', { name: 'Record outcome' }));
    await waitFor(() => expect(actions.recordOutcome).toHaveBeenCalledTimes(1));
    expect(actions.recordOutcome.mock.calls[0]?.[0]).toMatchObject({
      outcome: 'present',
      onsetAt: '2027-03-12T05:05:00.000Z',
    });
  });

  it('forgets an onset when the choice changes to absent, and says what follows the last outcome', async () => {
    const over = dosedSubject({ windowEndsAt: '2027-03-14T08:00:00.000Z' });
    const { actions, user } = show(
      over,
      answering({
        ok: true,
        value: { events: ['outcome-recorded', 'cohort-completed', 'recommendation-computed'] },
      }),
    );
    await user.click(screen.getByRole('radio', { name: 'dose-limiting toxicity' }));
    await user.type(screen.getByLabelText('When it began'), '2027-03-28T02:30');
    await user.click(screen.getByRole('radio', { name: 'none' }));
    await user.click(screen.getByRole('button', { name: 'Record outcome' }));
    expect(
      await screen.findByText(
        'Recorded. ALD-014: none. Cohort 4 is complete; the recommendation waits for the safety reviewers.',
      ),
    ).toBeInTheDocument();
    expect(actions.recordOutcome.mock.calls[0]?.[0]).toMatchObject({ outcome: 'absent', onsetAt: null });
  });

  it('wants a choice', async () => {
    const { actions, user } = show(dosedSubject({ windowEndsAt: '2027-03-14T08:00:00.000Z' }));
    await user.click(screen.getByRole('button', { name: 'Record outcome' }));
    expect(await screen.findByRole('alert')).toHaveTextContent('Choose the outcome.');
    expect(actions.recordOutcome).not.toHaveBeenCalled();
  });

  it('sends once for a double click', async () => {
    const { actions, user } = show(dosedSubject({ windowEndsAt: '2027-03-14T08:00:00.000Z' }));
    await user.click(screen.getByRole('radio', { name: 'none' }));
    await user.dblClick(screen.getByRole('button', { name: 'Record outcome' }));
    await waitFor(() => expect(refresh).toHaveBeenCalled());
    expect(actions.recordOutcome).toHaveBeenCalledTimes(1);
  });
});

describe('correcting an outcome', () => {
  const conflict = {
    ok: false as const,
    code: 'conflict',
    message: 'Not corrected. The record changed since this page was opened; load it again and compare.',
  };

  it('shows what is on record beside the form and sends the revision that is shown', async () => {
    const { actions, user } = show(completeSubject());
    await user.click(screen.getByText('Correct the outcome'));
    const form = screen.getByRole('form', { name: 'Correct the outcome of ALD-014' });
    expect(within(form).getByText('On record').parentElement).toHaveTextContent('On recordnone');
    await user.click(within(form).getByRole('radio', { name: 'dose-limiting toxicity' }));
    await user.type(within(form).getByLabelText('When it began'), '2027-03-05T06:00');
    await user.type(within(form).getByLabelText('Reason of the correction'), 'Found in the ward’s notes.');
    await user.click(within(form).getByRole('button', { name: 'Correct outcome' }));
    await waitFor(() => expect(actions.correctOutcome).toHaveBeenCalledTimes(1));
    expect(actions.correctOutcome.mock.calls[0]?.[0]).toMatchObject({
      seenRevision: 3,
      outcome: 'present',
      onsetAt: '2027-03-05T05:00:00.000Z',
      reason: 'Found in the ward’s notes.',
    });
  });

  it('overwrites nothing when somebody was faster: both versions stand side by side, what was typed stays', async () => {
    const actions = answering(conflict);
    const { user, view } = show(completeSubject(), actions);
    await user.click(screen.getByText('Correct the outcome'));
    await user.type(screen.getByLabelText('Reason of the correction'), 'A slip of the pen.');
    await user.click(screen.getByRole('button', { name: 'Correct outcome' }));
    expect(await screen.findByRole('alert')).toHaveTextContent(conflict.message);
    const newer = completeSubject({ revision: 4, outcome: 'present', onsetAt: '2027-03-05T05:00:00.000Z' });
    view.rerender(page(newer, actions));
    expect(screen.getByText('On record').parentElement).toHaveTextContent('dose-limiting toxicity');
    expect(screen.getByLabelText('Reason of the correction')).toHaveValue('A slip of the pen.');
    expect(screen.getByRole('radio', { name: 'none' })).toBeChecked();
    await user.click(screen.getByRole('button', { name: 'Correct outcome' }));
    await waitFor(() => expect(actions.correctOutcome).toHaveBeenCalledTimes(2));
    expect(actions.correctOutcome.mock.calls[1]?.[0]).toMatchObject({ seenRevision: 4 });
  });

  it('begins anew from the newer record after a correction of one’s own', async () => {
    const actions = answering(recorded);
    const { user, view } = show(completeSubject(), actions);
    await user.click(screen.getByText('Correct the outcome'));
    await user.click(screen.getByRole('radio', { name: 'dose-limiting toxicity' }));
    await user.type(screen.getByLabelText('When it began'), '2027-03-05T06:00');
    await user.type(screen.getByLabelText('Reason of the correction'), 'Found in the ward’s notes.');
    await user.click(screen.getByRole('button', { name: 'Correct outcome' }));
    await screen.findByText(/^Corrected\./);
    expect(screen.queryByText('Correct the outcome')).toBeNull();
    view.rerender(
      page(
        completeSubject({ revision: 4, outcome: 'present', onsetAt: '2027-03-05T05:00:00.000Z' }),
        actions,
      ),
    );
    await user.click(screen.getByText('Correct the outcome'));
    expect(screen.getByRole('radio', { name: 'dose-limiting toxicity' })).toBeChecked();
    expect(screen.getByLabelText('When it began')).toHaveValue('2027-03-05T06:00');
    expect(screen.getByLabelText('Reason of the correction')).toHaveValue('');
  });
});

describe('giving a place back', () => {
  it('wants a reason, and closes with Escape', async () => {
    const { actions, user } = show(reservedSubject());
    const summary = screen.getByText('Give the place back', { selector: 'summary' });
    await user.click(summary);
    const form = screen.getByRole('form', { name: 'Give back the place of ALD-014' });
    await user.click(within(form).getByRole('button', { name: 'Give the place back' }));
    expect(await within(form).findByRole('alert')).toHaveTextContent('The reason is too short');
    await user.type(within(form).getByLabelText('Reason'), 'Screen failure: QT interval.');
    await user.keyboard('{Escape}');
    expect(summary).toHaveFocus();
    await user.click(summary);
    expect(within(form).getByLabelText('Reason')).toHaveValue('Screen failure: QT interval.');
    await user.click(within(form).getByRole('button', { name: 'Give the place back' }));
    await waitFor(() => expect(actions.releaseSlot).toHaveBeenCalledTimes(1));
  });
});
