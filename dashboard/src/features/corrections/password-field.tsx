import { Button, Checkbox, Field, Input } from '@fluentui/react-components';
import { useId, useState } from 'react';
import { useController } from 'react-hook-form';

interface PasswordFieldProps {
  /** The server has one; it never comes back to a browser. */
  isKept: boolean;
  /** Address or port differ from those that it was kept for. */
  isMoved: boolean;
  doubt: string | undefined;
}

/** A password that goes in and never comes out: nothing typed leaves it as it is, null takes it away. */
export function PasswordField({ isKept, isMoved, doubt }: PasswordFieldProps) {
  const { field, fieldState } = useController({ name: 'password' });
  const [isShown, setIsShown] = useState(false);
  const hintId = useId();
  const isTakenAway = field.value === null;
  const text = typeof field.value === 'string' ? field.value : '';
  const { error } = fieldState;
  const state = error
    ? { validationState: 'error' as const, validationMessage: error.message ?? 'Not right' }
    : doubt
      ? { validationState: 'warning' as const, validationMessage: { children: doubt, role: 'status' } }
      : {};
  const hint = isMoved
    ? 'Changing address or port clears the kept one: type it again.'
    : 'One is kept and cannot be read back. Type to replace it.';
  return (
    <div className="password-field">
      <Field label="Password" {...state} {...(isKept ? { hint: { id: hintId, children: hint } } : {})}>
        <Input
          name="password"
          type={isShown ? 'text' : 'password'}
          autoComplete="new-password"
          spellCheck={false}
          disabled={isTakenAway}
          placeholder={isKept && !isMoved ? 'kept, type to replace' : undefined}
          value={text}
          onBlur={field.onBlur}
          onChange={(_, { value }) => field.onChange(value === '' ? undefined : value)}
          input={{ ref: field.ref }}
          contentAfter={
            text === '' ? undefined : (
              <Button
                appearance="transparent"
                size="small"
                aria-pressed={isShown}
                aria-label="Show the password that is being typed"
                onClick={() => setIsShown((before) => !before)}
              >
                {isShown ? 'Hide' : 'Show'}
              </Button>
            )
          }
        />
      </Field>
      {isKept && !isMoved && (
        <Checkbox
          label="Take the kept password away"
          checked={isTakenAway}
          onChange={(_, { checked }) => field.onChange(checked === true ? null : undefined)}
        />
      )}
    </div>
  );
}
