import { useQueryClient } from '@tanstack/react-query';
import { WEIGHT_UNITS } from '#shared/schemas/common.ts';
import { profileRequest, type MemberAnswer } from '#shared/schemas/session.ts';
import { Button } from '../../../components/ui/button.tsx';
import { ErrorSummary } from '../../../components/ui/error-summary.tsx';
import { Field } from '../../../components/ui/field.tsx';
import { Select, TextInput } from '../../../components/ui/inputs.tsx';
import { confirmDone } from '../../../components/ui/toast-store.ts';
import { adoptSession } from '../../../lib/session.ts';
import { TIME_ZONES, timeZoneName } from '../../../lib/time-zones.ts';
import { readBy, useForm } from '../../../lib/use-form.ts';
import { saveProfile } from '../api/save-profile.ts';

const unitNames: Record<(typeof WEIGHT_UNITS)[number], string> = {
  g: 'gram (g)',
  ozt: 'troy ounce (oz t)',
  dwt: 'pennyweight (dwt)',
  gr: 'grain (gr)',
};

/** What the other side reads, and how figures and moments are told to this member. */
export function ProfileForm({ member }: { member: MemberAnswer }) {
  const client = useQueryClient();
  const form = useForm({
    initial: {
      displayName: member.displayName,
      region: member.region,
      weightUnit: member.weightUnit as string,
      timeZone: member.timeZone,
    },
    read: (values) => readBy(profileRequest, values),
    send: saveProfile,
    onDone: (session) => {
      adoptSession(client, session);
      confirmDone('Profile saved.');
    },
  });
  const zones = TIME_ZONES.includes(member.timeZone) ? TIME_ZONES : [member.timeZone, ...TIME_ZONES];
  return (
    <form
      noValidate
      aria-label="Profile"
      className="flex max-w-lg flex-col gap-5"
      onSubmit={(event) => {
        event.preventDefault();
        if (!form.isBusy) form.submit();
      }}
    >
      <ErrorSummary items={form.items} attempt={form.attempt} />
      <Field
        id={form.fieldId('displayName')}
        label="Name"
        hint="The other side of a deal reads it; nobody else does."
        error={form.errorOf('displayName')}
      >
        {(ties) => (
          <TextInput
            {...ties}
            autoComplete="name"
            value={form.values.displayName}
            onChange={(event) => form.set('displayName', event.target.value)}
          />
        )}
      </Field>
      <Field
        id={form.fieldId('region')}
        label="Region"
        hint="All that the public sees of your place. Lots keep the region they were submitted with."
        error={form.errorOf('region')}
      >
        {(ties) => (
          <TextInput
            {...ties}
            autoComplete="address-level1"
            value={form.values.region}
            onChange={(event) => form.set('region', event.target.value)}
          />
        )}
      </Field>
      <Field
        id={form.fieldId('weightUnit')}
        label="Unit of mass"
        hint="Masses are told in it, with the other units beside; you can type in any unit."
        error={form.errorOf('weightUnit')}
      >
        {(ties) => (
          <Select
            {...ties}
            value={form.values.weightUnit}
            onChange={(event) => form.set('weightUnit', event.target.value)}
          >
            {WEIGHT_UNITS.map((unit) => (
              <option key={unit} value={unit}>
                {unitNames[unit]}
              </option>
            ))}
          </Select>
        )}
      </Field>
      <Field
        id={form.fieldId('timeZone')}
        label="Time zone"
        hint="Deadlines are told and business days counted in it."
        error={form.errorOf('timeZone')}
      >
        {(ties) => (
          <Select
            {...ties}
            value={form.values.timeZone}
            onChange={(event) => form.set('timeZone', event.target.value)}
          >
            {zones.map((zone) => (
              <option key={zone} value={zone}>
                {timeZoneName(zone)}
              </option>
            ))}
          </Select>
        )}
      </Field>
      <div>
        <Button type="submit" busy={form.isBusy} busyText="Saving">
          Save the profile
        </Button>
      </div>
    </form>
  );
}
