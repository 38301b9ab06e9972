import { useRef, type KeyboardEvent, type PointerEvent, type RefObject } from 'react';
import { noteHz, noteName } from '../../../../../shared/listening/index.ts';
import { formatQuantity } from '../../../../../shared/quantities/index.ts';
import { joinClasses } from '../../../../components/join-classes.ts';

interface KeyCoursesProps {
  group: RefObject<HTMLDivElement | null>;
  /** Notes of one octave each, the lowest first. */
  courses: readonly (readonly number[])[];
  a4Hz: number;
  sounding: number | null;
  atHand: number;
  /** What is printed on the computer key of each step; none where letter keys do not play here. */
  caps: readonly string[];
  whyNot: (note: number) => string | null;
  onPress: (holder: string, note: number) => void;
  onRelease: (holder: string) => void;
  onLookAt: (note: number) => void;
}

const noteOf = (element: Element | null) => {
  const text = element?.closest<HTMLElement>('[data-note]')?.dataset.note;
  return text === undefined ? null : Number(text);
};

/** The holder of what Space or Enter holds. */
const byFocus = 'focus';

/** Octaves of notes as courses of stones, the highest on top: each is pressed and let go like a key. */
export function KeyCourses({
  group,
  courses,
  a4Hz,
  sounding,
  atHand,
  caps,
  whyNot,
  onPress,
  onRelease,
  onLookAt,
}: KeyCoursesProps) {
  const notes = courses.flat();
  const first = notes[0];
  const last = notes[notes.length - 1];
  const stop = notes.includes(atHand) ? atHand : first;
  const isHeldByKey = useRef(false);
  const under = useRef(new Map<number, number>());

  const down = (event: PointerEvent<HTMLDivElement>) => {
    const note = noteOf(event.target as Element);
    if (note === null || event.button !== 0) return;
    // The pointer stays the group's, so that it can slide from one stone to the next and be let go anywhere.
    event.currentTarget.setPointerCapture(event.pointerId);
    under.current.set(event.pointerId, note);
    onPress(`pointer ${event.pointerId}`, note);
  };
  const move = (event: PointerEvent<HTMLDivElement>) => {
    const before = under.current.get(event.pointerId);
    if (before === undefined) return;
    const stone = document.elementFromPoint(event.clientX, event.clientY);
    const note = event.currentTarget.contains(stone) ? noteOf(stone) : null;
    if (note === null || note === before) return;
    under.current.set(event.pointerId, note);
    onPress(`pointer ${event.pointerId}`, note);
  };
  const up = (event: PointerEvent<HTMLDivElement>) => {
    if (under.current.delete(event.pointerId)) onRelease(`pointer ${event.pointerId}`);
  };

  const walk = (note: number) => {
    const goal = Math.min(last, Math.max(first, note));
    onLookAt(goal);
    group.current?.querySelector<HTMLElement>(`[data-note="${goal}"]`)?.focus();
    if (isHeldByKey.current) onPress(byFocus, goal);
  };
  const keyDown = (event: KeyboardEvent) => {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    const here = noteOf(event.target as Element) ?? stop;
    const goal = {
      ArrowRight: here + 1,
      ArrowLeft: here - 1,
      ArrowUp: here + 12 <= last ? here + 12 : here,
      ArrowDown: here - 12 >= first ? here - 12 : here,
      Home: first,
      End: last,
    }[event.key];
    if (goal !== undefined) {
      event.preventDefault();
      walk(goal);
    } else if (event.key === ' ' || event.key === 'Enter') {
      event.preventDefault();
      if (event.repeat) return;
      isHeldByKey.current = true;
      onPress(byFocus, here);
    }
  };
  const letGo = () => {
    if (!isHeldByKey.current) return;
    isHeldByKey.current = false;
    onRelease(byFocus);
  };

  return (
    <div
      ref={group}
      role="group"
      aria-label={`Notes ${noteName(first)} to ${noteName(last)}`}
      className="key-courses"
      onPointerDown={down}
      onPointerMove={move}
      onPointerUp={up}
      onPointerCancel={up}
      onLostPointerCapture={up}
      onContextMenu={(event) => event.preventDefault()}
      onKeyDown={keyDown}
      onKeyUp={(event) => {
        if (event.key === ' ' || event.key === 'Enter') letGo();
      }}
      onBlur={(event) => {
        if (!event.currentTarget.contains(event.relatedTarget)) letGo();
      }}
    >
      {courses.toReversed().map((course) => (
        <div key={course[0]} className="key-course">
          {course.map((note) => {
            const reason = whyNot(note);
            const name = noteName(note);
            const cap = caps[note - first];
            return (
              <button
                key={note}
                type="button"
                data-note={note}
                className={joinClasses('key-stone', name.includes('#') && 'key-stone-sharp')}
                aria-label={`${name}, ${formatQuantity(noteHz(note, a4Hz), 'Hz', { significant: 5 })}`}
                aria-pressed={note === sounding}
                aria-disabled={reason !== null || undefined}
                aria-description={reason ?? undefined}
                title={reason ?? undefined}
                tabIndex={note === stop ? 0 : -1}
              >
                <span>{name}</span>
                {cap !== undefined && (
                  <kbd className="key-stone-cap" aria-hidden="true">
                    {cap}
                  </kbd>
                )}
              </button>
            );
          })}
        </div>
      ))}
    </div>
  );
}
