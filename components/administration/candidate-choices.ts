/** People as the choices of a list: name and address, and that somebody has not accepted their invitation yet. */
export function candidateChoices(
  people: readonly { personId: string; printedName: string; email: string; state: string }[],
): { value: string; label: string }[] {
  return people.map(({ personId, printedName, email, state }) => ({
    value: personId,
    label: `${printedName} (${email})${state === 'invited' ? ', invited' : ''}`,
  }));
}
