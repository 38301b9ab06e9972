/** Whose account is gone keeps no name here; the audit trail has it. */
export const presentPerson = (id: number | null, name: string | null) => ({
  id,
  name: name ?? 'Somebody who has left',
});
