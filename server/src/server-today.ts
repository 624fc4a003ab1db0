/** Which day it is where the program runs, as `2026-12-01`. */
export function today(): string {
  const now = new Date();
  const part = (number: number, width: number): string => String(number).padStart(width, '0');
  return `${part(now.getFullYear(), 4)}-${part(now.getMonth() + 1, 2)}-${part(now.getDate(), 2)}`;
}
