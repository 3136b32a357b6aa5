import { Button } from '@fluentui/react-components';
import { topographic } from '@hubtack/contracts/weekly/tolerance-profile.js';
import { useFieldArray, useFormContext } from 'react-hook-form';
import { NumberField, TextField } from '../../components/form-fields';

const MOST = 8;

/** One profile's name and limits. */
export function ProfileFields({ name }: { name: string }) {
  return (
    <>
      <TextField name={`${name}.name`} label="Name" required />
      <NumberField name={`${name}.maxAgeSeconds`} label="Age of corrections to, s" required />
      <NumberField name={`${name}.maxHdop`} label="HDOP to" required />
      <NumberField name={`${name}.minSatellites`} label="Satellites from" required />
    </>
  );
}

/** Profiles beside the firm's own; a crew that works to one of them chooses it on the Crews page. */
export function OtherProfiles() {
  const { formState } = useFormContext();
  const { fields, append, remove } = useFieldArray({ name: 'otherProfiles' });
  const error = formState.errors['otherProfiles'] as
    { message?: string; root?: { message?: string } } | undefined;
  const message = error?.message ?? error?.root?.message;
  return (
    <>
      {fields.map((field, index) => (
        <fieldset key={field.id} className="limits">
          <legend>Another profile</legend>
          <p>For crews that choose it, in place of the firm’s.</p>
          <ProfileFields name={`otherProfiles.${index}`} />
          <div>
            <Button appearance="subtle" onClick={() => remove(index)}>
              Remove this profile
            </Button>
          </div>
        </fieldset>
      ))}
      {message && <p role="alert">{message}</p>}
      {fields.length < MOST && (
        <div>
          <Button onClick={() => append({ ...topographic, name: '' })}>Add a profile</Button>
        </div>
      )}
    </>
  );
}
