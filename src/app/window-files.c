/* Files: opening, saving, and the question about unsaved changes. */
#include <string.h>

#include "app/window-private.h"
#include "core/notation/molfile.h"
#include "core/notation/read.h"

static void
tell_error (EnlWindow *self, const char *path, const EnlError *err)
{
  g_autofree char *message = enl_error_message (err);
  g_autofree char *name = g_path_get_basename (path);
  g_autofree char *text = g_strdup_printf ("%s: %s", name, message);

  enl_window_tell (self, text);
}

/* ---- opening ---- */

/* One structure a line with an optional name, or the records of an SDF: each becomes a substrate.
 */
static void
add_lines (const EnlNames *names, EnlWorkset *set, const char *text)
{
  g_auto (GStrv) line = g_strsplit (text, "\n", -1);

  for (char **l = line; *l; l++) {
    EnlListLine part;
    if (**l == '#' || !enl_read_list_line (names, *l, strlen (*l), &part))
      continue;
    bool named = part.name >= part.end;
    g_autofree char *name = g_strndup (*l + part.name, named ? part.name_end - part.name : 0);
    g_autofree char *structure = g_strndup (*l + part.start, part.end - part.start);
    if (enl_workset_insert (set, enl_workset_size (set), name, structure, NULL) != ENL_OK)
      return;
  }
}

static void
add_records (EnlWorkset *set, const char *text, size_t size)
{
  size_t offset = 0, start, length;

  while (enl_sdf_next (text, size, &offset, &start, &length)) {
    g_autofree char *block = g_strndup (text + start, length);
    g_autofree char *name = g_strndup (block, strcspn (block, "\r\n"));
    if (enl_workset_insert (set, enl_workset_size (set), g_strstrip (name), block, NULL) != ENL_OK)
      return;
  }
}

/* Appends what a structure file holds to a copy of the present set: one step of undo each. */
static void
open_structures (EnlWindow *self, const char *path)
{
  g_autofree char *text = NULL;
  g_autoptr (GError) error = NULL;
  g_autoptr (EnlWorkset) found = enl_workset_new ();
  size_t size = 0;
  EnlError err;

  if (!g_file_get_contents (path, &text, &size, &error)) {
    enl_window_tell (self, error->message);
    return;
  }
  if (memchr (text, '\0', size) || !g_utf8_validate (text, (gssize)size, NULL)) {
    enl_error_set (&err, ENL_ERROR_FORMAT, "open a list of SMILES, a molfile, an SDF or a set",
                   "this is not a text file");
    tell_error (self, path, &err);
    return;
  }
  if (strstr (text, "M  END"))
    add_records (found, text, size);
  else
    add_lines (enl_session_knowledge (self->session)->names, found, text);
  for (uint32_t i = 0; i < enl_workset_size (found); i++) {
    const EnlSubstrate *s = enl_workset_get (found, i);
    if (enl_session_add (self->session, s->name, s->text, &err) != ENL_OK) {
      tell_error (self, path, &err);
      return;
    }
  }
  if (enl_workset_size (found) == 0) {
    enl_error_set (&err, ENL_ERROR_EMPTY, "open a file with one structure a line",
                   "no structure found");
    tell_error (self, path, &err);
  }
}

/* ---- own values ---- */

/* Values of a table that was read without fault join the set: one step of undo. */
static void
join_lab (EnlWindow *self, const char *path, const EnlLab *lab)
{
  uint32_t n = enl_lab_size (lab), added = 0;
  g_autoptr (GPtrArray) entry = g_ptr_array_new_with_free_func ((GDestroyNotify)enl_lab_entry_free);
  g_autofree char *name = g_path_get_basename (path);
  EnlError err = {0};

  for (uint32_t i = 0; i < n; i++) {
    EnlLabEntry *copy = enl_lab_entry_copy (enl_lab_row (lab, i)->entry);
    copy->line = 0; /* of a file that may change */
    if (!copy->source[0]) {
      g_free (copy->source);
      copy->source = g_strdup (name);
    }
    g_ptr_array_add (entry, copy);
  }
  if (enl_session_add_lab (self->session, (EnlLabEntry *const *)entry->pdata, n, &added, &err) !=
      ENL_OK) {
    tell_error (self, path, &err);
    return;
  }
  g_autofree char *text =
      added == 0 ? g_strdup_printf ("%s: its lab values are in the set already", name)
                 : g_strdup_printf ("%s: %u lab value%s joined the set%s", name, added,
                                    added == 1 ? "" : "s",
                                    added < n ? "; the others were there already" : "");
  enl_window_tell (self, text);
  g_action_group_change_action_state (G_ACTION_GROUP (self), "lab-values",
                                      g_variant_new_boolean (TRUE));
}

static void
open_lab (EnlWindow *self, const char *path)
{
  const EnlNames *names = enl_session_knowledge (self->session)->names;
  g_autofree char *text = NULL;
  g_autoptr (GError) error = NULL;
  g_autoptr (EnlLab) lab = NULL;
  size_t size = 0;
  EnlError err = {0};

  if (!g_file_get_contents (path, &text, &size, &error))
    enl_window_tell (self, error->message);
  else if (enl_lab_parse (names, text, size, &lab, &err) != ENL_OK)
    tell_error (self, path, &err);
  else
    join_lab (self, path, lab);
}

void
enl_window_open (EnlWindow *self, const char *path)
{
  EnlError err = {0};

  if (g_str_has_suffix (path, ".tsv"))
    open_lab (self, path);
  else if (!g_str_has_suffix (path, ENL_WORKSET_SUFFIX))
    open_structures (self, path);
  else if (enl_session_open (self->session, path, &err) != ENL_OK)
    tell_error (self, path, &err);
}

/* ---- choosing ---- */

static void
add_filter (GtkFileChooser *chooser, const char *name, const char *const *pattern)
{
  g_autoptr (GtkFileFilter) filter = gtk_file_filter_new ();

  gtk_file_filter_set_name (filter, name);
  for (; *pattern; pattern++)
    gtk_file_filter_add_pattern (filter, *pattern);
  gtk_file_chooser_add_filter (chooser, filter);
}

static void
on_open_response (GtkNativeDialog *dialog, int response, EnlWindow *self)
{
  if (response == GTK_RESPONSE_ACCEPT) {
    g_autoptr (GFile) file = gtk_file_chooser_get_file (GTK_FILE_CHOOSER (dialog));
    g_autofree char *path = g_file_get_path (file);
    if (path)
      enl_window_open (self, path);
  }
  g_object_unref (dialog);
}

void
enl_window_choose_open (EnlWindow *self)
{
  static const char *const sets[] = {"*" ENL_WORKSET_SUFFIX, NULL};
  static const char *const lab[] = {"*.tsv", NULL};
  static const char *const structures[] = {"*.smi", "*.smiles", "*.mol", "*.sdf", "*.txt", NULL};
  GtkFileChooserNative *dialog = gtk_file_chooser_native_new (
      "Open", GTK_WINDOW (self), GTK_FILE_CHOOSER_ACTION_OPEN, "_Open", "_Cancel");

  add_filter (GTK_FILE_CHOOSER (dialog), "Sets", sets);
  add_filter (GTK_FILE_CHOOSER (dialog), "Structures", structures);
  add_filter (GTK_FILE_CHOOSER (dialog), "Lab values", lab);
  g_signal_connect (dialog, "response", G_CALLBACK (on_open_response), self);
  gtk_native_dialog_show (GTK_NATIVE_DIALOG (dialog));
}

#define CLOSE_KEY "enl-then-close"

static void
on_save_response (GtkNativeDialog *dialog, int response, EnlWindow *self)
{
  gboolean close = g_object_get_data (G_OBJECT (dialog), CLOSE_KEY) != NULL;

  if (response == GTK_RESPONSE_ACCEPT) {
    g_autoptr (GFile) file = gtk_file_chooser_get_file (GTK_FILE_CHOOSER (dialog));
    g_autofree char *chosen = g_file_get_path (file);
    g_autofree char *path = g_str_has_suffix (chosen, ENL_WORKSET_SUFFIX)
                                ? g_strdup (chosen)
                                : g_strconcat (chosen, ENL_WORKSET_SUFFIX, NULL);
    EnlError err;
    if (enl_session_save (self->session, path, &err) != ENL_OK)
      tell_error (self, path, &err);
    else if (close)
      gtk_window_close (GTK_WINDOW (self));
  }
  g_object_unref (dialog);
}

void
enl_window_choose_save (EnlWindow *self, gboolean then_close)
{
  GtkFileChooserNative *dialog = gtk_file_chooser_native_new (
      "Save", GTK_WINDOW (self), GTK_FILE_CHOOSER_ACTION_SAVE, "_Save", "_Cancel");

  gtk_file_chooser_set_current_name (GTK_FILE_CHOOSER (dialog), "set" ENL_WORKSET_SUFFIX);
  if (then_close)
    g_object_set_data (G_OBJECT (dialog), CLOSE_KEY, self);
  g_signal_connect (dialog, "response", G_CALLBACK (on_save_response), self);
  gtk_native_dialog_show (GTK_NATIVE_DIALOG (dialog));
}

/* ---- closing ---- */

enum { RESPONSE_DISCARD = 1, RESPONSE_SAVE };

static void
on_close_response (GtkDialog *dialog, int response, EnlWindow *self)
{
  EnlError err;

  gtk_window_destroy (GTK_WINDOW (dialog));
  if (response == RESPONSE_DISCARD) {
    self->closing = TRUE;
    gtk_window_close (GTK_WINDOW (self));
  } else if (response == RESPONSE_SAVE && !enl_session_path (self->session)) {
    enl_window_choose_save (self, TRUE);
  } else if (response == RESPONSE_SAVE) {
    if (enl_session_save (self->session, NULL, &err) != ENL_OK)
      tell_error (self, enl_session_path (self->session), &err);
    else
      gtk_window_close (GTK_WINDOW (self));
  }
}

void
enl_window_ask_close (EnlWindow *self)
{
  GtkWidget *dialog =
      gtk_message_dialog_new (GTK_WINDOW (self), GTK_DIALOG_MODAL | GTK_DIALOG_DESTROY_WITH_PARENT,
                              GTK_MESSAGE_QUESTION, GTK_BUTTONS_NONE, "Save this set?");

  gtk_message_dialog_format_secondary_text (GTK_MESSAGE_DIALOG (dialog),
                                            "It has changes that are not saved.");
  gtk_dialog_add_buttons (GTK_DIALOG (dialog), "_Discard", RESPONSE_DISCARD, "_Cancel",
                          GTK_RESPONSE_CANCEL, "_Save", RESPONSE_SAVE, NULL);
  gtk_dialog_set_default_response (GTK_DIALOG (dialog), RESPONSE_SAVE);
  g_signal_connect (dialog, "response", G_CALLBACK (on_close_response), self);
  gtk_window_present (GTK_WINDOW (dialog));
}
