/** The first stop of Tab: past the section names, to the sheet. */
export function SkipLink() {
  return (
    <a className="skip" href="#sheet">
      Skip to the sheet
    </a>
  );
}
