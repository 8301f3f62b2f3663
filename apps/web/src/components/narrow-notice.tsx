/** Sheets that need width say so on a phone, and show what they can. */
export function NarrowNotice({ what }: { what: string }) {
  return <p className="note m-3 md:hidden">{what} needs a wider screen.</p>;
}
