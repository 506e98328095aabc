#include "app/own-base-form.h"

#include <string.h>

struct _EnlOwnBaseForm {
  GtkWidget parent;
  EnlSession *session; /* owned */
  GtkWidget *grid;
  GtkLabel *heading, *fault;
  GtkEntry *name;
  GtkDropDown *family;
  GtkSpinButton *strength, *doubt;
};

G_DEFINE_FINAL_TYPE (EnlOwnBaseForm, enl_own_base_form, GTK_TYPE_WIDGET)

static EnlSolvent
solvent_of (EnlOwnBaseForm *self)
{
  return enl_workset_conditions (enl_session_set (self->session))->solvent;
}

/* Classes of the base table, each once, in its order. */
static GtkStringList *
list_families (const EnlBaseTable *bases)
{
  GtkStringList *list = gtk_string_list_new (NULL);

  for (uint32_t i = 0; i < enl_base_table_size (bases); i++) {
    const char *family = enl_base_table_get (bases, i)->family;
    gboolean there = FALSE;
    for (guint k = 0; k < g_list_model_get_n_items (G_LIST_MODEL (list)); k++)
      there |= strcmp (gtk_string_list_get_string (list, k), family) == 0;
    if (!there)
      gtk_string_list_append (list, family);
  }
  return list;
}

static void
tell (EnlOwnBaseForm *self, const char *fault)
{
  gtk_label_set_text (self->fault, fault);
  gtk_widget_set_visible (GTK_WIDGET (self->fault), fault[0] != '\0');
}

static void
on_add (GtkWidget *widget, EnlOwnBaseForm *self)
{
  g_autoptr (EnlOwnBase) base =
      enl_own_base_new (gtk_editable_get_text (GTK_EDITABLE (self->name)));
  GtkStringObject *family = gtk_drop_down_get_selected_item (self->family);
  EnlError err;

  (void)widget;
  g_free (base->family);
  base->family = g_strdup (gtk_string_object_get_string (family));
  base->pkah[solvent_of (self)] = gtk_spin_button_get_value (self->strength);
  base->sigma[solvent_of (self)] = gtk_spin_button_get_value (self->doubt);
  if (enl_session_add_base (self->session, base, &err) != ENL_OK) {
    g_autofree char *message = enl_error_message (&err);
    tell (self, message);
    return;
  }
  gtk_editable_set_text (GTK_EDITABLE (self->name), "");
  tell (self, "");
  gtk_popover_popdown (GTK_POPOVER (gtk_widget_get_ancestor (GTK_WIDGET (self), GTK_TYPE_POPOVER)));
}

static void
enl_own_base_form_dispose (GObject *object)
{
  EnlOwnBaseForm *self = ENL_OWN_BASE_FORM (object);

  g_clear_pointer (&self->grid, gtk_widget_unparent);
  g_clear_object (&self->session);
  G_OBJECT_CLASS (enl_own_base_form_parent_class)->dispose (object);
}

static void
enl_own_base_form_class_init (EnlOwnBaseFormClass *klass)
{
  GtkWidgetClass *widget_class = GTK_WIDGET_CLASS (klass);

  G_OBJECT_CLASS (klass)->dispose = enl_own_base_form_dispose;
  gtk_widget_class_set_layout_manager_type (widget_class, GTK_TYPE_BIN_LAYOUT);
  gtk_widget_class_set_template_from_resource (widget_class,
                                               "/org/enolith/Enolith/own-base-form.ui");
  gtk_widget_class_bind_template_child (widget_class, EnlOwnBaseForm, grid);
  gtk_widget_class_bind_template_child (widget_class, EnlOwnBaseForm, heading);
  gtk_widget_class_bind_template_child (widget_class, EnlOwnBaseForm, fault);
  gtk_widget_class_bind_template_child (widget_class, EnlOwnBaseForm, name);
  gtk_widget_class_bind_template_child (widget_class, EnlOwnBaseForm, family);
  gtk_widget_class_bind_template_child (widget_class, EnlOwnBaseForm, strength);
  gtk_widget_class_bind_template_child (widget_class, EnlOwnBaseForm, doubt);
  gtk_widget_class_bind_template_callback (widget_class, on_add);
}

static void
enl_own_base_form_init (EnlOwnBaseForm *self)
{
  gtk_widget_init_template (GTK_WIDGET (self));
}

GtkWidget *
enl_own_base_form_new (EnlSession *session)
{
  EnlOwnBaseForm *self = g_object_new (ENL_TYPE_OWN_BASE_FORM, NULL);
  g_autoptr (GtkStringList) families = list_families (enl_session_knowledge (session)->bases);

  self->session = g_object_ref (session);
  gtk_drop_down_set_model (self->family, G_LIST_MODEL (families));
  return GTK_WIDGET (self);
}

void
enl_own_base_form_present (EnlOwnBaseForm *self)
{
  g_autofree char *text = g_strdup_printf ("A base of your own, with its number in %s",
                                           enl_solvent_label (solvent_of (self)));

  gtk_label_set_text (self->heading, text);
  tell (self, "");
  gtk_widget_grab_focus (GTK_WIDGET (self->name));
}
