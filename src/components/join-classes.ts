/** Joins the class names that are there: `joinClasses('a', isOpen && 'b')`. */
export function joinClasses(...names: (string | false | undefined | null)[]): string {
  return names.filter(Boolean).join(' ');
}
