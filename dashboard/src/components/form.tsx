import { Button, MessageBar, MessageBarBody } from '@fluentui/react-components';
import { zodResolver } from '@hookform/resolvers/zod';
import { useState, type ReactNode } from 'react';
import { FormProvider, useForm, type DefaultValues, type FieldValues, type Resolver } from 'react-hook-form';
import type { z } from 'zod';
import { showFieldErrors } from '../lib/form-errors';
import './form.css';

export interface FormProps<Schema extends z.ZodType<FieldValues, FieldValues>> {
  schema: Schema;
  defaults: DefaultValues<z.input<Schema>>;
  submit: (values: z.output<Schema>) => Promise<unknown>;
  button: string;
  children: ReactNode;
  onCancel?: () => void;
}

/** A form by a contract's schema: checks before sending, shows the server's refusals beside their fields, keeps what was typed. */
export function Form<Schema extends z.ZodType<FieldValues, FieldValues>>(props: FormProps<Schema>) {
  const { schema, defaults, submit, button, children, onCancel } = props;
  const resolver = zodResolver(schema) as unknown as Resolver;
  const form = useForm({ resolver, defaultValues: defaults as FieldValues });
  const [problem, setProblem] = useState<string | null>(null);
  const send = form.handleSubmit(async (values) => {
    setProblem(null);
    try {
      await submit(values as z.output<Schema>);
    } catch (error) {
      setProblem(showFieldErrors(form, error as Error));
    }
  });
  return (
    <FormProvider {...form}>
      <form className="form" noValidate onSubmit={(event) => void send(event)}>
        {children}
        {problem && (
          <MessageBar intent="error">
            <MessageBarBody>{problem}</MessageBarBody>
          </MessageBar>
        )}
        <div className="form-buttons">
          <Button appearance="primary" type="submit" disabled={form.formState.isSubmitting}>
            {button}
          </Button>
          {onCancel && <Button onClick={onCancel}>Cancel</Button>}
        </div>
      </form>
    </FormProvider>
  );
}
