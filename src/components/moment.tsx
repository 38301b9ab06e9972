import { useState } from 'react';

const dayMs = 24 * 60 * 60 * 1000;

const dates = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short', year: 'numeric' });
const times = new Intl.DateTimeFormat('en-GB', { hour: '2-digit', minute: '2-digit' });

/** A moment in few words: the time of day within the last 24 hours, else the date. */
export const sayMoment = (at: Date, now: number): string =>
  Math.abs(now - at.getTime()) < dayMs
    ? times.format(at) + (sameDay(at, now) ? '' : at.getTime() < now ? ' yesterday' : ' tomorrow')
    : dates.format(at);

const sameDay = (at: Date, now: number) => dates.format(at) === dates.format(now);

/** When something was, in this place's own time; the tooltip tells it in full. */
export function Moment({ at }: { at: string }) {
  const moment = new Date(at);
  const [now] = useState(Date.now);
  return (
    <time dateTime={at} title={`${dates.format(moment)}, ${times.format(moment)}`}>
      {sayMoment(moment, now)}
    </time>
  );
}
