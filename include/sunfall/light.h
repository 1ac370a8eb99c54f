#pragma once
// The light that comes down on open level ground: every weather source becomes one series of
// beam and sky photons at 10-minute steps over whole local-standard days.
//
// A source is one registered factory (src/light/sources.cpp); another source is one file pair and
// one line there.

#include <array>
#include <chrono>
#include <cstdint>
#include <filesystem>
#include <functional>
#include <optional>
#include <string>
#include <variant>
#include <vector>

#include "sunfall/sun.h"
#include "sunfall/time.h"

namespace sunfall {

inline constexpr std::chrono::seconds kLightStep{600};

// Means over one step on a level plane.
struct LightStep {
  float beam_umol = 0.0F;  // photons 400-700 nm that come from the sun itself, µmol m-2 s-1
  float sky_umol = 0.0F;   // diffuse photons, the circumsolar part included, µmol m-2 s-1
  float beam_w = 0.0F;     // broadband beam on the level plane, W m-2
  float sky_w = 0.0F;      // broadband diffuse, W m-2
};

// A series covers whole years: from the first local-standard midnight of `first_year` on.
struct LightSeries {
  Place place;
  std::chrono::seconds utc_offset{0};  // local standard time minus UTC
  std::chrono::year first_year{2025};
  int years = 1;
  SunTrack sun;                    // same steps
  std::vector<LightStep> steps;    // same length as sun.mean_sine
  std::string description;         // one line for people: "cloudless sky, Linke turbidity 3.0"
  bool made_years = false;         // every year has the same months: nothing to be told over the years
  bool is_ceiling = false;         // a cloudless ceiling; labelled so everywhere
  std::vector<std::string> notes;  // assumptions that were made for the user
};

// The month (0-11) of step i, by local standard time, and the number of days of each month
// summed over the series' years.
int month_of_step(const LightSeries& series, std::size_t step);
std::array<int, 12> days_of_months(const LightSeries& series);

// A cloudless sky: Ineichen and Perez (2002) with Linke turbidity by month.
struct ClearSource {
  std::array<double, 12> linke_turbidity{3, 3, 3, 3, 3, 3, 3, 3, 3, 3, 3, 3};
};
// How days, or mean days of months, of which only the global is known are split into beam and sky.
enum class DaySplit { erbs, collares_pereira };

// Monthly mean of daily global radiation, MJ m-2 d-1, January to December.
struct MonthlyGlobalSource {
  enum class Days { mean, varied };  // every day of a month equally clear, or dull and bright ones

  std::array<double, 12> global_mj_m2_d{};
  DaySplit split = DaySplit::erbs;
  Days days = Days::mean;
  // Of varied days only.
  int years = 1;              // from LightOptions::year on, each with the given means and days of its own
  int seed = 1;               // other seeds, other days
  double persistence = 0.29;  // how much a day is like the one before, 0 to 0.9
};
// A station's or a sensor's record in a CSV file, at equal steps of 1 minute to 12 hours or of one day.
struct SeriesSource {
  // What of its interval a time stamp names; `day`: stamps are dates and name whole days of local
  // standard time.
  enum class Stamp { begin, middle, end, day };
  // Energies are sums over one step; those per day go with Stamp::day.
  enum class Unit {
    w_m2,
    j_m2,
    j_cm2,
    kj_m2,
    mj_m2,
    wh_m2,
    kwh_m2,
    umol_m2_s,
    j_cm2_d,
    mj_m2_d,
    kwh_m2_d,
    mol_m2_d
  };
  enum class Split { logistic, erbs };  // beam and sky of an hour of which only the global is known

  std::filesystem::path file;
  std::string time = "time";  // names of columns; an empty one is not there
  std::string global;         // on a level plane
  std::string diffuse;        // on a level plane
  std::string beam;           // on a plane that faces the sun
  Stamp stamp = Stamp::end;
  Unit unit = Unit::w_m2;
  char delimiter = '\0';  // '\0': found out
  char decimal = '.';     // or ','
  // Columns of the station's place, decimal degrees, north and east positive; both or none.
  std::string latitude;
  std::string longitude;
  bool utc = false;  // stamps without an offset are UTC, not the clock's standard time
  Split split = Split::logistic;
  DaySplit day_split = DaySplit::erbs;  // with Stamp::day
  bool allow_gaps = false;              // fill months of which more than a tenth is missing
  bool trust_clock = false;             // take the stamps as they are, however the light of clear days lies
};
// A gridded weather file (NetCDF, GRIB): the record of the point where the farm lies.
struct GridSource {
  enum class Point { nearest, bilinear };  // bilinear: between the four points around
  // What an energy is the sum of: its own step, or all since the forecast began.
  enum class Accumulated { step, start };
  enum class BeamPlane { sun, level };  // what plane the beam is counted on

  std::filesystem::path file;
  std::string global;  // names of variables, as in SeriesSource; an empty one is not there
  std::string diffuse;
  std::string beam;
  SeriesSource::Stamp stamp = SeriesSource::Stamp::end;
  std::optional<SeriesSource::Unit> unit;  // none: the file must say it
  Accumulated accumulated = Accumulated::step;
  BeamPlane beam_plane = BeamPlane::sun;
  Point point = Point::nearest;
  SeriesSource::Split split = SeriesSource::Split::logistic;
  bool allow_gaps = false;
  bool trust_clock = false;
};
// Where the stamps and values of a record stand in its CSV file.
struct DaysFile {
  std::filesystem::path file;
  std::string time = "date";  // the column of dates
  char delimiter = '\0';      // '\0': found out
  char decimal = '.';         // or ','
  std::string latitude;       // as in SeriesSource
  std::string longitude;
};
// Hours of bright sunshine of each day: Angstrom and Prescott, FAO-56 eq. 35.
struct SunshineSource : DaysFile {
  std::string hours = "sunshine_hours";
  double a_s = 0.25;  // clearness of a day without sun
  double b_s = 0.50;  // what a day full of sun adds
  DaySplit split = DaySplit::erbs;
  bool allow_gaps = false;
};
// Lowest and highest air temperature of each day, degrees Celsius: Hargreaves, FAO-56 eq. 50.
struct TemperatureSource : DaysFile {
  std::string t_min = "t_min";
  std::string t_max = "t_max";
  double k_rs = 0.16;  // interior; 0.19 at a coast
  DaySplit split = DaySplit::erbs;
  bool allow_gaps = false;
};
using LightSource = std::variant<ClearSource, MonthlyGlobalSource, SeriesSource, GridSource, SunshineSource,
                                 TemperatureSource>;

// The files that a source reads.
std::vector<std::filesystem::path> files_of(const LightSource& source);

// What a gridded file holds at a place, as the file has it.
struct PointRecord {
  struct Quantity {
    std::string unit;           // the file's own words, may be empty
    std::vector<double> value;  // one per time, NaN where missing; no element where not asked for
  };
  std::vector<std::int64_t> time_s;    // seconds of UTC since 1970, increasing
  std::vector<std::int64_t> run_s;     // when each value's forecast began; empty where unknown
  std::array<Quantity, 3> quantities;  // global, diffuse, beam
  std::string points;                  // for people: the points taken
};

struct LightOptions {
  int year = 2025;  // the calendar year whose sun is followed when the source names none
  // Opens gridded files for a GridSource; light itself opens tables of text only. Handed in by whoever may
  // see such files.
  std::function<PointRecord(const GridSource&, const Place&)> read_point = {};
};

// Throws Error(plan) for radiation that is negative, not finite or above the extraterrestrial;
// `where` tells the error where the source stood in the plan.
LightSeries make_light(const LightSource& source, const Place& place, const Clock& clock,
                       const LightOptions& options, const std::string& where);

// Photons 400-700 nm per joule of global radiation and their beam part, from broadband values.
struct PhotonSplit {
  double beam_umol = 0.0;
  double sky_umol = 0.0;
};
PhotonSplit photons(double beam_w, double sky_w, double extraterrestrial_level_w, Angle elevation);

}  // namespace sunfall
