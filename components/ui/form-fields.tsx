import { useController, type Control, type FieldPath, type FieldValues } from 'react-hook-form';
import { Choice, type ChoiceProps } from './choice.tsx';
import { NumberField, type NumberFieldProps } from './number-field.tsx';
import { TextField, type TextFieldProps } from './text-field.tsx';
import { Tick, type TickProps } from './tick.tsx';

/** The controls of ui/ bound to a field of a react-hook-form, errors and focus included. */
type Bound<T extends FieldValues, Out> = { readonly control: Control<T, unknown, Out>; readonly name: FieldPath<T> };

type Own = 'value' | 'onChange' | 'onBlur' | 'error' | 'name' | 'ref';

/** What a field's control is handed, and its value, which each control reads in its own way. */
function useField<T extends FieldValues, Out>({ control, name }: Bound<T, Out>) {
  const { field, fieldState } = useController({ control, name });
  const { value, ref, onChange, onBlur } = field;
  const own = { ref, name: field.name, onChange, onBlur, error: fieldState.error?.message };
  return { value: value as unknown, own }; // its type follows from the name, and is the control's to check
}

const textOf = (value: unknown) => (typeof value === 'string' ? value : '');
const numberOf = (value: unknown) => (typeof value === 'number' ? value : null);

export function FormText<T extends FieldValues, Out>({
  control,
  name,
  ...rest
}: Bound<T, Out> & Omit<TextFieldProps, Own>) {
  const { value, own } = useField({ control, name });
  return <TextField {...rest} {...own} value={textOf(value)} />;
}

export function FormNumber<T extends FieldValues, Out>({
  control,
  name,
  ...rest
}: Bound<T, Out> & Omit<NumberFieldProps, Own>) {
  const { value, own } = useField({ control, name });
  return <NumberField {...rest} {...own} value={numberOf(value)} />;
}

/** Plate thickness: typed as a length, kept in whole micrometres. */
export function FormThickness<T extends FieldValues, Out>({
  control,
  name,
  ...rest
}: Bound<T, Out> & Omit<NumberFieldProps, Own | 'dimension'>) {
  const { value, own } = useField({ control, name });
  return <ThicknessField {...rest} {...own} value={numberOf(value)} />;
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
  const { value, own } = useField({ control, name });
  return <Choice {...rest} {...own} value={rest.options.find((option) => option.value === value)?.value ?? null} />;
}

export function FormTick<T extends FieldValues, Out>({
  control,
  name,
  ...rest
}: Bound<T, Out> & Pick<TickProps, 'label' | 'hint' | 'disabled'>) {
  const { value, own } = useField({ control, name });
  const { ref, onChange, onBlur, error } = own;
  return <Tick {...rest} {...{ ref, onChange, onBlur, error }} checked={value === true} />;
}
