export { CheckField, Choice, ChoiceField } from './choices';
export { Field } from './field';
export { AreaField, NumberField, type Option, PasswordField, SelectField, TextField } from './fields';
export { FieldGroup, FieldRow, Form } from './form';
export { LengthField } from './length-field';
export { useZodForm, type ZodForm } from './use-zod-form';
