#include "app/application.h"

#include <stdio.h>

#include "app/window.h"
#include "resources/model.h"

struct _EnlApplication {
  GtkApplication parent;
  EnlKnowledge *knowledge;
};

G_DEFINE_FINAL_TYPE (EnlApplication, enl_application, GTK_TYPE_APPLICATION)

#define FIRST_SET_RESOURCE "/org/enolith/Enolith/first-set.enolith"

static EnlWindow *
new_window (EnlApplication *self)
{
  return enl_window_new (GTK_APPLICATION (self), self->knowledge);
}

/* A first start shows a worked set instead of an empty window. */
static void
show_first_set (EnlWindow *window)
{
  g_autoptr (GBytes) bytes = g_resources_lookup_data (FIRST_SET_RESOURCE, 0, NULL);
  EnlWorkset *set = NULL;
  size_t size = 0;
  const char *text;

  g_assert (bytes);
  text = g_bytes_get_data (bytes, &size);
  if (enl_workset_parse (text, size, &set, NULL) == ENL_OK)
    enl_session_replace (enl_window_session (window), set, NULL);
}

static void
enl_application_activate (GApplication *application)
{
  EnlWindow *window = new_window (ENL_APPLICATION (application));

  show_first_set (window);
  gtk_window_present (GTK_WINDOW (window));
}

static void
enl_application_open (GApplication *application, GFile **file, int n, const char *hint)
{
  EnlWindow *window = new_window (ENL_APPLICATION (application));

  (void)hint;
  gtk_window_present (GTK_WINDOW (window));
  for (int i = 0; i < n; i++) {
    g_autofree char *path = g_file_get_path (file[i]);
    if (path)
      enl_window_open (window, path);
  }
}

static void
act_new_window (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  EnlWindow *window = new_window (data);
  EnlSession *session = enl_window_session (window);

  (void)action;
  (void)parameter;
  if (enl_session_add (session, "", "", NULL) == ENL_OK)
    enl_session_replace (session, enl_workset_copy (enl_session_set (session)), NULL);
  gtk_window_present (GTK_WINDOW (window));
}

static void
act_about (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  EnlApplication *self = data;

  (void)action;
  (void)parameter;
  gtk_show_about_dialog (
      gtk_application_get_active_window (GTK_APPLICATION (self)), "program-name", "Enolith",
      "version", ENL_VERSION, "comments",
      "Which hydrogen comes off first, and which base takes it off.\n\nEnolith estimates acidity "
      "only. Reactivity, quantities, equipment and safety are to be decided under local rules by a "
      "qualified person.",
      "license-type", GTK_LICENSE_GPL_3_0, "logo-icon-name", "org.enolith.Enolith", NULL);
}

static void
act_quit (GSimpleAction *action, GVariant *parameter, gpointer data)
{
  GList *windows = g_list_copy (gtk_application_get_windows (data));

  (void)action;
  (void)parameter;
  for (GList *w = windows; w; w = w->next)
    gtk_window_close (w->data);
  g_list_free (windows);
}

static const GActionEntry entry[] = {
    {"new-window", act_new_window, NULL, NULL, NULL, {0}},
    {"about", act_about, NULL, NULL, NULL, {0}},
    {"quit", act_quit, NULL, NULL, NULL, {0}},
};

static void
add_accelerators (GtkApplication *app)
{
  static const struct {
    const char *action;
    const char *key[2];
  } accel[] = {
      {"win.add", {"<Control>t", NULL}},
      {"win.new", {"<Control>n", NULL}},
      {"win.open", {"<Control>o", NULL}},
      {"win.detail::forms", {"<Control>r", NULL}},
      {"win.detail::why", {"<Control>e", NULL}},
      {"win.detail::curve", {"<Control>k", NULL}},
      {"win.matrix", {"<Control>b", NULL}},
      {"win.detail::weigh", {"<Control>g", NULL}},
      {"win.save", {"<Control>s", NULL}},
      {"win.save-as", {"<Control><Shift>s", NULL}},
      {"win.projector", {"F5", NULL}},
      {"win.structure-line", {"<Control>l", NULL}},
      {"win.lab-values", {"<Control>m", NULL}},
      {"app.quit", {"<Control>q", NULL}},
      {"win.solvent::dmso", {"<Control>1", NULL}},
      {"win.solvent::water", {"<Control>2", NULL}},
      {"win.solvent::thf", {"<Control>3", NULL}},
  };

  for (size_t i = 0; i < ENL_COUNT (accel); i++)
    gtk_application_set_accels_for_action (app, accel[i].action, accel[i].key);
}

static void
load_style (void)
{
  g_autoptr (GtkCssProvider) css = gtk_css_provider_new ();

  gtk_css_provider_load_from_resource (css, "/org/enolith/Enolith/style.css");
  gtk_style_context_add_provider_for_display (gdk_display_get_default (), GTK_STYLE_PROVIDER (css),
                                              GTK_STYLE_PROVIDER_PRIORITY_APPLICATION);
}

static void
enl_application_startup (GApplication *application)
{
  EnlApplication *self = ENL_APPLICATION (application);
  EnlError err = {0};
  size_t size;
  const char *model = enl_model ("model.bin", &size);

  G_APPLICATION_CLASS (enl_application_parent_class)->startup (application);
  if (enl_knowledge_open (model, size, &self->knowledge, &err) != ENL_OK) {
    g_autofree char *message = enl_error_message (&err);
    /* only a broken build can get here: there is nothing to show without the tables */
    g_error ("the program's own tables are damaged: %s", message);
  }
  gtk_window_set_default_icon_name ("org.enolith.Enolith");
  load_style ();
  g_action_map_add_action_entries (G_ACTION_MAP (self), entry, G_N_ELEMENTS (entry), self);
  add_accelerators (GTK_APPLICATION (self));
}

static void
enl_application_finalize (GObject *object)
{
  enl_knowledge_free (ENL_APPLICATION (object)->knowledge);
  G_OBJECT_CLASS (enl_application_parent_class)->finalize (object);
}

static void
enl_application_class_init (EnlApplicationClass *klass)
{
  GApplicationClass *application_class = G_APPLICATION_CLASS (klass);

  G_OBJECT_CLASS (klass)->finalize = enl_application_finalize;
  application_class->startup = enl_application_startup;
  application_class->activate = enl_application_activate;
  application_class->open = enl_application_open;
}

static void
enl_application_init (EnlApplication *self)
{
  (void)self;
}

EnlApplication *
enl_application_new (void)
{
  return g_object_new (ENL_TYPE_APPLICATION, "application-id", "org.enolith.Enolith", "flags",
                       G_APPLICATION_HANDLES_OPEN, NULL);
}
