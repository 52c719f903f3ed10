/** What the product always says of itself on a clinic screen. */
export function Caution() {
  return (
    <p>
      Supports licensed clinicians; the surgeon’s instructions and local rules come first. Not for
      emergencies.
    </p>
  );
}
