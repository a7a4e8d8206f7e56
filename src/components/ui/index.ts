/**
 * The only door to the controls. No domain knowledge in here. Import `{ Button, … } from '@/components/ui'` in React;
 * in .astro files import the .astro twins by path: ui/ButtonLink.astro, ui/Banner.astro, ui/EmptyState.astro,
 * ui/Tag.astro, ui/PageHead.astro, brand/Icon.astro, brand/Weave.astro.
 *
 * Button          kind primary|default|quiet|danger, size default|small|large, icon, iconEnd, pending, pressed + button attributes
 * IconButton      icon, label + Button props          · ButtonLink  kind, size, icon, href + a attributes
 * Icon            name, small                         · buttonClass(kind, size, extra) for anything else that looks like a button
 * Field           label, hint, error, optional, hideLabel, children(wiring)
 * TextInput       Field props, size, icon, unit + input attributes (onChange is the native event)
 * TextArea        Field props + textarea attributes   · NumberInput value|null, onChange(number|null), min, max, step
 * Select          label, options {id,label,description?,tag?,disabled?}[], value, onChange(id), labelPlace above|inside|hidden, size, full, hint, error, name
 * ComboBox        label, options, value, onChange(id|null), inputValue + onInputChange (server options), none, hint, error
 * Checkbox        label, hint, hideLabel, checked, indeterminate, onChange(checked)   · Switch the same, without indeterminate
 * RadioCards      legend, options {value,label,hint?,disabled?}[], value, onChange, name, hint, error
 * SegmentedControl label, options {value,label}[], value, onChange, full
 * Chip            children, onRemove, removeLabel, on · AddChip button attributes
 * Tag             letter, size small|default|large, name   · tagStyle(letter) → --tg, --ti
 * StatusBadge     tone moss|weld|woad|madder|plain, icon   · Avatar initials, tone, small
 * Dialog          open, onOpenChange, title, children, actions, width, role, dismissable
 * ConfirmDialog   open, onOpenChange, title, children, confirmLabel, cancelLabel, onConfirm (may be async; a throw is shown), danger, typeToConfirm
 * Menu            trigger, look default|primary|quiet|danger|select|chip, size, icon, bare, prefix, entries ({id,label,description?,icon?,shortcut?,href?,onAction?,danger?,current?,disabled?} | 'separator')[], placement
 * PopoverButton   label, trigger … as Menu, children | (close) => children, placement, isOpen, onOpenChange, width
 * Tooltip         text, children (one focusable element)
 * toast(text, {tone done|error, action {label,onAction}, timeout}); ToastRegion stands in App.astro already
 * Banner          tone caution|error|info|done|offline, title, children, actions, icon, live
 * EmptyState      title, children, actions, picture beam|settled, level   · ErrorState title, detail, children, actions
 * LoadingState    title, children, progress 0…1, onStop · ProgressBar label, value 0…1|null, onStop, valueText, look bar|weft
 * Beam            progress?                           · SkeletonTable rows, label · Skeleton width, height
 * Card            title, aside, children, level, flush, on · Stitch seam
 * PageHead        title, eyebrow, sub, actions        · Tabs label, tabs {id,label,content}[], value, onChange
 * Stepper         label, steps {label,href?}[], current · Pagination from, shown, total, onPrevious, onNext, pageSize, onPageSize, children
 * KeyHint         hints {keys[],does}[]               · cx(...names)
 *
 * Charts: '@/components/charts'. Classes for plain markup (src/styles): .row .col .sp .wrap .grow .small .micro .mut .ink2 .b .r .nw
 * .h1 .h2 .h3 .h4 .lead .fig .disp .vh .fi (filled-in score) .tbl (tables; td.r, tr.on, th > button.th-s) .tw (scroller with sticky head)
 * .ib .bar (figure with bar) .bulk .pgf .panel .sec .three .aud .kv .menu/.mi .pp/.sn (settings) .stitch (--gap) .card .note .st .chk .rad
 * Page layouts, as in the mock-ups (src/styles/pages): Brief .br .hero .at .todo .lowr .side · Map .mapgrid .stage .tools .chips .canvas .zoom .walk
 * .foot .hovc .glabel .ties .avrow .panel · Readings .rd .warp .three · Groups .gr .gcards .gcd .pf .bd · Imports .im .cmt .pvw .prob
 * People .ppl .mx · Members .mem .hd1 .tb .tw .pgf .bulk .x1 · Cases .cs(.picked) .qu .qh .qi .det .two .dec .back .choice .aud
 * App.astro: `bleed` for pages that fill the window (Map, Members, Cases).
 */
export { Banner, type BannerProps, type BannerTone } from './Banner';
export { Beam } from './Beam';
export { Button, buttonClass, type ButtonKind, type ButtonProps, type ButtonSize } from './Button';
export { ButtonLink, type ButtonLinkProps } from './ButtonLink';
export { Card, Stitch, type CardProps } from './Card';
export { Checkbox, Switch, type CheckboxProps, type SwitchProps } from './Checkbox';
export { AddChip, Chip, type ChipProps } from './Chip';
export { cx } from './classes';
export { ComboBox, type ComboBoxProps } from './ComboBox';
export { ConfirmDialog, type ConfirmDialogProps } from './ConfirmDialog';
export { Dialog, type DialogProps } from './Dialog';
export { Field, FieldNote, type FieldProps, type FieldWiring } from './Field';
export { Icon, type IconName, type IconProps } from './Icon';
export { IconButton, type IconButtonProps } from './IconButton';
export { KeyHint } from './KeyHint';
export { Menu, type MenuEntry, type MenuProps } from './Menu';
export { NumberInput, readNumber, type NumberInputProps } from './NumberInput';
export { PageHead, type PageHeadProps } from './PageHead';
export { Pagination, type PaginationProps } from './Pagination';
export { PopoverButton, type PopoverButtonProps } from './PopoverButton';
export { ProgressBar, type ProgressBarProps } from './ProgressBar';
export { RadioCards, type RadioCard, type RadioCardsProps } from './RadioCards';
export { SegmentedControl, type SegmentedControlProps } from './SegmentedControl';
export { Select, type Option, type SelectProps } from './Select';
export { Skeleton, SkeletonTable } from './Skeleton';
export {
  EmptyState,
  ErrorState,
  LoadingState,
  type ErrorStateProps,
  type LoadingStateProps,
  type StateProps,
} from './States';
export { Avatar, StatusBadge, type Tone } from './StatusBadge';
export { Stepper, type StepperProps } from './Stepper';
export { Tabs, type TabsProps } from './Tabs';
export { Tag, tagStyle, type TagProps } from './Tag';
export { TextArea, TextInput, type TextAreaProps, type TextInputProps } from './TextInput';
export { toast, ToastRegion, type ToastOptions } from './Toast';
export { Tooltip } from './Tooltip';
export type { TriggerProps } from './TriggerButton';
