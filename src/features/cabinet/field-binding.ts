import type { UseFormRegisterReturn } from 'react-hook-form';

/** A registered field with the sentence that says what is wrong with it. */
export type FieldBinding = UseFormRegisterReturn & { readonly fault: string | undefined };
