import { create } from 'zustand';
import type { DraftTarget } from '../../../../shared/schemas/protocols';

/** The six states that a unitary can be followed with. */
export const followedLights = ['H', 'V', 'D', 'A', 'R', 'L'] as const;
export type FollowedLight = (typeof followedLights)[number];

/** images: where the six states go. phase: the state's phase as a flag along its path. reach: what two plates can't make. */
export type SphereOverlay = 'none' | 'images' | 'phase' | 'reach';

/** What is only in the page: which row is looked at, and where plates were turned by hand. */
interface DesignerView {
  readonly selectedId: string | null;
  /** The row whose source text is open. */
  readonly editingId: string | null;
  /** That row as it was when its source was opened, for Esc; null for a row that was not there yet. */
  readonly openedTarget: DraftTarget | null;
  /** The row whose other solutions are listed. */
  readonly solutionsOfId: string | null;
  /** Dials turned by hand on the stage, in beam order; null while they stand at the solution. */
  readonly handDialsDeg: readonly number[] | null;
  /** Of a unitary: which light is followed through the plates. */
  readonly followed: FollowedLight;
  /** What the sphere shows besides the path. */
  readonly overlay: SphereOverlay;
  readonly select: (id: string | null) => void;
  readonly openSource: (id: string, before: DraftTarget | null) => void;
  readonly closeSource: () => void;
  readonly listSolutions: (id: string | null) => void;
  readonly turnByHand: (dialsDeg: readonly number[] | null) => void;
  readonly follow: (light: FollowedLight) => void;
  readonly showOverlay: (overlay: SphereOverlay) => void;
}

export const useDesignerView = create<DesignerView>((set) => ({
  selectedId: null,
  editingId: null,
  openedTarget: null,
  solutionsOfId: null,
  handDialsDeg: null,
  followed: 'H',
  overlay: 'none',
  select: (id) =>
    set(({ selectedId, solutionsOfId, editingId }) =>
      id === selectedId
        ? {}
        : {
            selectedId: id,
            handDialsDeg: null,
            solutionsOfId: solutionsOfId === id ? id : null,
            editingId: editingId === id ? id : null,
          },
    ),
  openSource: (id, before) =>
    set({ editingId: id, openedTarget: before, selectedId: id, handDialsDeg: null }),
  closeSource: () => set({ editingId: null, openedTarget: null }),
  listSolutions: (id) => set({ solutionsOfId: id }),
  turnByHand: (dialsDeg) => set({ handDialsDeg: dialsDeg }),
  follow: (followed) => set({ followed }),
  showOverlay: (overlay) => set({ overlay }),
}));
