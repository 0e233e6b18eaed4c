/** A family's link opens its page to whoever has it; staff see only that there was one. */
export const withoutLinks = (text: string): string =>
  text.replace(/https?:\/\/\S+\/[im]\/[\w-]+/g, '[link]');
