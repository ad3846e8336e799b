/** Days that something deleted can be brought back. The triggers of the versions hold the same number. */
export const KEPT_DAYS = 30;

export interface DeletedPresetsBody {
  items: {
    id: string;
    title: string;
    owner: string;
    deletedAt: string;
    /** When it goes for good. */
    goneAt: string;
  }[];
}
