'use client';

import { useCallback, useState } from 'react';
import { useController } from 'react-hook-form';
import { Button } from '../ui/button';
import { formatTime } from '../ui/format-time';
import { useServerClock } from '../ui/use-server-clock';
import { controlClass } from './control-class';
import { describedBy, FieldFrame, useFieldError, type FieldProps } from './field-frame';
import { useFieldFacts } from './form-context';
import {
  isLocalText,
  localText,
  notBeforeWithinMinute,
  readZonedTime,
  startOfMinute,
  zonedTimeProblem,
} from './zoned-time';

/** The form's value while only a part of date and time is entered: refused by the schema as no date and time. */
const INCOMPLETE = 'incomplete';

/** The instant of a wall-clock text, or the text itself while it stands for no single instant. */
function valueOf(text: string, chosen: string | null, zone: string, notBefore: string | undefined): string {
  if (text === '') return '';
  const reading = readZonedTime(text, zone);
  if (reading.kind === 'one') return notBeforeWithinMinute(reading.at, notBefore);
  const isChosen = reading.kind === 'two' && (chosen === reading.earlier || chosen === reading.later);
  return isChosen ? notBeforeWithinMinute(chosen, notBefore) : text;
}

/**
 * A date and time on the clock of a site. The form's value is the instant in UTC (ISO 8601), '' while empty, or the
 * text as typed while it stands for no single instant: in the hour the clocks are put back over one says which of the
 * two is meant, and an hour they are put forward over is refused with a sentence.
 * @param zone the site's IANA zone; `place` is its name ("Aldermoor")
 * @param readAt the server's time when the page was made, for "Now"; left out, there is no such button
 * @param notBefore a known instant, in whose minute an entry means "after it" (the release, for a dosing)
 */
export function DateTimeField(
  props: FieldProps & {
    zone: string;
    place: string;
    readAt?: string;
    notBefore?: string;
    emptyAs?: undefined | null;
  },
) {
  const { name, label, help, optional, labelHidden, disabled, zone, place, readAt, notBefore } = props;
  const unreadable = useCallback((text: string) => zonedTimeProblem(text, zone), [zone]);
  const elementId = useFieldFacts(name, {
    label,
    unreadable,
    ...('emptyAs' in props ? { emptyAs: props.emptyAs } : {}),
  });
  const {
    field: { ref, value, onChange, onBlur },
  } = useController({ name });
  const error = useFieldError(name);
  const serverNow = useServerClock(readAt ?? '1970-01-01T00:00:00Z');

  const held = typeof value === 'string' ? value : '';
  const isEmpty = held === '' || held === INCOMPLETE;
  const heldText = isEmpty ? '' : isLocalText(held) ? held : localText(held, zone);
  const [typed, setTyped] = useState({ text: heldText, chosen: null as string | null });
  const isTyped = valueOf(typed.text, typed.chosen, zone, notBefore) === (isEmpty ? '' : held);
  const { text, chosen } = isTyped ? typed : { text: heldText, chosen: held };

  function enter(nextText: string, nextChosen: string | null) {
    setTyped({ text: nextText, chosen: nextChosen });
    onChange(valueOf(nextText, nextChosen, zone, notBefore));
  }

  const reading = readZonedTime(text, zone);
  const at = !isEmpty && !isLocalText(held) ? held : null;
  return (
    <FieldFrame
      {...{ elementId, label, optional, error, labelHidden }}
      help={
        help ? (
          <>
            {`Time at ${place}. `}
            {help}
          </>
        ) : (
          `Time at ${place} (${zone}).`
        )
      }
    >
      <div className="flex flex-wrap items-center gap-x-3 gap-y-2">
        <input
          id={elementId}
          ref={ref}
          name={name}
          type="datetime-local"
          max="2199-12-31T23:59"
          value={text}
          disabled={disabled}
          required={!optional}
          onChange={(event) => enter(event.target.value, null)}
          onBlur={({ target }) => {
            const next = target.validity.badInput ? INCOMPLETE : '';
            if (isEmpty && next !== held) onChange(next);
            onBlur();
          }}
          className={`${controlClass(error)} max-w-58`}
          {...describedBy(elementId, true, error)}
        />
        {readAt !== undefined ? (
          <Button
            small
            disabled={disabled}
            aria-label="Now: enter the present time"
            onClick={() => {
              const minute = startOfMinute(serverNow());
              enter(localText(minute, zone), minute);
            }}
          >
            Now
          </Button>
        ) : null}
      </div>
      {reading.kind === 'two' ? (
        <fieldset className="mt-2">
          <legend className="text-sm">The clocks were put back that night. Which of the two?</legend>
          {[reading.earlier, reading.later].map((instant) => (
            <label key={instant} className="flex gap-2.5 py-1">
              <input
                type="radio"
                name={`${name}-which`}
                checked={chosen === instant}
                onChange={() => enter(text, instant)}
                className="mt-1 size-4 flex-none accent-water"
              />
              {formatTime(instant, zone)}
            </label>
          ))}
        </fieldset>
      ) : (
        <output htmlFor={elementId} className="block text-sm text-ink-soft">
          {at !== null ? formatTime(at, zone) : null}
        </output>
      )}
    </FieldFrame>
  );
}
