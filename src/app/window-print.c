/* What is printed: the weigh-out list and the report of the set. */
#include <string.h>

#include "app/window-private.h"
#include "core/workset/report.h"
#include "draw/paint.h"
#include "draw/report-html.h"
#include "draw/report-pages.h"
#include "draw/weigh-sheet.h"

static void
tell (EnlWindow *self, const EnlError *err)
{
  g_autofree char *message = enl_error_message (err);

  enl_window_tell (self, message);
}

/* ---- the list ---- */

/* The list as it stands now; NULL after saying why there is none. */
static const EnlWeighList *
take_list (EnlWindow *self)
{
  const char *fault;

  enl_weigh_panel_settle (self->weigh);
  const EnlWeighList *list = enl_weigh_panel_list (self->weigh, &fault);
  if (!list)
    enl_window_tell (self, fault);
  return list;
}

void
enl_window_copy_list (EnlWindow *self)
{
  const EnlWeighList *list = take_list (self);

  if (!list)
    return;
  g_autofree char *text = enl_weigh_list_text (list);
  gdk_clipboard_set_text (gtk_widget_get_clipboard (GTK_WIDGET (self)), text);
}

void
enl_window_save_list (EnlWindow *self, const char *path)
{
  const EnlWeighList *list = take_list (self);
  g_autoptr (GByteArray) bytes = NULL;
  EnlError err;

  if (!list)
    return;
  g_autoptr (GPtrArray) pages = enl_weigh_pages (list, enl_theme_get (ENL_THEME_PRINT));
  EnlStatus status = enl_pages_encode (pages, "Weigh-out", &bytes, &err);
  if (status == ENL_OK)
    status = enl_file_write (path, bytes->data, bytes->len, &err);
  if (status != ENL_OK)
    tell (self, &err);
}

/* ---- the report ---- */

/* A copy for the worker. */
typedef struct {
  EnlKnowledge *knowledge;
  EnlWorkset *set;
  char *path, *title;
} Order;

static void
order_free (Order *order)
{
  enl_knowledge_free (order->knowledge);
  enl_workset_free (order->set);
  g_free (order->path);
  g_free (order->title);
  g_free (order);
}

static EnlStatus
write_report (const Order *order, EnlError *err)
{
  const EnlTheme *theme = enl_theme_get (ENL_THEME_PRINT);
  g_autoptr (EnlReport) report = NULL;
  g_autoptr (GByteArray) bytes = NULL;
  EnlStatus status = enl_report_of_set (order->knowledge, order->set, order->title, &report, err);

  if (status != ENL_OK)
    return status;
  if (g_str_has_suffix (order->path, ".html")) {
    g_autofree char *html = NULL;
    status = enl_report_html (report, theme, &html, err);
    return status == ENL_OK ? enl_file_write (order->path, html, strlen (html), err) : status;
  }
  g_autoptr (GPtrArray) pages = enl_report_pages (report, theme);
  status = enl_pages_encode (pages, report->title, &bytes, err);
  return status == ENL_OK ? enl_file_write (order->path, bytes->data, bytes->len, err) : status;
}

static void
run_report (GTask *task, gpointer source, gpointer data, GCancellable *cancellable)
{
  EnlError err = {0};

  (void)source;
  (void)cancellable;
  if (write_report (data, &err) == ENL_OK)
    g_task_return_pointer (task, NULL, g_free);
  else
    g_task_return_pointer (task, enl_error_message (&err), g_free);
}

static void
on_report_done (GObject *source, GAsyncResult *result, gpointer data)
{
  g_autofree char *fault = g_task_propagate_pointer (G_TASK (result), NULL);
  const Order *order = g_task_get_task_data (G_TASK (result));
  g_autofree char *done = g_strdup_printf ("The report was written to %s", order->path);

  (void)data;
  if (gtk_widget_in_destruction (GTK_WIDGET (source)))
    return;
  enl_window_tell (ENL_WINDOW (source), fault ? fault : done);
}

/* With the own values that the analyses on show rest on. */
static const EnlKnowledge *
present_knowledge (EnlWindow *self)
{
  uint32_t n = enl_workset_size (enl_session_set (self->session));

  for (uint32_t i = 0; i < n; i++) {
    const EnlAnalysis *a = enl_session_outcome (self->session, i).analysis;
    if (a)
      return a->knowledge;
  }
  return enl_session_knowledge (self->session);
}

void
enl_window_save_report (EnlWindow *self, const char *path)
{
  const char *file = enl_session_path (self->session);
  g_autofree char *name = file ? g_path_get_basename (file) : g_strdup ("Unsaved set");
  g_autoptr (GTask) task = g_task_new (self, NULL, on_report_done, NULL);
  Order *order = g_new0 (Order, 1);

  if (g_str_has_suffix (name, ENL_WORKSET_SUFFIX))
    name[strlen (name) - strlen (ENL_WORKSET_SUFFIX)] = '\0';
  *order = (Order){.knowledge = enl_knowledge_ref (present_knowledge (self)),
                   .set = enl_workset_copy (enl_session_set (self->session)),
                   .path = g_strdup (path),
                   .title = g_strdup (name)};
  g_task_set_task_data (task, order, (GDestroyNotify)order_free);
  g_task_run_in_thread (task, run_report);
}

/* ---- choosing a file ---- */

typedef void (*Save) (EnlWindow *self, const char *path);

typedef struct {
  EnlWindow *window;
  Save save;
  const char *suffix; /* added where the name has none of those allowed */
  bool html;          /* .html is allowed, too */
} Choice;

static void
on_response (GtkNativeDialog *dialog, int response, Choice *choice)
{
  if (response == GTK_RESPONSE_ACCEPT) {
    g_autoptr (GFile) file = gtk_file_chooser_get_file (GTK_FILE_CHOOSER (dialog));
    g_autofree char *chosen = g_file_get_path (file);
    bool ends = chosen && (g_str_has_suffix (chosen, choice->suffix) ||
                           (choice->html && g_str_has_suffix (chosen, ".html")));
    g_autofree char *path = g_strconcat (chosen ? chosen : "", ends ? "" : choice->suffix, NULL);
    if (chosen)
      choice->save (choice->window, path);
  }
  g_free (choice);
  g_object_unref (dialog);
}

static void
choose (EnlWindow *self, const char *title, const char *name, Save save, bool html)
{
  GtkFileChooserNative *dialog = gtk_file_chooser_native_new (
      title, GTK_WINDOW (self), GTK_FILE_CHOOSER_ACTION_SAVE, "_Save", "_Cancel");
  Choice *choice = g_new0 (Choice, 1);

  *choice = (Choice){self, save, ".pdf", html};
  gtk_file_chooser_set_current_name (GTK_FILE_CHOOSER (dialog), name);
  g_signal_connect (dialog, "response", G_CALLBACK (on_response), choice);
  gtk_native_dialog_show (GTK_NATIVE_DIALOG (dialog));
}

void
enl_window_choose_list (EnlWindow *self)
{
  if (take_list (self))
    choose (self, "Save the weigh-out list", "weigh-out.pdf", enl_window_save_list, false);
}

void
enl_window_choose_report (EnlWindow *self)
{
  choose (self, "Save a report (.pdf or .html)", "report.pdf", enl_window_save_report, true);
}
