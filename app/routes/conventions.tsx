import { Leaf } from "#app/ui/Leaf.tsx";

export default function ConventionsPage() {
  return (
    <Leaf heading="Conventions" section="conventions">
      …
    </Leaf>
  );
}
