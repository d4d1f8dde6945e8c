/* The weather file of a job. */
#ifndef SLABGAP_FILE_WEATHER_FILE_H
#define SLABGAP_FILE_WEATHER_FILE_H

#include "base/finding.h"
#include "core/weather.h"

/* Reads the file a job names; a name that does not begin with / counts from the job file's folder
 * (job_path NULL: from the folder one is in). What is wrong with it goes to findings. On anything
 * but STATUS_OK *weather is NULL. Beside others it gives weather_release(). */
enum status weather_file_read(const char *job_path, const char *name, struct weather **weather,
                              struct finding_list *findings);

#endif
