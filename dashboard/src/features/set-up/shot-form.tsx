import { heightKind } from '@hubtack/contracts/control-points/control-point.js';
import type { CheckShotBody } from '@hubtack/contracts/set-up/check-shot.js';
import { latitude, longitude, optionalText } from '@hubtack/contracts/common.js';
import { useFormContext } from 'react-hook-form';
import { z } from 'zod';
import { ChoiceField, NoteField, NumberField } from '../../components/form-fields';
import { Form } from '../../components/form';
import { distance } from '../../lib/format';
import { useMe } from '../../lib/session';
import type { NearPoint } from './nearest-points';

/** What the form holds; what it sends is one of the two measures. */
const shotForm = z
  .object({
    controlPointId: z.number('Choose the control point').int(),
    from: z.enum(['epochs', 'typed']),
    epochs: z.number().int(),
    latitude: latitude.nullable(),
    longitude: longitude.nullable(),
    heightM: z.number('Write a number such as 47.25').nullable(),
    heightKind,
    note: optionalText(),
  })
  .superRefine(({ from, latitude: phi, longitude: lambda }, context) => {
    if (from === 'epochs') return;
    if (phi === null) context.addIssue({ code: 'custom', path: ['latitude'], message: 'Write the latitude' });
    if (lambda === null)
      context.addIssue({ code: 'custom', path: ['longitude'], message: 'Write the longitude' });
  });
type ShotForm = z.infer<typeof shotForm>;

function bodyOf(roverId: number, form: ShotForm): CheckShotBody {
  const { controlPointId, note } = form;
  const measure: CheckShotBody['measure'] =
    form.from === 'epochs'
      ? { from: 'epochs', epochs: form.epochs }
      : {
          from: 'typed',
          latitude: form.latitude!,
          longitude: form.longitude!,
          heightM: form.heightM,
          heightKind: form.heightKind,
        };
  return { roverId, controlPointId, measure, note };
}

const EPOCHS = [5, 10, 30, 60];

interface ShotFormProps {
  roverId: number;
  points: readonly NearPoint[];
  look: (body: CheckShotBody) => Promise<unknown>;
}

export function ShotForm({ roverId, points, look }: ShotFormProps) {
  const { units } = useMe();
  const nearest = points[0]!;
  return (
    <Form
      schema={shotForm}
      defaults={{
        controlPointId: nearest.id,
        from: 'epochs',
        epochs: 10,
        latitude: null,
        longitude: null,
        heightM: null,
        heightKind: nearest.heightKind,
        note: null,
      }}
      button="Look at it"
      submit={(form) => look(bodyOf(roverId, form))}
    >
      <ChoiceField
        name="controlPointId"
        label="Control point"
        as="number"
        options={points.map(({ id, name, distanceM }) => ({
          value: id,
          label: distanceM === null ? name : `${name}, ${distance(distanceM, units)}`,
        }))}
      />
      <ChoiceField
        name="from"
        label="Position"
        as="text"
        options={[
          { value: 'epochs', label: 'Mean of what the rover sends now' },
          { value: 'typed', label: 'Read off the controller' },
        ]}
      />
      <Measure />
      <NoteField name="note" label="Note (may be left empty)" />
    </Form>
  );
}

function Measure() {
  const { watch } = useFormContext();
  if (watch('from') === 'epochs')
    return (
      <ChoiceField
        name="epochs"
        label="Mean of the newest"
        hint="Hold the pole still and upright on the mark until they have come"
        as="number"
        options={EPOCHS.map((count) => ({ value: count, label: `${count} fixed positions` }))}
      />
    );
  return (
    <>
      <div className="form-row">
        <NumberField name="latitude" label="Latitude, degrees" required />
        <NumberField name="longitude" label="Longitude, degrees" required />
      </div>
      <div className="form-row">
        <NumberField
          name="heightM"
          label="Height of the mark, m"
          hint="Reduced to the ground by the controller"
        />
        <ChoiceField
          name="heightKind"
          label="Counted from"
          as="text"
          options={[
            { value: 'ellipsoidal', label: 'the ellipsoid' },
            { value: 'geoid', label: 'the geoid' },
          ]}
        />
      </div>
    </>
  );
}
