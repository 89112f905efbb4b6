'use client';

import { RadioGroup } from '@/components/forms/choice-fields';
import { NumberField } from '@/components/forms/number-field';
import { TextField } from '@/components/forms/text-field';
import { FormSection } from './form-section';

/** What counts as a response, and the probability sought. */
export function ResponseSection() {
  return (
    <FormSection title="Response">
      <TextField
        name="design.response.present"
        label="Label when present"
        help="In the protocol’s words, such as “dose-limiting toxicity”. Every page uses it."
      />
      <TextField name="design.response.absent" label="Label when absent" help="Such as “none”." />
      <RadioGroup
        name="design.response.kind"
        label="A response is"
        choices={[
          { value: 'harm', label: 'a harm', help: 'Doses can close, and rises are bounded.' },
          { value: 'wanted', label: 'wanted', help: 'Such as a successful block or a take.' },
        ]}
      />
      <RadioGroup
        name="design.response.direction"
        label="With a higher dose its probability"
        inline
        choices={[
          { value: 'rising', label: 'rises' },
          { value: 'falling', label: 'falls' },
        ]}
      />
      <NumberField
        name="design.target"
        label="Target probability Γ"
        help="The dose sought is the one with this probability of a response. Above 0 and below 1."
      />
    </FormSection>
  );
}
