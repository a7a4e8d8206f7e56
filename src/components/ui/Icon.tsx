import { ICONS, type IconName, type IconShape } from '@/components/brand/icons';

export type { IconName };

export interface IconProps {
  name: IconName;
  small?: boolean;
  className?: string;
}

/** One of Thrum's own icons. Decorative: the words stand beside it or in an accessible name. */
export function Icon({ name, small = false, className }: IconProps) {
  const icon: IconShape = ICONS[name];
  const classes = ['ic', small && 's', className].filter(Boolean).join(' ');
  return (
    <svg className={classes} viewBox="0 0 20 20" aria-hidden="true">
      {icon.paths.map((d) => (
        <path key={d} d={d} />
      ))}
      {icon.circles?.map(([cx, cy, r]) => (
        <circle key={`${cx} ${cy}`} cx={cx} cy={cy} r={r} />
      ))}
      {icon.dashed && <path d={icon.dashed[0]} strokeDasharray={icon.dashed[1]} />}
    </svg>
  );
}
