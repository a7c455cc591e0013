// SPDX-License-Identifier: Apache-2.0
// Evaluation and sampling of the coated matt surface.
#include "shaders_cpu/surface/coated_diffuse.h"

#include "math/basis3f.h"
#include "math/hemisphere.h"
#include "shaders_cpu/surface/fresnel.h"
#include "shaders_cpu/surface/ggx.h"

namespace whorl::shaders_cpu {
namespace {

constexpr float kInvPi = static_cast<float>(1.0 / kPi);

/// Chance of drawing from the coat: its share of the light that leaves towards wo.
float coat_chance(const CoatedDiffuse& surface, float coat_share) noexcept {
  const float body = (1.0f - coat_share) * luminance(surface.albedo);
  return coat_share / (coat_share + body);
}

Reflection reflect_coated(const CoatedDiffuse& surface, float share_o, const Vec3f& wo, const Vec3f& wi) noexcept {
  const CoatAlbedo& coat = *surface.coat;
  const float alpha = coat.alpha();
  const Vec3f h = unit(wo + wi);
  const float lambda_o = ggx_lambda(wo, alpha);
  const float density = ggx_density(h, alpha);
  const float specular = fresnel_dielectric(wo.dot(h), coat.index()) * density /
                         ((1.0f + lambda_o + ggx_lambda(wi, alpha)) * 4.0f * wo.z * wi.z);
  const float body = (1.0f - share_o) * (1.0f - coat.at(wi.z)) * kInvPi / (1.0f - coat.mean());
  const float chance = coat_chance(surface, share_o);
  return {surface.albedo * body + Vec3f(specular),
          chance * density / (4.0f * wo.z * (1.0f + lambda_o)) + (1.0f - chance) * cosine_pdf(wi.z)};
}

}  // namespace

double alpha_of_gloss(double gloss) {
  const double roughness = 1.0 - std::clamp(gloss, 0.0, 1.0) * (1.0 - std::sqrt(kPolishedAlpha));
  return roughness * roughness;
}

Reflection reflect(const CoatedDiffuse& surface, const Vec3f& wo, const Vec3f& wi) noexcept {
  if (wi.z <= 0.0f || wo.z <= 0.0f) return {};
  if (!surface.coat) return {surface.albedo * kInvPi, cosine_pdf(wi.z)};
  return reflect_coated(surface, surface.coat->at(wo.z), wo, wi);
}

Scatter scatter(const CoatedDiffuse& surface, const Vec3f& wo, float choice, float u1, float u2) noexcept {
  if (wo.z <= 0.0f) return {};
  if (!surface.coat) {
    const Vec3f wi = cosine_direction(u1, u2);
    return {wi, reflect(surface, wo, wi)};
  }
  const float share_o = surface.coat->at(wo.z);
  Vec3f wi;
  if (choice < coat_chance(surface, share_o)) {
    const Vec3f h = ggx_visible_normal(wo, surface.coat->alpha(), std::sqrt(u1), static_cast<float>(kTwoPi) * u2);
    wi = unit(h * (2.0f * wo.dot(h)) - wo);
  } else {
    wi = cosine_direction(u1, u2);
  }
  if (wi.z <= 0.0f) return {wi, {}};
  return {wi, reflect_coated(surface, share_o, wo, wi)};
}

}  // namespace whorl::shaders_cpu
