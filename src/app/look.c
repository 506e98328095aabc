#include "app/core-glue.h"

struct _EnlLook {
  GObject parent;
  EnlThemeName name;
};

static guint changed_signal;

G_DEFINE_FINAL_TYPE (EnlLook, enl_look, G_TYPE_OBJECT)

static void
enl_look_class_init (EnlLookClass *klass)
{
  changed_signal = g_signal_new ("changed", G_TYPE_FROM_CLASS (klass), G_SIGNAL_RUN_LAST, 0, NULL,
                                 NULL, NULL, G_TYPE_NONE, 0);
}

static void
enl_look_init (EnlLook *self)
{
  self->name = ENL_THEME_LIGHT;
}

EnlLook *
enl_look_new (void)
{
  return g_object_new (ENL_TYPE_LOOK, NULL);
}

EnlThemeName
enl_look_get (EnlLook *self)
{
  return self->name;
}

const EnlTheme *
enl_look_theme (EnlLook *self)
{
  return enl_theme_get (self->name);
}

void
enl_look_set (EnlLook *self, EnlThemeName name)
{
  if (self->name == name)
    return;
  self->name = name;
  g_object_set (gtk_settings_get_default (), "gtk-application-prefer-dark-theme",
                name == ENL_THEME_DARK, NULL);
  g_signal_emit (self, changed_signal, 0);
}
