const local = new Intl.DateTimeFormat('en-GB', {
  day: 'numeric',
  month: 'short',
  year: 'numeric',
  hour: '2-digit',
  minute: '2-digit',
  timeZoneName: 'short',
});

/** A moment in the reader's zone and in UTC, since people of several zones read one record. */
export function Moment({ at }: { readonly at: string }) {
  const date = new Date(/[Z+]/.test(at) ? at : `${at.replace(' ', 'T')}Z`);
  return (
    <time dateTime={date.toISOString()} className="whitespace-nowrap">
      {local.format(date)}{' '}
      <span className="num text-ink-2">({date.toISOString().slice(0, 16).replace('T', ' ')}Z)</span>
    </time>
  );
}
