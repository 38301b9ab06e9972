import express from 'express';

/** More than any of these forms takes, in bytes. */
const formLimit = 4096;

/**
 * Reads the small form of a sender that is no program of ours into `request.body`, as the text it is. Comes before
 * `jsonBody`, which leaves alone what has been read.
 */
export const formBody = express.text({
  type: ['application/x-www-form-urlencoded', 'multipart/form-data'],
  limit: formLimit,
});

/** What a form says under a name; undefined where it does not say it. Urlencoded or multipart (RFC 7578) alike. */
export function fieldOf(form: string, name: string): string | undefined {
  const lines = form.split(/\r\n|\n/);
  const head = lines.findIndex((line) => /^content-disposition:/i.test(line) && line.includes(`"${name}"`));
  if (head < 0) return new URLSearchParams(form.trim()).get(name) ?? undefined;
  return lines[lines.indexOf('', head) + 1];
}
