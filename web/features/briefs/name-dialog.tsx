import { zodResolver } from "@hookform/resolvers/zod";
import { useId } from "react";
import { useForm } from "react-hook-form";
import { z } from "zod";
import { briefName } from "#shared/schemas/brief";
import { Button } from "../../ui/button";
import { Dialog } from "../../ui/dialog";
import { Field, FieldError } from "../../ui/field";
import { TextInput } from "../../ui/text-input";

const schema = z.object({ name: briefName });

type NameDialogProps = {
  open: boolean;
  onOpenChange: (open: boolean) => void;
  title: string;
  initial: string;
  confirmLabel: string;
  busy: boolean;
  error: string | null;
  onConfirm: (name: string) => void;
};

/** Asks for a brief's name. */
export function NameDialog(props: NameDialogProps) {
  const { open, onOpenChange, title } = props;
  return (
    <Dialog open={open} onOpenChange={onOpenChange} title={title}>
      <NameForm {...props} />
    </Dialog>
  );
}

function NameForm({ initial, confirmLabel, busy, error, onConfirm, onOpenChange }: NameDialogProps) {
  const formId = useId();
  const form = useForm({ resolver: zodResolver(schema), defaultValues: { name: initial } });
  return (
    <form
      id={formId}
      noValidate
      className="flex flex-col gap-4"
      onSubmit={form.handleSubmit(({ name }) => onConfirm(name))}
    >
      <Field label="Name" hint="Such as: Hydrophone first stage" error={form.formState.errors.name?.message}>
        <TextInput autoComplete="off" {...form.register("name")} />
      </Field>
      {error && <FieldError>{error}</FieldError>}
      <div className="flex justify-end gap-3">
        <Button onClick={() => onOpenChange(false)}>Cancel</Button>
        <Button variant="main" type="submit" busy={busy}>
          {confirmLabel}
        </Button>
      </div>
    </form>
  );
}
