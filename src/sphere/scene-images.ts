import type { SceneLabel, SceneMark, SphereImage } from './scene';

/** The sign of an image: the reference state's letter with a prime. */
export function imageLabel(label: string): string {
  return `${label}′`;
}

/** A small reticle where each reference state should go and a small lit dot where it goes; nothing joins the two. */
export function imageMarks(images: readonly SphereImage[]): {
  marks: readonly SceneMark[];
  labels: readonly SceneLabel[];
} {
  return {
    marks: [
      ...images.map(({ wanted }, index): SceneMark => ({
        id: `wanted-${index}`,
        kind: 'wanted',
        at: wanted,
      })),
      ...images.map(({ reached }, index): SceneMark => ({
        id: `image-${index}`,
        kind: 'image',
        at: reached,
      })),
    ],
    labels: images.map(({ label, reached }, index): SceneLabel => ({
      id: `image-${index}`,
      role: 'image',
      text: imageLabel(label),
      at: [reached],
    })),
  };
}
