import { create } from 'zustand';

/** What is only in the page: which row is looked at, and where plates were turned by hand. */
interface DesignerView {
  readonly selectedId: string | null;
  /** The row whose source text is open. */
  readonly editingId: string | null;
  /** The row whose other solutions are listed. */
  readonly solutionsOfId: string | null;
  /** Dials turned by hand on the stage, in beam order; null while they stand at the solution. */
  readonly handDialsDeg: readonly number[] | null;
  readonly select: (id: string | null) => void;
  readonly openSource: (id: string | null) => void;
  readonly listSolutions: (id: string | null) => void;
  readonly turnByHand: (dialsDeg: readonly number[] | null) => void;
}

export const useDesignerView = create<DesignerView>((set) => ({
  selectedId: null,
  editingId: null,
  solutionsOfId: null,
  handDialsDeg: null,
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
  openSource: (id) =>
    set(id === null ? { editingId: null } : { editingId: id, selectedId: id, handDialsDeg: null }),
  listSolutions: (id) => set({ solutionsOfId: id }),
  turnByHand: (dialsDeg) => set({ handDialsDeg: dialsDeg }),
}));
