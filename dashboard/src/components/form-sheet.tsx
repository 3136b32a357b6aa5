import type { ReactNode } from 'react';
import type { FieldValues } from 'react-hook-form';
import type { z } from 'zod';
import { Form, type FormProps } from './form';
import { Sheet } from './sheet';

interface FormSheetProps<Schema extends z.ZodType<FieldValues, FieldValues>> extends Omit<
  FormProps<Schema>,
  'submit' | 'onCancel'
> {
  title: string;
  save: FormProps<Schema>['submit'];
  onDone: () => void;
  /** Said under the form. */
  below?: ReactNode;
}

/** A form over the page that goes away once what was written is saved. */
export function FormSheet<Schema extends z.ZodType<FieldValues, FieldValues>>(props: FormSheetProps<Schema>) {
  const { title, save, onDone, below, children, ...form } = props;
  return (
    <Sheet title={title} onClose={onDone}>
      <Form
        {...form}
        onCancel={onDone}
        submit={async (values) => {
          await save(values);
          onDone();
        }}
      >
        {children}
      </Form>
      {below}
    </Sheet>
  );
}
