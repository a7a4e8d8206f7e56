import { useState } from 'react';
import { Button, Checkbox, ConfirmDialog, Dialog, Menu, Select, TextInput, toast } from '@/components/ui';
import { ApiError, sendJson } from '@/lib/api';
import { formatDate } from '@/lib/format';
import type { ImportOptions } from '../../imports';
import type { RecipeView } from '../../recipes';

export interface Recipes {
  readonly items: readonly RecipeView[];
  readonly latest: { readonly takenOn: string; readonly options: ImportOptions } | null;
}

const NONE = 'none';
const LATEST = 'latest';
const words = (error: unknown): string =>
  error instanceof ApiError ? error.problem.detail : 'That could not be saved. Try again.';

/** The recipe that the columns and choices began with; saving, changing and sharing recipes. */
export function RecipeBar({
  communityId,
  recipes,
  chosen,
  options,
  onChoose,
  onRecipes,
}: {
  communityId: string;
  recipes: Recipes;
  chosen: string;
  /** The choices as they stand, to be saved. */
  options: () => Partial<ImportOptions>;
  onChoose: (id: string, options: ImportOptions | null) => void;
  onRecipes: (recipes: Recipes) => void;
}) {
  const [asking, setAsking] = useState<'save' | 'delete' | null>(null);
  const own = recipes.items.find((one) => one.id === chosen && one.mine);
  const replace = (next: RecipeView): void =>
    onRecipes({ ...recipes, items: [...recipes.items.filter((one) => one.id !== next.id), next] });
  const change = async (body: object, done: string): Promise<void> => {
    try {
      replace(await sendJson<RecipeView>('PATCH', `/api/v1/recipes/${own!.id}`, body));
      toast(done);
    } catch (error) {
      toast(words(error), { tone: 'error' });
    }
  };
  return (
    <div className="row wrap" style={{ gap: 10 }}>
      <Select
        label="Recipe"
        labelPlace="inside"
        size="small"
        value={chosen}
        onChange={(id) =>
          onChoose(
            id,
            id === LATEST
              ? (recipes.latest?.options ?? null)
              : (recipes.items.find((one) => one.id === id)?.options ?? null),
          )
        }
        options={[
          ...(recipes.latest
            ? [{ id: LATEST, label: `Remembered from ${formatDate(recipes.latest.takenOn)}` }]
            : []),
          ...recipes.items.map((one) => ({
            id: one.id,
            label: one.name,
            description: one.mine ? (one.shared ? 'Yours, shared' : 'Yours') : 'Shared with you',
          })),
          { id: NONE, label: 'None: guess anew' },
        ]}
      />
      <Button size="small" kind="quiet" onClick={() => setAsking('save')}>
        Save as a recipe
      </Button>
      {own && (
        <Menu
          label={`Recipe ${own.name}`}
          trigger="Change recipe"
          size="small"
          look="quiet"
          entries={[
            {
              id: 'update',
              label: 'Replace with these choices',
              onAction: () => void change({ options: options() }, `${own.name} was changed`),
            },
            {
              id: 'share',
              label: own.shared ? 'Stop sharing' : 'Share in the workspace',
              onAction: () =>
                void change(
                  { shared: !own.shared },
                  own.shared ? 'No longer shared' : 'Shared in the workspace',
                ),
            },
            'separator',
            { id: 'delete', label: 'Delete…', danger: true, onAction: () => setAsking('delete') },
          ]}
        />
      )}
      {asking === 'save' && (
        <SaveDialog
          communityId={communityId}
          options={options}
          onClose={() => setAsking(null)}
          onSaved={(recipe) => {
            replace(recipe);
            setAsking(null);
            onChoose(recipe.id, recipe.options);
            toast(`${recipe.name} was saved`);
          }}
        />
      )}
      {own && (
        <ConfirmDialog
          open={asking === 'delete'}
          onOpenChange={(open) => setAsking(open ? 'delete' : null)}
          title={`Delete ${own.name}?`}
          confirmLabel="Delete"
          danger
          onConfirm={async () => {
            await sendJson('DELETE', `/api/v1/recipes/${own.id}`);
            onRecipes({ ...recipes, items: recipes.items.filter((one) => one.id !== own.id) });
            onChoose(NONE, null);
          }}
        >
          Imports that were made with it stay as they are.
        </ConfirmDialog>
      )}
    </div>
  );
}

function SaveDialog({
  communityId,
  options,
  onClose,
  onSaved,
}: {
  communityId: string;
  options: () => Partial<ImportOptions>;
  onClose: () => void;
  onSaved: (recipe: RecipeView) => void;
}) {
  const [name, setName] = useState('');
  const [shared, setShared] = useState(false);
  const [pending, setPending] = useState(false);
  const [problem, setProblem] = useState<string | null>(null);
  const save = async (): Promise<void> => {
    setPending(true);
    try {
      onSaved(
        await sendJson<RecipeView>('POST', `/api/v1/communities/${communityId}/recipes`, {
          name,
          shared,
          options: options(),
        }),
      );
    } catch (error) {
      setPending(false);
      setProblem(words(error));
    }
  };
  return (
    <Dialog
      open
      onOpenChange={(open) => !open && onClose()}
      title="Save as a recipe"
      actions={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button kind="primary" disabled={!name.trim()} pending={pending} onClick={() => void save()}>
            Save
          </Button>
        </>
      }
    >
      <div className="col" style={{ gap: 12 }}>
        <p className="small mut">Keeps the matching of columns and all choices, not the files.</p>
        <TextInput
          label="Name"
          value={name}
          maxLength={120}
          autoFocus
          error={problem ?? undefined}
          onChange={(event) => setName(event.target.value)}
        />
        <Checkbox
          label="Share in the workspace"
          hint="Everyone who imports can use it; only you change it."
          checked={shared}
          onChange={setShared}
        />
      </div>
    </Dialog>
  );
}
