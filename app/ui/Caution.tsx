/** The caution that stands wherever heats of reaction or reactions are shown. */
export function Caution() {
  return (
    <aside className="caution" aria-label="Caution">
      <b>Caution.</b> Standard-state tables describe the equilibrium of pure substances: not speed, not real mixtures,
      not safety. Where heat or gas is set free, or an oxidiser meets a fuel, calorimetry and a process-safety review by
      qualified people come before anyone scales anything up; local codes and licensed practice decide.
    </aside>
  );
}
