/** Shown for the moment until the first place's code is here. */
export function FirstLoad() {
  return (
    <p className="first-load" role="status">
      Opening…
    </p>
  );
}
