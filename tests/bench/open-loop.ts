import { Agent, get, type IncomingMessage } from 'node:http';
import { setTimeout as delay } from 'node:timers/promises';

export interface PacedRequest {
  readonly url: string;
  readonly cookie: string;
}

/**
 * Sends so many requests a second for so many seconds, whether earlier ones are answered or not, and answers how long
 * each took from the moment it was due, in ms. A stall so counts for all who would have met it.
 */
export async function sendPaced(
  nextRequest: () => PacedRequest,
  { perSecond, seconds }: { perSecond: number; seconds: number },
): Promise<number[]> {
  // Idle connections end here before they do there: a request on one that is just ending would fail.
  const agent = new Agent({ keepAlive: true, maxSockets: 64, timeout: 3000 });
  const start = performance.now();
  const sent: Promise<number>[] = [];
  for (let index = 0; index < perSecond * seconds; index += 1) {
    const due = start + (1000 * index) / perSecond;
    await delay(Math.max(0, due - performance.now()));
    const answer = answered(nextRequest(), agent).then(() => performance.now() - due);
    // Reported below, with all the others.
    answer.catch(() => {});
    sent.push(answer);
  }
  const latencies = await Promise.all(sent);
  agent.destroy();
  return latencies;
}

/** Waits for the whole answer; as a browser does, the request takes it packed. */
const answered = ({ url, cookie }: PacedRequest, agent: Agent) =>
  new Promise<void>((resolve, reject) => {
    get(
      url,
      { agent, headers: { Cookie: cookie, 'Accept-Encoding': 'gzip' } },
      (response: IncomingMessage) => {
        response.resume().once('error', reject);
        response.once('end', () =>
          response.statusCode === 200
            ? resolve()
            : reject(new Error(`${url} answered ${response.statusCode}`)),
        );
      },
    ).once('error', reject);
  });
