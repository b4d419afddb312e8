import { Controller, type Control, type FieldPath, type FieldValues } from 'react-hook-form';
import { Choice, type ChoiceProps } from './choice.tsx';
import { NumberField, type NumberFieldProps } from './number-field.tsx';
import { TextField, type TextFieldProps } from './text-field.tsx';
import { Tick } from './tick.tsx';

/** The controls of ui/ bound to a field of a react-hook-form, errors and focus included. */
type Bound<T extends FieldValues, Out> = { readonly control: Control<T, unknown, Out>; readonly name: FieldPath<T> };

type Own = 'value' | 'onChange' | 'onBlur' | 'error' | 'name' | 'ref';

export function FormText<T extends FieldValues, Out>({
  control,
  name,
  ...rest
}: Bound<T, Out> & Omit<TextFieldProps, Own>) {
  return (
    <Controller
      control={control}
      name={name}
      render={({ field, fieldState }) => (
        <TextField
          {...rest}
          ref={field.ref}
          name={field.name}
          value={typeof field.value === 'string' ? field.value : ''}
          onChange={field.onChange}
          onBlur={field.onBlur}
          error={fieldState.error?.message}
        />
      )}
    />
  );
}

export function FormNumber<T extends FieldValues, Out>({
  control,
  name,
  ...rest
}: Bound<T, Out> & Omit<NumberFieldProps, Own>) {
  return (
    <Controller
      control={control}
      name={name}
      render={({ field, fieldState }) => (
        <NumberField
          {...rest}
          ref={field.ref}
          name={field.name}
          value={typeof field.value === 'number' ? field.value : null}
          onChange={field.onChange}
          onBlur={field.onBlur}
          error={fieldState.error?.message}
        />
      )}
    />
  );
}

/** Plate thickness: typed as a length, kept in whole micrometres. */
export function FormThickness<T extends FieldValues, Out>({
  control,
  name,
  ...rest
}: Bound<T, Out> & Omit<NumberFieldProps, Own | 'dimension'>) {
  return (
    <Controller
      control={control}
      name={name}
      render={({ field, fieldState }) => (
        <ThicknessField
          {...rest}
          ref={field.ref}
          name={field.name}
          value={typeof field.value === 'number' ? field.value : null}
          onChange={field.onChange}
          onBlur={field.onBlur}
          error={fieldState.error?.message}
        />
      )}
    />
  );
}

/** The same outside a form: micrometres in and out. */
export function ThicknessField({ value, onChange, ...rest }: Omit<NumberFieldProps, 'dimension'>) {
  return (
    <NumberField
      {...rest}
      dimension="length"
      value={value === null ? null : value * 1e-6}
      onChange={(metres) => onChange(metres === null ? null : Math.round(metres * 1e6))}
    />
  );
}

export function FormChoice<T extends FieldValues, Out, V extends string>({
  control,
  name,
  ...rest
}: Bound<T, Out> & Omit<ChoiceProps<V>, Own>) {
  return (
    <Controller
      control={control}
      name={name}
      render={({ field, fieldState }) => (
        <Choice
          {...rest}
          ref={field.ref}
          name={field.name}
          value={rest.options.find((option) => option.value === field.value)?.value ?? null}
          onChange={field.onChange}
          onBlur={field.onBlur}
          error={fieldState.error?.message}
        />
      )}
    />
  );
}

export function FormTick<T extends FieldValues, Out>({
  control,
  name,
  label,
  hint,
  disabled,
}: Bound<T, Out> & { readonly label: string; readonly hint?: string; readonly disabled?: boolean }) {
  return (
    <Controller
      control={control}
      name={name}
      render={({ field, fieldState }) => (
        <Tick
          label={label}
          hint={hint}
          disabled={disabled}
          ref={field.ref}
          checked={field.value === true}
          onChange={field.onChange}
          onBlur={field.onBlur}
          error={fieldState.error?.message}
        />
      )}
    />
  );
}
