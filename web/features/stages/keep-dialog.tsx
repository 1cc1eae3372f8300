import { zodResolver } from "@hookform/resolvers/zod";
import { useForm } from "react-hook-form";
import { z } from "zod";
import { stageName, stageNote } from "#shared/schemas/stage";
import { problemOf } from "../../lib/api";
import { Button } from "../../ui/button";
import { Dialog } from "../../ui/dialog";
import { Field, FieldError } from "../../ui/field";
import { TextArea, TextInput } from "../../ui/text-input";

const schema = z.object({ name: stageName, note: stageNote });

export type NameAndNote = z.infer<typeof schema>;

type KeepDialogProps = {
  open: boolean;
  onOpenChange: (open: boolean) => void;
  title: string;
  initial: NameAndNote;
  confirmLabel: string;
  busy: boolean;
  error: unknown;
  onConfirm: (input: NameAndNote) => void;
};

/** Asks what a stage is called and what is to be remembered of it. */
export function KeepDialog(props: KeepDialogProps) {
  return (
    <Dialog open={props.open} onOpenChange={props.onOpenChange} title={props.title}>
      <KeepForm {...props} />
    </Dialog>
  );
}

function KeepForm({ initial, confirmLabel, busy, error, onConfirm, onOpenChange }: KeepDialogProps) {
  const form = useForm<NameAndNote>({ resolver: zodResolver(schema), defaultValues: initial });
  const { errors } = form.formState;
  return (
    <form noValidate className="flex flex-col gap-4" onSubmit={form.handleSubmit(onConfirm)}>
      <Field label="Name" error={errors.name?.message}>
        <TextInput autoComplete="off" {...form.register("name")} />
      </Field>
      <Field label="Note" hint="Why this one; what to watch" error={errors.note?.message}>
        <TextArea {...form.register("note")} />
      </Field>
      {error !== null && <FieldError>{problemOf(error).detail ?? problemOf(error).title}</FieldError>}
      <div className="flex justify-end gap-3">
        <Button onClick={() => onOpenChange(false)}>Cancel</Button>
        <Button variant="main" type="submit" busy={busy}>
          {confirmLabel}
        </Button>
      </div>
    </form>
  );
}
