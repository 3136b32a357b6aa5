import { Button, MessageBar, MessageBarActions, MessageBarBody } from '@fluentui/react-components';
import {
  correctionFormatLabels,
  correctionFormats,
  type CorrectionSource,
} from '@hubtack/contracts/corrections/correction-source.js';
import { typingFaults, type LoginField } from '@hubtack/contracts/corrections/typing-faults.js';
import { useState } from 'react';
import { useFormContext } from 'react-hook-form';
import { ChoiceField, FlagField, NumberField, TextField } from '../../components/form-fields';
import { PasswordField } from './password-field';
import { splitAddress, splitWords, type SplitAddress } from './split-address';
import { watchChoices } from './watch-words';

/** What the fields hold while somebody types: anything. */
interface Typed {
  address?: string | null;
  port?: number | string | null;
  mountPoint?: string | null;
  user?: string | null;
  password?: string | null;
  tls?: boolean;
}

const doubtsOf = (typed: Typed) => {
  const faults = typingFaults({
    address: typed.address ?? '',
    port: typed.port ?? '',
    mountPoint: typed.mountPoint ?? '',
    user: typed.user ?? '',
    password: typed.password ?? '',
  });
  return (field: LoginField): string | undefined =>
    faults
      .filter((fault) => fault.field === field)
      .map(({ words }, index) => {
        const sentence = field === 'port' ? words : `${index === 0 ? 'Look again: it' : 'It'} ${words}`;
        return sentence.endsWith('?') ? sentence : `${sentence}.`;
      })
      .join(' ') || undefined;
};

/** The fields of a correction source; what looks mistyped is said while it is typed, and stops nobody. */
export function SourceFields({ source }: { source: CorrectionSource | null }) {
  const { watch, setValue, setFocus } = useFormContext<Typed>();
  const typed = watch();
  const doubt = doubtsOf(typed);
  const [splits, setSplits] = useState(0);
  const split = splitAddress(typed.address ?? '');
  const takeApart = (found: SplitAddress) => {
    for (const [name, value] of Object.entries(found)) setValue(name as keyof Typed, value as string);
    // The fields show what was typed; made anew, they show what the form holds.
    setSplits((before) => before + 1);
    setTimeout(() => setFocus('mountPoint'));
  };
  const isKept = source?.hasPassword === true;
  const isMoved = source !== null && (typed.address !== source.address || typed.port !== source.port);
  const password = typed.password ?? '';
  const hasLogin = password !== '' || (isKept && !isMoved && typed.password !== null);
  return (
    <>
      <TextField name="name" label="Name" required />
      <div className="form" key={splits}>
        <div className="form-row source-login">
          <TextField
            name="address"
            label="Address"
            doubt={doubt('address')}
            autoComplete="off"
            spellCheck={false}
            required
          />
          <NumberField name="port" label="Port" doubt={doubt('port')} required />
        </div>
        {split && (
          <MessageBar layout="multiline" politeness="polite">
            <MessageBarBody>This can be split into its fields: {splitWords(split)}.</MessageBarBody>
            <MessageBarActions>
              <Button onClick={() => takeApart(split)}>Split it</Button>
            </MessageBarActions>
          </MessageBar>
        )}
        <TextField
          name="mountPoint"
          label="Mount point"
          doubt={doubt('mountPoint')}
          autoComplete="off"
          spellCheck={false}
          required
        />
        <div className="form-row">
          <TextField
            name="user"
            label="User"
            hint="Empty when there is no login"
            doubt={doubt('user')}
            autoComplete="off"
            spellCheck={false}
          />
          <PasswordField isKept={isKept} isMoved={isMoved} doubt={doubt('password')} />
        </div>
        {password !== '' && !typed.user && (
          <p className="source-caution">A password alone is no login: write the user too.</p>
        )}
        <FlagField name="tls" label="Encrypt the connection (TLS)" />
        {hasLogin && !typed.tls && (
          <p className="source-caution" role="status">
            Without TLS the login travels in the clear: anybody on the way can read it. Ask the operator for
            an encrypted port, and use this password for nothing else.
          </p>
        )}
      </div>
      <div className="form-row">
        <ChoiceField
          name="ntripVersion"
          label="NTRIP version"
          as="number"
          options={[
            { value: 2, label: '2 (falls back to 1)' },
            { value: 1, label: '1' },
          ]}
        />
        <ChoiceField
          name="expectedFormat"
          label="Format that the rovers expect"
          as="text"
          options={correctionFormats.map((value) => ({ value, label: correctionFormatLabels[value] }))}
        />
      </div>
      <FlagField
        name="sendPosition"
        label="Send the rover’s position"
        hint="For networks that compute a base near the rover. The operator of the network then sees where the rover is, and so where people are: tell the crews."
      />
      <ChoiceField
        name="watchMinutes"
        label="Watch: check by itself"
        as="number"
        none="Off"
        options={watchChoices(source?.watchMinutes ?? null)}
        hint="Each check is a short visit to somebody else’s machine; seldom is polite. What it finds down is said beside lost fixes."
      />
      <div className="form-row">
        <NumberField
          name="baseLatitude"
          label="Base latitude"
          hint="Until a check has read it; south is negative"
        />
        <NumberField name="baseLongitude" label="Base longitude" hint="Empty for a virtual base" />
      </div>
    </>
  );
}
