import type { ChangedItem } from './changed-items.ts';

/** What changed in one item, field by field: said by place and heading, never by colour alone. */
export function BeforeAfter({ item }: { readonly item: ChangedItem }) {
  return (
    <table className="my-2 w-full border border-line bg-surface text-sm">
      <caption className="py-1 text-left font-semibold">{item.title}</caption>
      <thead>
        <tr className="border-b border-line text-left">
          <th scope="col" className="px-2 py-1">
            Field
          </th>
          <th scope="col" className="px-2 py-1">
            Before
          </th>
          <th scope="col" className="px-2 py-1">
            After
          </th>
        </tr>
      </thead>
      <tbody>
        {item.fields.map((field) => (
          <tr key={field.field} className="border-b border-hair align-top">
            <th scope="row" className="px-2 py-1 text-left font-normal">
              {field.field}
            </th>
            <td className="px-2 py-1 wrap-anywhere text-ink-2">{field.before}</td>
            <td className="px-2 py-1 wrap-anywhere">{field.after}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
