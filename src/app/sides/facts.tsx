/** Names and values; those without a value are left out. */
export function Facts({ facts }: { facts: readonly (readonly [name: string, value: string | null])[] }) {
  return (
    <dl className="facts">
      {facts.map(
        ([name, value]) =>
          value !== null && (
            <div key={name}>
              <dt>{name}</dt>
              <dd>{value}</dd>
            </div>
          ),
      )}
    </dl>
  );
}
