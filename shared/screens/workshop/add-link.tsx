import { Link } from '@/shared/ui/primitives/link';
import { useGo } from './use-go';

/** The way to a form, at the right of a part's heading; only for those who may. */
export function AddLink({ title, href, may }: { title: string; href: string; may: boolean }) {
  const go = useGo();
  return may ? <Link kind="small" align="right" title={title} href={href} onPress={() => go(href)} /> : null;
}
