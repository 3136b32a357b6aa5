/** In the firm's currency, whole units. */
export const money = (amount: number, currency: string): string =>
  new Intl.NumberFormat('en-AU', { style: 'currency', currency, maximumFractionDigits: 0 }).format(amount);
