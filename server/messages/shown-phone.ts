/** The clinic's number as people of its country write it: '+12065550110' is '206-555-0110' in the United States. */
export function shownPhone(phone: string, country: string): string {
  const local = /^\+1(\d{3})(\d{3})(\d{4})$/.exec(phone);
  return country === 'US' && local ? `${local[1]}-${local[2]}-${local[3]}` : phone;
}
