// SPDX-License-Identifier: Apache-2.0
// A ray in Embree's words.
#pragma once

#include "trace/embree_shim.h"
#include "trace/surfaces.h"

namespace whorl::trace::embree {

inline RTCRay ray_of(const Ray& ray) {
  RTCRay r;
  r.org_x = ray.origin.x;
  r.org_y = ray.origin.y;
  r.org_z = ray.origin.z;
  r.dir_x = ray.direction.x;
  r.dir_y = ray.direction.y;
  r.dir_z = ray.direction.z;
  r.tnear = ray.t_min;
  r.tfar = ray.t_max;
  r.time = 0.0f;
  r.mask = 0xFFFFFFFFu;
  r.id = 0;
  r.flags = 0;
  return r;
}

inline RTCRayHit query_of(const Ray& ray) {
  RTCRayHit query;
  query.ray = ray_of(ray);
  query.hit.geomID = RTC_INVALID_GEOMETRY_ID;
  query.hit.instID[0] = RTC_INVALID_GEOMETRY_ID;
  return query;
}

}  // namespace whorl::trace::embree
