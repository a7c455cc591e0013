// SPDX-License-Identifier: Apache-2.0
// A shell set up to be pictured: compiled once, then rendered from as many sides as are asked for.
#pragma once

#include "field/field.h"
#include "plate/views.h"
#include "scene/scene.h"
#include "specimen/specimen.h"
#include "trace/united_solid.h"
#include "transport/camera.h"
#include "transport/film.h"
#include "transport/materials.h"
#include "transport/progress.h"

#include <cstdint>
#include <memory>
#include <vector>

namespace whorl::plate {

/// What a quality means: how much of the stated resolution is drawn, and samples a pixel, up to the most where noise would be seen.
struct QualitySteps {
  double resolution;  // times the stated pixels per inch
  int samples, most_samples;
};
QualitySteps quality_steps(specimen::Quality quality);

/// The specimen with the resolution that the quality draws.
specimen::Specimen at_quality(specimen::Specimen specimen, specimen::Quality quality);

class Studio {
 public:
  /// Compiles the scene; throws InvalidInput as compile_scene does. Nothing is traced before `set_up`.
  explicit Studio(const specimen::Specimen& specimen);

  /// Builds the surface cells for pictures of `mm_per_pixel` at the finest. `exact`: trace the functions themselves.
  void set_up(double mm_per_pixel, bool exact);

  /// One picture. Not for several threads at once: it uses all of them itself.
  transport::Film picture(const View& view, specimen::PanelLook look, specimen::Shows shows, const transport::Camera& camera, const QualitySteps& steps,
                          std::uint64_t seed, std::uint32_t number, const transport::Progress& progress) const;

  const scene::Scene& scene() const { return *scene_; }
  const field::Field& field() const { return *field_; }
  const trace::EmbreeSolid& solid() const { return *solid_; }
  const trace::AttachedSolids* attached() const { return attached_.get(); }
  /// Points on the outer surface, for framing; frame of the dextral solid, mm.
  const std::vector<Vec3>& surface_points() const { return points_; }
  /// Rays start this far from the pole.
  double front_mm() const { return front_mm_; }
  double compile_seconds() const { return compile_seconds_; }

 private:
  /// The picture without its layer of provenance.
  transport::Film exposed(const View& view, specimen::PanelLook look, specimen::Shows shows, const transport::Camera& camera, const QualitySteps& steps, std::uint64_t seed,
                          std::uint32_t number, const transport::Progress& progress) const;

  specimen::Specimen specimen_;
  std::unique_ptr<scene::Scene> scene_;
  std::unique_ptr<field::Field> field_;
  std::unique_ptr<trace::EmbreeSolid> solid_;
  std::unique_ptr<trace::AttachedSolids> attached_;  // none where nothing stands on the shell
  std::vector<Vec3> points_;
  Box3 bounds_;  // of shell and attached solids
  transport::Materials materials_, whitened_;
  double front_mm_ = 0.0, compile_seconds_ = 0.0;
};

}  // namespace whorl::plate
