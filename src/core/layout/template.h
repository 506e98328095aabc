/* Drawn ring systems (resources/ring-templates.tsv): the perspective pictures by which the trade
 * recognises bridged cages. Matched by connection alone, whatever the atoms and bond orders. */
#pragma once

#include "core/layout/sketch.h"

typedef struct EnlTemplates EnlTemplates;

/* Reads the table that is compiled in, or `text`. The built-in one is correct (a test reads it);
 * a damaged `text` gives ENL_ERROR_FORMAT with its line. */
EnlTemplates *enl_templates_new (void) ENL_MUST_USE;
EnlStatus enl_templates_parse (const char *text, size_t size, EnlTemplates **out,
                               EnlError *err) ENL_MUST_USE;
void enl_templates_free (EnlTemplates *templates);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlTemplates, enl_templates_free)

uint32_t enl_templates_count (const EnlTemplates *templates);
const char *enl_template_name (const EnlTemplates *templates, uint32_t index);
uint32_t enl_template_atoms (const EnlTemplates *templates, uint32_t index);
/* Crossings that the drawn picture itself has. */
uint32_t enl_template_crossings (const EnlTemplates *templates, uint32_t index);
const EnlSpot *enl_template_spots (const EnlTemplates *templates, uint32_t index);

/* The bonds as pairs of atoms (from 0), owned by the templates. */
const uint32_t (*enl_template_bonds (const EnlTemplates *templates, uint32_t index,
                                     uint32_t *n))[2];

/* Called for each way to lay the template on the sketch: image[t] is the atom for template atom t.
 * Return false to stop. */
typedef bool (*EnlTemplateMatch) (const uint32_t *image, const EnlSpot *spot, void *data);

/* With `whole`, atoms and bonds must correspond one to one; else the template may be a part of the
 * sketch with all bonds between its atoms. The search gives up after a fixed amount of work. */
void enl_template_match (const EnlTemplates *templates, uint32_t index, const EnlSketch *sketch,
                         bool whole, EnlTemplateMatch match, void *data);
