import { Button } from '@/components/ui/button';

export function Pager({
  page,
  pageSize,
  total,
  onPage,
}: {
  readonly page: number;
  readonly pageSize: number;
  readonly total: number;
  readonly onPage: (page: number) => void;
}) {
  const last = Math.max(1, Math.ceil(total / pageSize));
  if (last === 1) return null;
  return (
    <nav aria-label="Pages" className="flex items-center justify-center gap-3">
      <Button disabled={page <= 1} onClick={() => onPage(page - 1)}>
        Earlier
      </Button>
      <span className="figures text-sm">
        {page} / {last}
      </span>
      <Button disabled={page >= last} onClick={() => onPage(page + 1)}>
        Later
      </Button>
    </nav>
  );
}
