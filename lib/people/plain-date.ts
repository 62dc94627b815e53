const months = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];

/** '3 Mar 2027', for a sentence to a person. */
export function plainDate(on: string): string {
  const [year, month, day] = on.split('-').map(Number);
  return `${day} ${months[(month ?? 1) - 1]} ${year}`;
}
