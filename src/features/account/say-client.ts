/** Names that most browsers carry for the sake of old servers (RFC 9110 §10.1.5 advises against it). */
const carriedByMost = new Set(['Mozilla', 'AppleWebKit', 'Gecko', 'Version', 'Mobile', 'Safari']);

/** What a browser calls itself (User-Agent), without its versions: `Firefox, X11; Linux x86_64`. */
export function sayClient(client: string): string {
  const products = [...client.matchAll(/([A-Za-z]+)\/\d/g)].map(([, name]) => name);
  const own = products.filter((name) => !carriedByMost.has(name)).at(-1) ?? products.at(-1);
  const system = /\(([^)]+)\)/.exec(client)?.[1];
  return [own ?? client, system].filter(Boolean).join(', ');
}
