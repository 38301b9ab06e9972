import { revisionNumberField } from '../../shared/contract/index.ts';

/** A revision's number in an address; what cannot be one names nothing. */
export const numberOf = (text: string): number | undefined => revisionNumberField.safeParse(text).data;
